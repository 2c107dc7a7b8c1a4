import {
  type Bill,
  billYear,
  type Clause,
  type MeterColumns,
  prepareTariff,
  type RecordSpan,
  type Tariff,
  UTC_TABLE,
  type ZoneTable,
} from '#libs/engine/index.js';

/** A meter's columns with their times. */
export interface MadeMeter {
  span: RecordSpan;
  columns: MeterColumns;
}

/**
 * A meter from lists, one entry an interval.
 * @param lists powers, all of one length; lagging and leading are 0 where absent
 * @param times when it begins, UTC, and the length of an interval
 * @returns the meter
 */
export function madeMeter(
  lists: { activeKw: readonly number[]; laggingKvar?: readonly number[]; leadingKvar?: readonly number[] },
  times: { begin: string; intervalS: number },
): MadeMeter {
  const n = lists.activeKw.length;
  const firstS = Date.parse(times.begin) / 1000;
  const column = (list: readonly number[] | undefined): Float64Array => Float64Array.from(list ?? new Array(n).fill(0));
  return {
    span: {
      intervalS: times.intervalS,
      beginS: Float64Array.from({ length: n }, (_, i) => firstS + i * times.intervalS),
      firstS,
      endS: firstS + n * times.intervalS,
    },
    columns: {
      activeKw: column(lists.activeKw),
      laggingKvar: column(lists.laggingKvar),
      leadingKvar: column(lists.leadingKvar),
    },
  };
}

/** Hours of April 2024, the month steady meters run through. */
export const APRIL_HOURS = 720;

/**
 * April 2024 by the hour, the same power throughout, in UTC.
 * @param energies of the whole month [kWh, kvarh]
 * @returns the meter
 */
export function steadyApril(energies: { activeKwh: number; laggingKvarh?: number; leadingKvarh?: number }): MadeMeter {
  const hourly = (energy: number | undefined): number[] => new Array(APRIL_HOURS).fill((energy ?? 0) / APRIL_HOURS);
  return madeMeter(
    {
      activeKw: hourly(energies.activeKwh),
      laggingKvar: hourly(energies.laggingKvarh),
      leadingKvar: hourly(energies.leadingKvarh),
    },
    { begin: '2024-04-01T00:00Z', intervalS: 3600 },
  );
}

/**
 * The bills of a meter under a tariff.
 * @param tariff the tariff
 * @param meter the meter
 * @param zone the site's zone, UTC where absent
 * @returns the bills, as of the record as metered
 */
export function billOf(tariff: Tariff, meter: MadeMeter, zone: ZoneTable = UTC_TABLE): Bill {
  return billYear(prepareTariff(tariff, meter.span, zone), meter.columns, true);
}

/**
 * The lines of a one-month bill made of some clauses.
 * @param clauses the clauses
 * @param meter one month's meter
 * @param rest of the tariff
 * @returns amounts by clause
 */
export function amountsOf(clauses: Clause[], meter: MadeMeter, rest: Tariff = {}): Record<string, number> {
  const bill = billOf({ ...rest, clauses }, meter);
  return Object.fromEntries(bill.months[0]!.lines.map(({ clause, amount }) => [clause, amount]));
}
