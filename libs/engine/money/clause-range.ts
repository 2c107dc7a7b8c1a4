import type { BoxReadings, EnergyBox } from './box-readings.js';
import { type ClauseGround, pricedParts, selectionOf } from './clause-ground.js';
import type { DemandBox } from './demand-box.js';
import { EXCESS_WIDTH_KVARH } from './energy-clauses.js';
import type { Period } from './grouping.js';
import type {
  EnergyByFactorClause,
  EnergyClause,
  FixedClause,
  KvarhBeyondRatioClause,
  PercentClause,
} from './papers.js';
import { around, exactly, plus, type Range, scaled, times } from './range.js';
import { roundAmount } from './round-amount.js';
import { scaleRange } from './scale-range.js';
import type { Selection } from './selection.js';
import type { TariffMonth } from './tariff-calendar.js';

/** One month of a bill's bounds while they are formed. */
export interface RangeRun {
  m: number;
  month: TariffMonth;
  months: readonly TariffMonth[];
  /** own quantities of earlier months, lower and upper ends, one row a carried part */
  carriedLow: Float64Array;
  carriedHigh: Float64Array;
  /** rounded lines so far */
  lines: Range[];
  billSoFar: Range;
}

/** A clause whose amount is bounded. */
export interface RangedClause {
  /** it keeps its quantity for later months */
  carries: boolean;
  /**
   * @param run the month, its boxes formed
   * @returns where the amount lies before rounding
   */
  range(run: RangeRun): Range;
}

/** What bounds are made ready on: the tariff's own ground with boxes for readings. */
export interface RangeGround extends Omit<ClauseGround, 'readings'> {
  boxes: BoxReadings;
}

/**
 * A fixed amount is known.
 * @param clause the clause
 * @returns its bounds
 * @source method-money
 */
export function fixedRange(clause: FixedClause): RangedClause {
  return { carries: false, range: ({ month }) => exactly(clause.amountPerMonth * month.coverage) };
}

/**
 * Bounds of an energy's price: a sum of slices, each rising with the energy.
 * @param ground what bounds are made ready on
 * @param clause the clause
 * @param path its path, for a refusal
 * @returns its bounds
 * @source derived: every slice rises with the energy and is bounded apart
 */
export function energyRange(ground: RangeGround, clause: EnergyClause, path: string): RangedClause {
  const parts = pricedParts(ground, clause, path).map(({ selection, pricePerUnit }) => ({
    box: ground.boxes.energy(selection, clause.per ?? 'month', clause.of === 'kVAh' ? 'reactive' : 'active'),
    blocks: clause.blocks ?? [{ upTo: null, pricePerUnit }],
  }));
  const energyOf = (box: EnergyBox, period: number): Range => {
    const active = box.activeKwh(period);
    if (clause.of !== 'kVAh') return active;
    return lengthRange(active, box.reactiveKvarh(clause.reactive ?? 'lagging', period));
  };
  return {
    carries: false,
    range: ({ month }) => {
      let amount = exactly(0);
      for (const { box, blocks } of parts) {
        for (let period = 0; period < box.periods; period++) {
          const energy = energyOf(box, period);
          let begin = 0;
          for (const { upTo, pricePerUnit } of blocks) {
            const end = upTo === null ? Number.POSITIVE_INFINITY : upTo * month.coverage;
            const slice = (value: number): number => Math.max(Math.min(value, end) - begin, 0);
            amount = plus(amount, scaled({ lo: slice(energy.lo), hi: slice(energy.hi) }, pricePerUnit));
            begin = end;
          }
        }
      }
      return amount;
    },
  };
}

function lengthRange(a: Range, b: Range): Range {
  return { lo: Math.sqrt(a.lo * a.lo + b.lo * b.lo), hi: Math.sqrt(a.hi * a.hi + b.hi * b.hi) };
}

/**
 * Bounds of an energy taken by the per cent of its own power factor.
 * @param ground what bounds are made ready on
 * @param clause the clause
 * @returns its bounds
 * @source derived: λ falls with E_q and rises with E_p
 */
export function energyByFactorRange(ground: RangeGround, clause: EnergyByFactorClause): RangedClause {
  const box = ground.boxes.energy(selectionOf(ground, clause), clause.per ?? 'month');
  const pct = scaleRange(clause.scale);
  return {
    carries: false,
    range: () => {
      let quantity = exactly(0);
      for (let period = 0; period < box.periods; period++) {
        const active = box.activeKwh(period);
        const pcts = pctOf(pct, factorRange(active, box.reactiveKvarh(clause.reactive ?? 'lagging', period)));
        quantity = plus(quantity, times(active, pcts));
      }
      return scaled(quantity, clause.pricePerUnit / 100);
    },
  };
}

/** A power factor's range, and whether there may be none because no energy flowed. */
export interface FactorRange {
  factor: Range | null;
  mayBeNone: boolean;
}

/**
 * Where λ = P/√(P² + Q²) lies.
 * @param active P or E_p, its range ≥ 0
 * @param reactive Q or E_q, its range ≥ 0
 * @returns its range, null where there is none for certain
 * @source derived: λ falls with Q and rises with P
 */
export function factorRange(active: Range, reactive: Range): FactorRange {
  if (active.hi <= 0) return { factor: null, mayBeNone: true };
  const at = (p: number, q: number): number => (p <= 0 ? 0 : p / Math.sqrt(p * p + q * q));
  return { factor: { lo: at(active.lo, reactive.hi), hi: at(active.hi, reactive.lo) }, mayBeNone: active.lo <= 0 };
}

/**
 * Per cent over a power factor's range; 0 is among it where there may be no power factor.
 * @param pct the scale
 * @param of the factor's range
 * @returns per cent [%]
 */
export function pctOf(pct: (factor: Range) => Range, of: FactorRange): Range {
  if (of.factor === null) return exactly(0);
  const range = pct(of.factor);
  return of.mayBeNone ? { lo: Math.min(range.lo, 0), hi: Math.max(range.hi, 0) } : range;
}

/**
 * Bounds of reactive energy beyond a share of the active: slice by slice, or the whole excess at the prices of the tiers
 * it may have passed.
 * @param ground what bounds are made ready on
 * @param clause the clause
 * @returns its bounds
 * @source derived: a slice rises with E_q; in E_p it rises, then falls, so its least stands at an end
 */
export function kvarhRange(ground: RangeGround, clause: KvarhBeyondRatioClause): RangedClause {
  const tiers = clause.tiers ?? [{ aboveRatio: clause.freeRatio ?? 0, pricePerUnit: clause.pricePerUnit ?? 0 }];
  const selections =
    clause.byWindow === true
      ? (clause.windows ?? []).map((window) => ground.masks.selection({ union: [window], within: null }))
      : [selectionOf(ground, clause)];
  const boxes = selections.map((selection) => ground.boxes.energy(selection, clause.per ?? 'month'));
  const excess = clause.cumulative === false ? wholeExcess : slicedExcess;
  return {
    carries: false,
    range: () => {
      let amount = exactly(0);
      for (const box of boxes) {
        for (let period = 0; period < box.periods; period++) {
          const reactive = box.reactiveKvarh(clause.reactive ?? 'lagging', period);
          amount = plus(amount, excess(tiers, reactive, box.activeKwh(period)));
        }
      }
      return amount;
    },
  };
}

type Tiers = readonly { aboveRatio: number; pricePerUnit: number }[];

function slicedExcess(tiers: Tiers, q: Range, p: Range): Range {
  let amount = exactly(0);
  for (const [k, { aboveRatio, pricePerUnit }] of tiers.entries()) {
    const next = tiers[k + 1]?.aboveRatio ?? Number.POSITIVE_INFINITY;
    const slice = (kvarh: number, kwh: number): number => {
      const top = next === Number.POSITIVE_INFINITY ? kvarh : Math.min(kvarh, next * kwh);
      return Math.max(top - aboveRatio * kwh, 0);
    };
    // the peak over E_p stands where E_q just fills the slice
    const peak = Math.min(Math.max(q.hi / next, p.lo), p.hi);
    const slices = {
      lo: Math.min(slice(q.lo, p.lo), slice(q.lo, p.hi)),
      hi: Math.max(slice(q.hi, p.lo), slice(q.hi, p.hi), slice(q.hi, peak)),
    };
    // an excess too small to count is none
    if (k === 0 && slices.lo <= EXCESS_WIDTH_KVARH) slices.lo = 0;
    amount = plus(amount, scaled(slices, pricePerUnit));
  }
  return amount;
}

function wholeExcess(tiers: Tiers, q: Range, p: Range): Range {
  const first = tiers[0]!.aboveRatio;
  const found: Range[] = [];
  for (const [k, { aboveRatio, pricePerUnit }] of tiers.entries()) {
    const next = tiers[k + 1];
    const topKvarh = next === undefined ? Number.POSITIVE_INFINITY : next.aboveRatio * p.hi + EXCESS_WIDTH_KVARH;
    // does any pair of the ranges end in this tier
    if (q.hi - aboveRatio * p.lo < 0 || q.lo > topKvarh) continue;
    const within = {
      lo: Math.max(q.lo, aboveRatio * p.lo) - first * p.hi,
      hi: Math.min(q.hi, topKvarh) - first * p.lo,
    };
    found.push(scaled({ lo: Math.max(within.lo, 0), hi: Math.max(within.hi, 0) }, pricePerUnit));
  }
  if (q.lo - first * p.hi <= EXCESS_WIDTH_KVARH) found.push(exactly(0));
  return around(...found.flatMap(({ lo, hi }) => [lo, hi]));
}

/**
 * Bounds of a percentage of earlier lines.
 * @param ground what bounds are made ready on
 * @param clause the clause
 * @param earlier names of the clauses before it
 * @returns its bounds
 * @source derived
 */
export function percentRange(ground: RangeGround, clause: PercentClause, earlier: readonly string[]): RangedClause {
  const factor = factorBox(ground, selectionOf(ground, clause), 'month');
  const pct = scaleRange(clause.scale);
  const applies =
    clause.applies === 'all' ? earlier.map((_, k) => k) : clause.applies.map((name) => earlier.indexOf(name));
  return {
    carries: false,
    range: (run) => {
      let base = exactly(0);
      for (const k of applies) base = plus(base, run.lines[k]!);
      return scaled(times(pctOf(pct, factor(0)), base), 1 / 100);
    },
  };
}

/**
 * The range of a power factor by the tariff's rule.
 * @param ground what bounds are made ready on
 * @param selection the intervals
 * @param per length of a period
 * @returns a function of the period
 */
export function factorBox(ground: RangeGround, selection: Selection, per: Period): (period: number) => FactorRange {
  const { basis, reactive, decimals } = ground.factor;
  const rounded = ({ factor, mayBeNone }: FactorRange): FactorRange => ({
    factor: factor && { lo: roundAmount(factor.lo, decimals), hi: roundAmount(Math.min(factor.hi, 1), decimals) },
    mayBeNone,
  });
  if (basis === 'energy') {
    const box = ground.boxes.energy(selection, per);
    return (period) => rounded(factorRange(box.activeKwh(period), box.reactiveKvarh(reactive, period)));
  }
  const box: DemandBox = ground.boxes.demand(selection, per, 'lagging');
  if (basis === 'atMaxKw') {
    return (period) => rounded(factorRange(box.maxKw(period), box.kvarAtMaxKw(reactive, period)));
  }
  return (period) => {
    const kw = box.maxKw(period);
    const kva = box.maxKva(period);
    if (kw.hi <= 0) return { factor: null, mayBeNone: true };
    const ratio = { lo: kw.lo / kva.hi, hi: kva.lo > 0 ? kw.hi / kva.lo : 1 };
    return rounded({ factor: ratio, mayBeNone: kw.lo <= 0 });
  };
}
