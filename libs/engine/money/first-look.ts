import { tanFromPowerFactor } from '../quantity/power-factor.js';
import type { RequirementSummary } from '../requirement/requirement.js';

/** From and to. */
export interface Ends {
  low: number;
  high: number;
}

/** What two prices make of a record, before any tariff or bank is known; amounts in the currency of the prices. */
export interface FirstLook {
  /** lagging kvarh beyond the target's, over a year [kvarh] */
  avoidableKvarh: number;
  saving: Ends;
  /** building the bank */
  capital: Ends;
  /** [years]; null where nothing is saved */
  paybackYears: Ends | null;
}

const YEAR_H = 8760;

/**
 * The worth of a bank in orders of magnitude. The kvarh a bank would take away are, month by month, those beyond the
 * target: E_a = Σ max(0, E_q − tan φ_t · E_p), brought to a year by 8 760 h over the hours measured. The bank is taken
 * between the need of 99 % of the record and the greatest. Payback is capital over saving, at the ends that belong
 * together; a demand charge, losses and interest are left out.
 * @param requirement need and months of the record; kWh, kvarh, kvar
 * @param hours measured by the record [h], above 0
 * @param prices of a kvarh beyond the target and of a kvar installed, each from and to
 * @returns kvarh a year, amounts and years
 * @source derived: a sum over months, priced
 */
export function firstLook(
  requirement: RequirementSummary,
  hours: number,
  prices: { perKvarh: Ends; perKvar: Ends },
): FirstLook {
  const tan = tanFromPowerFactor(requirement.targetPowerFactor);
  let beyond = 0;
  for (const { activeKwh, laggingKvarh } of requirement.months) beyond += Math.max(0, laggingKvarh - tan * activeKwh);
  const avoidableKvarh = (beyond * YEAR_H) / hours;
  const saving = { low: avoidableKvarh * prices.perKvarh.low, high: avoidableKvarh * prices.perKvarh.high };
  const capital = {
    low: requirement.p99Kvar * prices.perKvar.low,
    high: requirement.maxKvar * prices.perKvar.high,
  };
  const paybackYears = saving.low > 0 ? { low: capital.low / saving.high, high: capital.high / saving.low } : null;
  return { avoidableKvarh, saving, capital, paybackYears };
}
