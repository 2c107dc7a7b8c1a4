import type { Groupings, Period } from './grouping.js';
import type { Clause, Tariff } from './papers.js';
import type { FactorReadings, SettledFactorRule } from './power-factor-rule.js';
import type { Selection, WindowMasks } from './selection.js';
import type { TariffCalendar, TariffMonth } from './tariff-calendar.js';
import type { TariffReadings } from './tariff-readings.js';

/** What clauses are made ready on. */
export interface ClauseGround {
  tariff: Tariff;
  calendar: TariffCalendar;
  masks: WindowMasks;
  groupings: Groupings;
  readings: TariffReadings;
  factor: SettledFactorRule;
  /** rows of carried quantities handed out so far; a clause that looks back takes one for each of its parts */
  carriedRows: number;
}

/** One month of a bill while it is formed; used again for the next. */
export interface MonthRun {
  /** index of the month */
  m: number;
  month: TariffMonth;
  /** all months of the record */
  months: readonly TariffMonth[];
  /** own quantities of earlier months, one row a carried part, one entry a month */
  carried: Float64Array;
  /** rounded amounts of the lines so far, one a clause */
  amounts: Float64Array;
  /** their sum */
  billSoFar: number;
  /** is a working wanted */
  say: boolean;
  /** out: the clause's quantity */
  quantity: number;
  /** out: the arithmetic with values put in, where it is wanted */
  working: string;
}

/** A clause made ready: its line's amount before rounding; quantity and working are put into the run. */
export interface ReadyClause {
  unit: string;
  /** it keeps its quantity for later months */
  carries: boolean;
  /**
   * @param run the month, its readings formed
   * @returns amount before rounding
   */
  price(run: MonthRun): number;
}

/**
 * The intervals of a clause: the union of its windows, or all.
 * @param ground what the tariff's clauses are made ready on
 * @param clause the clause
 * @returns its selection
 */
export function selectionOf(ground: Pick<ClauseGround, 'masks'>, clause: Clause): Selection {
  return ground.masks.selection({ union: clause.windows ?? null, within: null });
}

/**
 * What the power factor of a selection is formed from, no more than the tariff's rule looks at.
 * @param ground what the tariff's clauses are made ready on
 * @param selection the intervals
 * @param per length of a period
 * @returns the readings
 */
export function factorReadings(ground: ClauseGround, selection: Selection, per: Period): FactorReadings {
  const { basis } = ground.factor;
  return {
    energy: ground.readings.energy(selection, per),
    demand: basis === 'energy' ? null : ground.readings.demand(selection, per, 'lagging'),
  };
}

/** A clause's intervals, or those of one of its priced windows, and the price that holds in them. */
export interface PricedPart {
  selection: Selection;
  pricePerUnit: number;
}

/**
 * A clause's parts by price: one, or one for each window of `prices`.
 * @param ground what the tariff's clauses are made ready on
 * @param clause a clause with a price or prices
 * @param path the clause's path, for a refusal
 * @returns parts in the order of `prices`
 * @throws InputProblem where the priced windows don't share out the clause's intervals
 */
export function pricedParts(
  ground: Pick<ClauseGround, 'masks'>,
  clause: Clause & { pricePerUnit?: number; prices?: Record<string, number> },
  path: string,
): PricedPart[] {
  const all = selectionOf(ground, clause);
  if (clause.prices === undefined) return [{ selection: all, pricePerUnit: clause.pricePerUnit ?? 0 }];
  ground.masks.requirePartition(all, Object.keys(clause.prices), { months: clause.months, path });
  return Object.entries(clause.prices).map(([within, pricePerUnit]) => ({
    selection: ground.masks.selection({ union: clause.windows ?? null, within }),
    pricePerUnit,
  }));
}
