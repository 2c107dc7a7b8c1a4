import { QuantityRule } from './billed-quantity.js';
import { type ClauseGround, type ReadyClause, selectionOf } from './clause-ground.js';
import type { RangedClause, RangeGround } from './clause-range.js';
import { DEMAND_BASES } from './demand-clauses.js';
import { basisRange } from './demand-range.js';
import type { ContractedDemandClause } from './papers.js';
import { plus, type Range, scaled } from './range.js';
import { product, put } from './working.js';

/** A month's demand as a contract bills it. */
export interface ContractedParts {
  /** at the contract's price */
  base: number;
  /** at the price of an overrun */
  overrun: number;
}

/**
 * A month's demand by its contract: at its price what is drawn, but at least a share of the contracted value and at most
 * that value with its tolerance; beyond the tolerance an overrun.
 * @param clause the clause
 * @param own the month's own demand
 * @param contracted the contracted value, same unit
 * @returns both parts, same unit
 * @source method-money
 */
export function contractedParts(clause: ContractedDemandClause, own: number, contracted: number): ContractedParts {
  const tolerated = (1 + (clause.tolerancePct ?? 0) / 100) * contracted;
  const least = ((clause.leastPct ?? 100) / 100) * contracted;
  return { base: Math.max(least, Math.min(own, tolerated)), overrun: Math.max(own - tolerated, 0) };
}

/**
 * A contracted demand with its overrun; by the share of the month that is covered.
 * @param ground what the tariff's clauses are made ready on
 * @param clause the clause
 * @returns it, ready
 * @source method-money
 */
export function contractedClause(ground: ClauseGround, clause: ContractedDemandClause): ReadyClause {
  const demand = ground.readings.demand(selectionOf(ground, clause), 'month', clause.reactive ?? 'lagging');
  const basis = DEMAND_BASES[clause.basis];
  const rule = wholeUnitsOf(clause);
  return {
    unit: basis.unit,
    carries: false,
    price(run) {
      const own = rule.own(basis.of(demand, 0, clause.kvaShare ?? 0));
      const { base, overrun } = contractedParts(clause, own, clause.contracted);
      run.quantity = base + overrun;
      if (run.say) {
        const words = rule.working(basis.words(demand, 0, clause.kvaShare ?? 0), run);
        run.working = workingOf(clause, words, run.month.coverage);
      }
      return (base * clause.pricePerUnit + overrun * clause.overrunPricePerUnit) * run.month.coverage;
    },
  };
}

function workingOf(clause: ContractedDemandClause, own: string, coverage: number): string {
  const { contracted, pricePerUnit, overrunPricePerUnit, tolerancePct = 0, leastPct = 100 } = clause;
  const value = put(contracted);
  const tolerated = tolerancePct === 0 ? value : `(1 + ${put(tolerancePct)} / 100) · ${value}`;
  const least = leastPct === 100 ? value : `${put(leastPct)} / 100 · ${value}`;
  const base = `max(${least}, min(${own}, ${tolerated}))`;
  const overrun = `max(${own} − ${tolerated}, 0)`;
  return product(`(${product(base, pricePerUnit)} + ${product(overrun, overrunPricePerUnit)})`, coverage);
}

function wholeUnitsOf({ wholeUnits }: ContractedDemandClause): QuantityRule {
  return new QuantityRule(wholeUnits === undefined ? {} : { wholeUnits }, 0);
}

/**
 * Bounds of a contracted demand's price.
 * @param ground what bounds are made ready on
 * @param clause the clause
 * @returns its bounds
 * @source derived: both parts rise with the demand
 */
export function contractedRange(ground: RangeGround, clause: ContractedDemandClause): RangedClause {
  const box = ground.boxes.demand(selectionOf(ground, clause), 'month', clause.reactive ?? 'lagging', 'kva');
  const rule = wholeUnitsOf(clause);
  const part = (own: Range, name: keyof ContractedParts): Range => ({
    lo: contractedParts(clause, rule.own(own.lo), clause.contracted)[name],
    hi: contractedParts(clause, rule.own(own.hi), clause.contracted)[name],
  });
  return {
    carries: false,
    range: ({ month }) => {
      const own = basisRange(box, 0, clause);
      const base = scaled(part(own, 'base'), clause.pricePerUnit);
      return scaled(plus(base, scaled(part(own, 'overrun'), clause.overrunPricePerUnit)), month.coverage);
    },
  };
}
