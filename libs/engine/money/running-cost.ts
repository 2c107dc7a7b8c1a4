import type { Bank } from '../layout/bank.js';
import { ratedTotalKvar, stageCount } from './capital.js';
import type { PriceBook, SwitchPrice } from './papers.js';

/** What a simulated record says of a bank's use. */
export interface BankUse {
  /** length of all valid intervals [h] */
  validHours: number;
  /** time each physical stage was connected, groups expanded in order [h] */
  connectedHours: Float64Array;
  /** effective kvar of each physical stage, at nominal voltage [kvar] */
  stageKvar: Float64Array;
  /** switchings of each physical stage over the record */
  switchings: Int32Array;
}

/** A part of the bank that is replaced, before any growth of costs. */
export interface Replacement {
  /** month from the beginning, 1 … */
  month: number;
  amount: number;
}

/** What a bank costs while it works. */
export interface Running {
  maintenancePerYear: number;
  lossKwhPerYear: number;
  lossPerYear: number;
  switchingsPerYear: number;
  replacements: Replacement[];
}

/** A bank that is not there. */
export const NO_RUNNING: Running = {
  maintenancePerYear: 0,
  lossKwhPerYear: 0,
  lossPerYear: 0,
  switchingsPerYear: 0,
  replacements: [],
};

const HOURS_A_YEAR = 8760;
/** Ends of lives this little beyond a month fall into it [month]. */
const MONTH_WIDTH = 1e-9;

/**
 * Running costs a year: maintenance, losses Y·Σ connected hours × effective kvar × (W/kvar + the switch's)/1000,
 * Y = 8 760/valid hours, and what is replaced.
 * @param bank the bank
 * @param prices the price book
 * @param use its use over the record
 * @param of kind of its switches, and the years looked at
 * @returns costs in the book's currency
 * @source method-money
 */
export function runningCosts(
  bank: Bank,
  prices: PriceBook,
  use: BankUse,
  of: { switchKind: string | null; horizonYears: number },
): Running {
  const kind = prices.switches?.find((entry) => entry.kind === of.switchKind);
  const yearly = HOURS_A_YEAR / use.validHours;
  let lossWh = 0;
  let switchings = 0;
  const lives: Life[] = [];
  const factor = prices.replacementFactor ?? 1;
  for (const [stage, group] of bank.groups
    .flatMap((group) => Array.from({ length: group.count }, () => group))
    .entries()) {
    lossWh += use.connectedHours[stage]! * use.stageKvar[stage]! * lossWPerKvar(prices, kind, group.reactorPct);
    switchings += use.switchings[stage]!;
    lives.push(switchLife(kind, group.ratedKvar, use.switchings[stage]! * yearly, factor));
  }
  if (prices.capacitorLifeYears !== undefined) {
    lives.push({ years: prices.capacitorLifeYears, amount: (prices.perKvar ?? 0) * ratedTotalKvar(bank) * factor });
  }
  const lossKwhPerYear = (yearly * lossWh) / 1000;
  return {
    maintenancePerYear: maintenancePerYear(bank, prices),
    lossKwhPerYear,
    lossPerYear: lossKwhPerYear * (prices.lossPricePerKwh ?? 0),
    switchingsPerYear: yearly * switchings,
    replacements: replacements(lives, of.horizonYears * 12),
  };
}

/** Something that is replaced when its life ends. */
export interface Life {
  /** not finite where it never ends */
  years: number;
  amount: number;
}

/**
 * Losses of a bank's stage: capacitor or capacitor with reactor, and its switch.
 * @param prices the price book
 * @param kind its entry of the switch, where there is one
 * @param reactorPct p of the stage [%]
 * @returns [W/kvar]
 * @source method-money
 */
export function lossWPerKvar(prices: PriceBook, kind: SwitchPrice | undefined, reactorPct: number): number {
  const own = reactorPct > 0 ? prices.lossWPerKvar?.reactor : prices.lossWPerKvar?.plain;
  return (own ?? 0) + (kind?.lossWPerKvar ?? 0);
}

/**
 * Life of a stage's switch: lifeSwitchings over its switchings a year.
 * @param kind the book's entry of the switch, where there is one
 * @param ratedKvar Q_N of the stage [kvar]
 * @param switchingsPerYear of this switch
 * @param replacementFactor what replacing costs over what it cost new
 * @returns years and the amount at each end
 * @source method-money
 */
export function switchLife(
  kind: SwitchPrice | undefined,
  ratedKvar: number,
  switchingsPerYear: number,
  replacementFactor: number,
): Life {
  const years =
    kind?.lifeSwitchings === undefined || switchingsPerYear === 0
      ? Number.POSITIVE_INFINITY
      : kind.lifeSwitchings / switchingsPerYear;
  return { years, amount: ((kind?.perStage ?? 0) + (kind?.perKvar ?? 0) * ratedKvar) * replacementFactor };
}

/**
 * Maintenance a year.
 * @param bank the bank
 * @param prices the price book
 * @returns amount a year
 * @source method-money
 */
export function maintenancePerYear(bank: Bank, prices: PriceBook): number {
  return (prices.maintenancePerYear ?? 0) + (prices.maintenancePerStage ?? 0) * stageCount(bank);
}

/**
 * Ends of lives as months: max(1, ⌈12·k·L − 10⁻⁹⌉), k = 1, 2 … while below the last month; amounts of a month added.
 * @param lives what is replaced and how long it lasts
 * @param lastMonth months looked at
 * @returns replacements by month, ascending, none without an amount
 * @source method-money
 */
export function replacements(lives: readonly Life[], lastMonth: number): Replacement[] {
  const amounts = new Float64Array(lastMonth);
  for (const { years, amount } of lives) {
    if (amount === 0 || !Number.isFinite(years)) continue;
    let before = 0;
    for (let month = 1; month < lastMonth; month++) {
      const ended = endedBy(month, years);
      if (ended > before) amounts[month]! += (ended - before) * amount;
      before = ended;
    }
  }
  const found: Replacement[] = [];
  for (let month = 1; month < lastMonth; month++) {
    if (amounts[month] !== 0) found.push({ month, amount: amounts[month]! });
  }
  return found;
}

// Lives that have ended by a month: the k with ⌈12·k·L − 10⁻⁹⌉ ≤ month, found by division and put right by the rule.
function endedBy(month: number, years: number): number {
  const ends = (k: number): boolean => 12 * k * years - MONTH_WIDTH <= month;
  let count = Math.floor(month / (12 * years));
  while (count > 0 && !ends(count)) count--;
  while (ends(count + 1)) count++;
  return count;
}
