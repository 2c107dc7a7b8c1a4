import { tanFromPowerFactor } from '../quantity/power-factor.js';
import { runColumns } from './run-columns.js';
import { meterWithConstant, type Study } from './study.js';

/** The bound is narrowed until its bracket is this wide [kvar]. */
const BOUND_WIDTH_KVAR = 1e-3;

/**
 * Least effective total that could meet the target in every billing month, whatever the controller does.
 * With at most t connected an interval's lagging kvar at the meter are no fewer than with t connected throughout, and
 * its active power no more than the greater of none and t connected (the transformer's loss is convex in the kvar).
 * @param study site and record
 * @param mostKvar largest total of the candidates [kvar]
 * @returns lower bound [kvar], or null where even `mostKvar` could not
 * @source derived
 */
export function leastTotalKvar(study: Study, mostKvar: number): number | null {
  const couldMeet = bound(study);
  if (!couldMeet(mostKvar)) return null;
  let low = 0;
  let high = mostKvar;
  while (high - low > BOUND_WIDTH_KVAR) {
    const middle = (low + high) / 2;
    if (couldMeet(middle)) high = middle;
    else low = middle;
  }
  return low;
}

function bound(study: Study): (totalKvar: number) => boolean {
  const tan = tanFromPowerFactor(study.site.targetPowerFactor);
  const { starts, names } = study.months;
  const withoutKw = meterWithConstant(study, 0).activeKw;
  const columns = runColumns(withoutKw.length);
  const monthMeets = (m: number): boolean => {
    const { activeKw, laggingKvar } = columns.meter;
    let excess = 0;
    let energy = 0;
    for (let i = starts[m]!; i < starts[m + 1]!; i++) {
      const kw = Math.max(0, withoutKw[i]!, activeKw[i]!);
      energy += kw;
      excess += laggingKvar[i]! - kw * tan;
    }
    return excess <= 1e-9 * (1 + energy) || energy === 0;
  };
  // The month that missed last is looked at first: it is likely to miss again.
  const order = [...names.keys()];
  return (totalKvar) => {
    meterWithConstant(study, totalKvar, columns);
    const missing = order.findIndex((m) => !monthMeets(m));
    if (missing >= 0) order.unshift(...order.splice(missing, 1));
    return missing < 0;
  };
}
