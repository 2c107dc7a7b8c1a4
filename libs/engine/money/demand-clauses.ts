import { QuantityRule } from './billed-quantity.js';
import {
  type ClauseGround,
  factorReadings,
  type MonthRun,
  pricedParts,
  type ReadyClause,
  selectionOf,
} from './clause-ground.js';
import type { DemandReading } from './demand-reading.js';
import type { DemandClause, KvarBeyondRatioClause } from './papers.js';
import { type FactorReadings, powerFactorBy } from './power-factor-rule.js';
import { scalePct } from './scale.js';
import { bracketed, product, put, sum } from './working.js';

/** A demand that is formed, billed and priced by itself. */
interface DemandPart {
  demand: DemandReading;
  factor: FactorReadings | null;
  rule: QuantityRule;
  pricePerUnit: number;
}

/** How a clause forms its quantity in a period, and says so. */
interface Formed {
  quantity(part: DemandPart, period: number): number;
  words(part: DemandPart, period: number): string;
}

/**
 * Greatest demand times a price: kW, kVA, or kW but at least a share of the kVA; by a scale of the power factor; whole
 * units, minimum and ratchet; by the share of the month that is covered.
 * @param ground what the tariff's clauses are made ready on
 * @param clause the clause
 * @param path its path, for a refusal
 * @returns it, ready
 * @throws InputProblem where priced windows don't share out its intervals
 * @source method-money
 */
export function demandClause(ground: ClauseGround, clause: DemandClause, path: string): ReadyClause {
  const per = clause.per ?? 'month';
  const pct = clause.scale === undefined ? null : scalePct(clause.scale);
  const parts = pricedParts(ground, clause, path).map(
    ({ selection, pricePerUnit }): DemandPart => ({
      demand: ground.readings.demand(selection, per, clause.reactive ?? 'lagging'),
      factor: pct === null ? null : factorReadings(ground, selection, per),
      rule: new QuantityRule(clause, ground.carriedRows++),
      pricePerUnit,
    }),
  );
  const pctOf = (part: DemandPart, period: number): number =>
    pct === null || part.factor === null ? 0 : pct(powerFactorBy(ground.factor, part.factor, period));
  const basis = DEMAND_BASES[clause.basis];
  const formed: Formed = {
    quantity: (part, period) => basis.of(part.demand, period, clause.kvaShare ?? 0) * (1 + pctOf(part, period) / 100),
    words: (part, period) => {
      const plain = basis.words(part.demand, period, clause.kvaShare ?? 0);
      return pct === null ? plain : `${plain} · (1 + ${put(pctOf(part, period))} / 100)`;
    },
  };
  return priced(parts, formed, { unit: basis.unit, carries: clause.ratchet !== undefined });
}

/** How each basis forms a quantity, and says so. */
export const DEMAND_BASES: Record<
  DemandClause['basis'],
  {
    unit: string;
    of(demand: DemandReading, period: number, kvaShare: number): number;
    words(demand: DemandReading, period: number, kvaShare: number): string;
  }
> = {
  kW: {
    unit: 'kW',
    of: (demand, period) => demand.maxKw(period),
    words: (demand, period) => put(demand.maxKw(period)),
  },
  kVA: {
    unit: 'kVA',
    of: (demand, period) => demand.maxKva(period),
    words: (demand, period) => put(demand.maxKva(period)),
  },
  kWOrKvaShare: {
    unit: 'kW',
    of: (demand, period, kvaShare) => Math.max(demand.maxKw(period), kvaShare * demand.maxKva(period)),
    words: (demand, period, kvaShare) =>
      `max(${put(demand.maxKw(period))}, ${product(kvaShare, demand.maxKva(period))})`,
  },
};

/**
 * kvar beyond a share of the greatest kW: k − ratio·maxKw, ≥ 0, k the greatest kvar or that of the block of greatest
 * kW; whole units, minimum and ratchet; by the share of the month that is covered.
 * @param ground what the tariff's clauses are made ready on
 * @param clause the clause
 * @returns it, ready
 * @source method-money
 */
export function kvarClause(ground: ClauseGround, clause: KvarBeyondRatioClause): ReadyClause {
  const basis = clause.reactive ?? 'lagging';
  const selection = selectionOf(ground, clause);
  const per = clause.per ?? 'month';
  const part: DemandPart = {
    demand: ground.readings.demand(selection, per, basis),
    factor: null,
    rule: new QuantityRule(clause, ground.carriedRows++),
    pricePerUnit: clause.pricePerUnit,
  };
  const kvar = (demand: DemandReading, period: number): number =>
    clause.at === 'maxKw' ? demand.kvarAtMaxKw(basis, period) : demand.maxKvar(period);
  const formed: Formed = {
    quantity: ({ demand }, period) => Math.max(kvar(demand, period) - clause.ratio * demand.maxKw(period), 0),
    words: ({ demand }, period) =>
      `max(${put(kvar(demand, period))} − ${product(clause.ratio, demand.maxKw(period))}, 0)`,
  };
  return priced([part], formed, { unit: 'kvar', carries: clause.ratchet !== undefined });
}

// Amounts of windows are added and the greatest quantity stands on the line; periods of a window are added in both.
function priced(parts: readonly DemandPart[], formed: Formed, line: { unit: string; carries: boolean }): ReadyClause {
  return {
    ...line,
    price(run) {
      let amount = 0;
      run.quantity = 0;
      for (const part of parts) {
        const billed = billedOf(part, formed, run);
        run.quantity = Math.max(run.quantity, billed);
        amount += billed * part.pricePerUnit;
      }
      if (run.say) {
        const terms = parts.map((part) => product(partWorking(part, formed, run), part.pricePerUnit));
        run.working = product(bracketed(terms), run.month.coverage);
      }
      return amount * run.month.coverage;
    },
  };
}

function billedOf(part: DemandPart, formed: Formed, run: MonthRun): number {
  const ratchet = part.rule.ratchet(run);
  let billed = 0;
  let greatest = 0;
  for (let period = 0; period < part.demand.periods; period++) {
    const own = part.rule.own(formed.quantity(part, period));
    greatest = Math.max(greatest, own);
    billed += part.rule.billed(own, ratchet);
  }
  part.rule.keep(run, greatest);
  return billed;
}

function partWorking(part: DemandPart, formed: Formed, run: MonthRun): string {
  if (part.demand.periods > 1) return put(billedOf(part, formed, run));
  return part.demand.periods === 0 ? sum([]) : part.rule.working(formed.words(part, 0), run);
}
