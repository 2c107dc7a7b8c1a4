import { QuantityRule } from './billed-quantity.js';
import { pricedParts, selectionOf } from './clause-ground.js';
import {
  type FactorRange,
  factorBox,
  pctOf,
  type RangedClause,
  type RangeGround,
  type RangeRun,
} from './clause-range.js';
import type { DemandBox } from './demand-box.js';
import { compileFormula } from './formula.js';
import { formulaRange } from './formula-range.js';
import type { DemandClause, FormulaClause, KvarBeyondRatioClause } from './papers.js';
import { exactly, plus, type Range, scaled, times } from './range.js';
import { scaleRange } from './scale-range.js';

/** A demand that is bounded by itself. */
interface RangedPart {
  box: DemandBox;
  factor: ((period: number) => FactorRange) | null;
  rule: QuantityRule;
  pricePerUnit: number;
}

/**
 * Bounds of a demand's price.
 * @param ground what bounds are made ready on
 * @param clause the clause
 * @param path its path, for a refusal
 * @returns its bounds
 * @source derived: every step from block means to the billed quantity rises with them
 */
export function demandRange(ground: RangeGround, clause: DemandClause, path: string): RangedClause {
  const per = clause.per ?? 'month';
  const pct = clause.scale === undefined ? null : scaleRange(clause.scale);
  const parts = pricedParts(ground, clause, path).map(
    ({ selection, pricePerUnit }): RangedPart => ({
      box: ground.boxes.demand(selection, per, clause.reactive ?? 'lagging', 'kva'),
      factor: pct === null ? null : factorBox(ground, selection, per),
      rule: new QuantityRule(clause, ground.carriedRows++),
      pricePerUnit,
    }),
  );
  const formed = (part: RangedPart, period: number): Range => {
    const plain = basisRange(part.box, period, clause);
    if (pct === null || part.factor === null) return plain;
    return times(plain, plus(exactly(1), scaled(pctOf(pct, part.factor(period)), 1 / 100)));
  };
  return { carries: clause.ratchet !== undefined, range: (run) => billedRange(parts, formed, run) };
}

/**
 * Bounds of a demand by its basis.
 * @param box the demand's ends
 * @param period index of the period
 * @param clause basis and share of the kVA
 * @returns its range
 * @source derived: each basis rises with kW and kVA
 */
export function basisRange(
  box: DemandBox,
  period: number,
  { basis, kvaShare = 0 }: Pick<DemandClause, 'basis' | 'kvaShare'>,
): Range {
  if (basis === 'kVA') return box.maxKva(period);
  const kw = box.maxKw(period);
  if (basis === 'kW') return kw;
  const kva = box.maxKva(period);
  return { lo: Math.max(kw.lo, kvaShare * kva.lo), hi: Math.max(kw.hi, kvaShare * kva.hi) };
}

/**
 * Bounds of the kvar beyond a share of the greatest kW.
 * @param ground what bounds are made ready on
 * @param clause the clause
 * @returns its bounds
 * @source derived
 */
export function kvarRange(ground: RangeGround, clause: KvarBeyondRatioClause): RangedClause {
  const basis = clause.reactive ?? 'lagging';
  const part: RangedPart = {
    box: ground.boxes.demand(selectionOf(ground, clause), clause.per ?? 'month', basis),
    factor: null,
    rule: new QuantityRule(clause, ground.carriedRows++),
    pricePerUnit: clause.pricePerUnit,
  };
  const formed = ({ box }: RangedPart, period: number): Range => {
    const kvar = clause.at === 'maxKw' ? box.kvarAtMaxKw(basis, period) : box.maxKvar(period);
    const beyond = plus(kvar, scaled(box.maxKw(period), -clause.ratio));
    return { lo: Math.max(beyond.lo, 0), hi: Math.max(beyond.hi, 0) };
  };
  return { carries: clause.ratchet !== undefined, range: (run) => billedRange([part], formed, run) };
}

function billedRange(
  parts: readonly RangedPart[],
  formed: (part: RangedPart, period: number) => Range,
  run: RangeRun,
): Range {
  let amount = exactly(0);
  for (const part of parts) {
    const low = { ...run, carried: run.carriedLow };
    const high = { ...run, carried: run.carriedHigh };
    const ratchet = { lo: part.rule.ratchet(low), hi: part.rule.ratchet(high) };
    const greatest = { lo: 0, hi: 0 };
    let billed = exactly(0);
    for (let period = 0; period < part.box.periods; period++) {
      const range = formed(part, period);
      const own = { lo: part.rule.own(range.lo), hi: part.rule.own(range.hi) };
      greatest.lo = Math.max(greatest.lo, own.lo);
      greatest.hi = Math.max(greatest.hi, own.hi);
      billed = plus(billed, { lo: part.rule.billed(own.lo, ratchet.lo), hi: part.rule.billed(own.hi, ratchet.hi) });
    }
    part.rule.keep(low, greatest.lo);
    part.rule.keep(high, greatest.hi);
    amount = plus(amount, scaled(billed, part.pricePerUnit));
  }
  return scaled(amount, run.month.coverage);
}

/**
 * Bounds of a formula's amount.
 * @param ground what bounds are made ready on
 * @param clause the clause
 * @returns its bounds
 * @source derived: interval arithmetic
 */
export function formulaClauseRange(ground: RangeGround, clause: FormulaClause): RangedClause {
  const windows = (ground.tariff.windows ?? []).map(({ name }) => name);
  const formula = compileFormula(clause.expression, windows);
  const quantities = new Map(formula.names.map((name) => [name, quantityRange(ground, clause, name)] as const));
  return {
    carries: false,
    range: (run) => formulaRange(formula.tree, (name) => quantities.get(name)!(run)),
  };
}

function quantityRange(ground: RangeGround, clause: FormulaClause, name: string): (run: RangeRun) => Range {
  const point = name.indexOf('.');
  const quantity = point < 0 ? name : name.slice(0, point);
  const selection =
    point < 0 ? selectionOf(ground, clause) : ground.masks.selection({ union: [name.slice(point + 1)], within: null });
  const energy = ground.boxes.energy(selection, 'month');
  const demand = (): DemandBox => ground.boxes.demand(selection, 'month', clause.reactive ?? 'lagging');
  switch (quantity) {
    case 'activeKwh':
      return () => energy.activeKwh(0);
    case 'laggingKvarh':
      return () => energy.reactiveKvarh('lagging', 0);
    case 'leadingKvarh':
      return () => energy.reactiveKvarh('leading', 0);
    case 'maxKw':
    case 'maxKva':
    case 'maxKvar': {
      const box = demand();
      return () => box[quantity](0);
    }
    case 'powerFactor': {
      const factor = factorBox(ground, selection, 'month');
      return () => orOne(factor(0));
    }
    case 'hours': {
      const { monthFrom } = selection;
      return ({ m }) => exactly(((monthFrom[m + 1]! - monthFrom[m]!) * ground.calendar.intervalS) / 3600);
    }
    case 'days': {
      const { sizes } = ground.groupings.days(selection);
      return ({ m }) => exactly(sizes[m]!.length);
    }
    case 'coverage':
      return ({ month }) => exactly(month.coverage);
    case 'month':
      return ({ month }) => exactly(month.month);
    default:
      return ({ billSoFar }) => billSoFar;
  }
}

function orOne({ factor, mayBeNone }: FactorRange): Range {
  if (factor === null) return exactly(1);
  return mayBeNone ? { lo: factor.lo, hi: Math.max(factor.hi, 1) } : factor;
}
