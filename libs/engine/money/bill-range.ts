import { BoxReadings } from './box-readings.js';
import {
  energyByFactorRange,
  energyRange,
  fixedRange,
  kvarhRange,
  percentRange,
  type RangedClause,
  type RangeGround,
  type RangeRun,
} from './clause-range.js';
import { contractedRange } from './contracted-clause.js';
import { demandRange, formulaClauseRange, kvarRange } from './demand-range.js';
import type { MeterBox } from './meter-box.js';
import type { Clause } from './papers.js';
import type { PreparedTariff } from './prepare-tariff.js';
import { exactly, plus, type Range, scaled } from './range.js';
import { roundAmount } from './round-amount.js';

/** A tariff made ready to bound the bills of meters that are known only to lie in a box. */
export interface RangedTariff {
  prepared: PreparedTariff;
  boxes: BoxReadings;
  clauses: RangedClause[];
  carriedRows: number;
}

/** Ends are moved out by this share before a line is rounded: sums in another order differ in their last bits. */
const SUM_WIDTH = 1e-9;

/**
 * Makes a prepared tariff ready for bounds.
 * @param prepared the tariff on its record
 * @returns the tariff with boxes for readings
 * @source derived: interval arithmetic over the clauses
 */
export function rangeTariff(prepared: PreparedTariff): RangedTariff {
  const boxes = new BoxReadings(prepared.ground.groupings);
  const ground: RangeGround = { ...prepared.ground, boxes, carriedRows: 0 };
  const clauses = prepared.clauses.map(({ clause }, k) => rangedClause(ground, clause, k));
  return { prepared, boxes, clauses, carriedRows: ground.carriedRows };
}

function rangedClause(ground: RangeGround, clause: Clause, k: number): RangedClause {
  const path = `tariff.clauses[${k}]`;
  switch (clause.kind) {
    case 'fixed':
      return fixedRange(clause);
    case 'energy':
      return energyRange(ground, clause, path);
    case 'energyByFactor':
      return energyByFactorRange(ground, clause);
    case 'kvarhBeyondRatio':
      return kvarhRange(ground, clause);
    case 'kvarBeyondRatio':
      return kvarRange(ground, clause);
    case 'demand':
      return demandRange(ground, clause, path);
    case 'contractedDemand':
      return contractedRange(ground, clause);
    case 'percent': {
      const earlier = (ground.tariff.clauses ?? []).slice(0, k).map(({ name }) => name);
      return percentRange(ground, clause, earlier);
    }
    case 'formula':
      return formulaClauseRange(ground, clause);
  }
}

/**
 * Between what and what each month's bill lies while the meter lies in a box.
 * @param ranged the tariff, ready for bounds
 * @param box the meter's ends, length n
 * @returns one range a month, tax included; infinite where a clause can't be bounded
 * @source derived: rounding and tax never fall with a line
 */
export function billRange(ranged: RangedTariff, box: MeterBox): Range[] {
  return billRangeOf(ranged, (m) => ranged.boxes.read(m, box));
}

/**
 * The same where somebody else fills the boxes.
 * @param ranged the tariff, ready for bounds
 * @param read fills the tariff's boxes for a month
 * @returns one range a month, tax included
 * @source derived
 */
export function billRangeOf(ranged: RangedTariff, read: (m: number) => void): Range[] {
  const { prepared } = ranged;
  const { months } = prepared.calendar;
  const carriedLow = new Float64Array(ranged.carriedRows * months.length);
  const carriedHigh = new Float64Array(ranged.carriedRows * months.length);
  return months.map((month, m) => {
    read(m);
    const run: RangeRun = { m, month, months, carriedLow, carriedHigh, lines: [], billSoFar: exactly(0) };
    return monthRange(ranged, run);
  });
}

function monthRange(ranged: RangedTariff, run: RangeRun): Range {
  const { decimals, taxPct, clauses } = ranged.prepared;
  let taxable = exactly(0);
  for (const [k, { clause, holds }] of clauses.entries()) {
    const ready = ranged.clauses[k]!;
    const inMonth = holds(run.month.month);
    const formed = inMonth || ready.carries ? ready.range(run) : exactly(0);
    const line = inMonth ? roundedRange(formed, decimals) : exactly(0);
    run.lines.push(line);
    run.billSoFar = plus(run.billSoFar, line);
    if (clause.taxed !== false) taxable = plus(taxable, line);
  }
  return plus(run.billSoFar, roundedRange(scaled(taxable, taxPct / 100), decimals));
}

function roundedRange({ lo, hi }: Range, decimals: number | null): Range {
  const width = (value: number): number => SUM_WIDTH * (1 + Math.abs(value));
  return { lo: rounded(lo - width(lo), decimals), hi: rounded(hi + width(hi), decimals) };
}

function rounded(value: number, decimals: number | null): number {
  return Number.isFinite(value) ? roundAmount(value, decimals) : value;
}
