import { InputProblem } from '../problem.js';
import type { MonthRun } from './clause-ground.js';
import type { MeterColumns } from './meter-columns.js';
import { type PreparedTariff, tariffQuantities } from './prepare-tariff.js';
import { roundAmount } from './round-amount.js';

/** One line of a month's bill. */
export interface BillLine {
  /** name of the clause */
  clause: string;
  quantity: number;
  unit: string;
  /** rounded as the tariff says */
  amount: number;
  /** the clause's arithmetic with the values put in */
  working: string;
}

/** The bill of one local calendar month. */
export interface BillMonth {
  /** "2024-02" */
  month: string;
  /** share of the month that the record covers */
  coverage: number;
  partial: boolean;
  /** named quantities of the month; those of a window have its name after a point */
  quantities: Record<string, number | null>;
  tax: number;
  total: number;
  /** a real bill's total, where the tariff gives one */
  billed: number | null;
  /** total less billed */
  difference: number | null;
  lines: BillLine[];
}

/** The bills of a record's months. */
export interface Bill {
  total: number;
  months: BillMonth[];
}

/**
 * Room for what the months of one bill hand on to each other; a bill is formed in the order of its months.
 * @param prepared the tariff on its record
 * @returns own quantities of past months, all 0
 */
export function newCarried(prepared: PreparedTariff): Float64Array {
  return new Float64Array(prepared.carriedRows * prepared.calendar.months.length);
}

/**
 * The total of one month's bill, tax included; earlier months have been formed with the same `carried`.
 * @param prepared the tariff on its record
 * @param m index of the month
 * @param columns what the meter reads, length n; only the month's own intervals are looked at
 * @param carried own quantities of past months; this month's are added
 * @returns the total in the site's currency
 * @throws InputProblem where a clause has no finite value
 * @source method-money
 */
export function billMonth(prepared: PreparedTariff, m: number, columns: MeterColumns, carried: Float64Array): number {
  return formMonth(beginRun(prepared, m, carried, false), prepared, columns, null).total;
}

/**
 * The totals of a record's bills, month by month, without workings.
 * @param prepared the tariff on its record
 * @param columns what the meter reads, length n
 * @returns totals in the site's currency
 * @throws InputProblem where a clause has no finite value
 * @source method-money
 */
export function billTotals(prepared: PreparedTariff, columns: MeterColumns): number[] {
  const carried = newCarried(prepared);
  return prepared.calendar.months.map((_, m) => billMonth(prepared, m, columns, carried));
}

/**
 * The bills of a record, each line with its working.
 * @param prepared the tariff on its record
 * @param columns what the meter reads, length n
 * @param isReal the record as metered, which a real bill may be held against
 * @returns the bills
 * @throws InputProblem where a clause has no finite value
 * @source method-money
 */
export function billYear(prepared: PreparedTariff, columns: MeterColumns, isReal: boolean): Bill {
  const carried = newCarried(prepared);
  const quantities = tariffQuantities(prepared);
  const months = prepared.calendar.months.map((month, m): BillMonth => {
    const run = beginRun(prepared, m, carried, true);
    const lines: BillLine[] = [];
    const { tax, total } = formMonth(run, prepared, columns, lines);
    const found = isReal ? prepared.tariff.billed?.find((bill) => bill.month === month.name) : undefined;
    return {
      month: month.name,
      coverage: month.coverage,
      partial: month.coverage < 1,
      quantities: quantities(run, columns),
      tax,
      total,
      billed: found?.total ?? null,
      difference: found === undefined ? null : roundAmount(total - found.total, prepared.decimals),
      lines,
    };
  });
  const total = months.reduce((sum, month) => sum + month.total, 0);
  return { total: roundAmount(total, prepared.decimals), months };
}

function beginRun(prepared: PreparedTariff, m: number, carried: Float64Array, say: boolean): MonthRun {
  const { months } = prepared.calendar;
  const amounts = prepared.amounts;
  return { m, month: months[m]!, months, carried, amounts, billSoFar: 0, say, quantity: 0, working: '' };
}

function formMonth(
  run: MonthRun,
  prepared: PreparedTariff,
  columns: MeterColumns,
  lines: BillLine[] | null,
): { tax: number; total: number } {
  const { clauses, decimals, taxPct } = prepared;
  prepared.readings.read(run.m, columns);
  let taxable = 0;
  for (let k = 0; k < clauses.length; k++) {
    const { clause, ready, holds } = clauses[k]!;
    const inMonth = holds(run.month.month);
    const formed = inMonth || ready.carries ? ready.price(run) : 0;
    const amount = inMonth ? roundAmount(formed, decimals) : 0;
    if (!Number.isFinite(amount)) throw notFinite(prepared, k, run, amount);
    run.amounts[k] = amount;
    run.billSoFar += amount;
    if (clause.taxed !== false) taxable += amount;
    lines?.push({
      clause: clause.name,
      quantity: inMonth ? run.quantity : 0,
      unit: ready.unit,
      amount,
      working: inMonth ? run.working : '0',
    });
  }
  const tax = roundAmount((taxPct / 100) * taxable, decimals);
  // Rounded lines add up to a rounded total; rounding again only takes the last bits of the sum away.
  return { tax, total: roundAmount(run.billSoFar + tax, decimals) };
}

function notFinite(prepared: PreparedTariff, k: number, run: MonthRun, amount: number): InputProblem {
  const { clause } = prepared.clauses[k]!;
  return new InputProblem([
    {
      code: 'not-finite',
      path: `tariff.clauses[${k}]${clause.kind === 'formula' ? '.expression' : ''}`,
      expected: `a finite amount of "${clause.name}" in every month`,
      found: `${amount} in ${run.month.name}`,
    },
  ]);
}
