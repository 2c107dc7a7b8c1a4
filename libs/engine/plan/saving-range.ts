import type { SavingCase, SavingRange } from '../money/money-result.js';
import type { ControllerView } from '../operation/controller-view.js';
import { withoutStage } from './robustness.js';
import type { Study } from './study.js';
import { type Scale, viewOn, type WorthAgain, weighAgain, workOn } from './weigh-again.js';
import type { WeighedBank } from './weighed-bank.js';

/** One day in so many a bank is out where it is 95 % available; no multiple of a week, so that it is every weekday. */
const DAYS_TO_ONE_OUT = 20;
const DAY_S = 86_400;

/**
 * A way's saving as a range: as simulated; decided on the averages of the interval before; out every twentieth day; and
 * with the stage out whose loss costs most. The headline is the lower of the first two.
 * @param scale record and bills
 * @param way a way with a bank
 * @param known the way as simulated, and with a stage out
 * @returns the range
 * @source method-money
 */
export function savingRange(
  scale: Scale,
  way: WeighedBank,
  { ideal, stageOut }: { ideal: WorthAgain; stageOut: WorthAgain },
): SavingRange {
  const { bank, control } = way;
  const weighed = (view: ControllerView): WorthAgain => weighAgain(scale, way, workOn(scale, bank, control, { view }));
  const late = weighed(lateView(viewOn(scale, control)));
  const available = weighed(viewInPart(scale, way));
  const cases: SavingCase[] = [
    { name: 'ideal', ...told(ideal) },
    { name: 'one interval late', ...told(late) },
    { name: '95 % available', ...told(available) },
    { name: 'one stage out', ...told(stageOut) },
  ];
  const savings = cases.map(({ savingPerYear }) => savingPerYear);
  return {
    headlinePerYear: Math.min(ideal.savingPerYear, late.savingPerYear),
    leastPerYear: Math.min(...savings),
    mostPerYear: Math.max(...savings),
    cases,
  };
}

function told({ savingPerYear, npv }: WorthAgain): Pick<SavingCase, 'savingPerYear' | 'npv'> {
  return { savingPerYear, npv };
}

/**
 * A way with one stage out for good: of each group in turn, the one that leaves the least saving.
 * @param scale record and bills
 * @param way a way with a bank
 * @returns saving and worth with the whole bank paid
 * @source method-robustness
 */
export function worstStageOut(scale: Scale, way: WeighedBank): WorthAgain {
  const found = way.bank.groups.map((_, g) => {
    return weighAgain(scale, way, workOn(scale, withoutStage(way.bank, g), way.control));
  });
  return found.reduce((worst, one) => (one.savingPerYear < worst.savingPerYear ? one : worst));
}

/**
 * What a controller sees that decides on the interval before. What is decided at the beginning of an interval rests on the
 * last averages there are; at the first there are none, and nothing is done. A standby contact is no decision and acts at
 * once.
 * @param view the interval's own averages, length n
 * @returns the same one interval later
 * @source derived
 */
export function lateView(view: ControllerView): ControllerView {
  return {
    ...view,
    wantedKvar: later(view.wantedKvar, 0),
    voltageScale: view.voltageScale === null ? null : later(view.voltageScale, 1),
  };
}

function later(column: Float64Array, first: number): Float64Array {
  const shifted = new Float64Array(column.length);
  shifted.set(column.subarray(0, column.length - 1), 1);
  shifted[0] = first;
  return shifted;
}

// Held off by the contact a standby supply has; a stage that is never switched has none, and stays in.
function viewInPart(scale: Scale, { control }: WeighedBank): ControllerView {
  const view = viewOn(scale, control);
  const standby = outColumn(scale.study);
  if (view.standby !== null)
    for (let i = 0; i < standby.length; i++) standby[i] = Math.max(standby[i]!, view.standby[i]!);
  return { ...view, standby };
}

/**
 * When a bank that is 95 % available is out: every twentieth day from the beginning of the record, of a record of less
 * than twenty days its last twentieth.
 * @param study site and record
 * @returns 1 where it is out, length n
 * @source derived
 */
export function outColumn({ record }: Pick<Study, 'record'>): Uint8Array {
  const dayS = Math.min(DAY_S, (record.endS - record.firstS) / DAYS_TO_ONE_OUT);
  const out = new Uint8Array(record.beginS.length);
  for (let i = 0; i < out.length; i++) {
    const day = Math.floor((record.beginS[i]! - record.firstS) / dayS);
    if (day % DAYS_TO_ONE_OUT === DAYS_TO_ONE_OUT - 1) out[i] = 1;
  }
  return out;
}
