import { QuantityRule } from './billed-quantity.js';
import { selectionOf } from './clause-ground.js';
import { contractedParts } from './contracted-clause.js';
import { DEMAND_BASES } from './demand-clauses.js';
import type { MeterColumns } from './meter-columns.js';
import type { ContractedDemandClause } from './papers.js';
import type { PreparedTariff } from './prepare-tariff.js';
import { roundAmount } from './round-amount.js';
import type { TariffMonth } from './tariff-calendar.js';

/** What a contracted demand costs as it is, and with the value that would cost least. */
export interface ContractCost {
  /** over the record's months, without tax */
  amount: number;
  /** contracted value of the least amount; of several the greatest */
  proposed: number;
  amountProposed: number;
}

/** A contracted demand before and after the bank. */
export interface ContractAdvice {
  clause: string;
  unit: string;
  contracted: number;
  before: ContractCost;
  after: ContractCost;
}

/** Amounts this near are equal. */
const NEAR_AMOUNT = 0.005;

/**
 * The contracted values that would have cost least over the record, before the bank and after it. The bills themselves
 * keep the value that is contracted.
 * @param prepared the tariff on its record
 * @param before the meter as metered, length n
 * @param after the meter after the bank, length n
 * @returns one entry a clause of contracted demand
 * @source derived: the amount is straight between the values at which a month's billing changes, so its least stands at one
 */
export function contractAdvice(prepared: PreparedTariff, before: MeterColumns, after: MeterColumns): ContractAdvice[] {
  return prepared.clauses.flatMap(({ clause, ready, holds }) => {
    if (clause.kind !== 'contractedDemand') return [];
    const cost = (columns: MeterColumns): ContractCost =>
      leastCost(prepared, clause, demands(prepared, clause, { columns, holds }));
    const { name, contracted } = clause;
    return [{ clause: name, unit: ready.unit, contracted, before: cost(before), after: cost(after) }];
  });
}

interface MonthDemand {
  own: number;
  month: TariffMonth;
}

function demands(
  prepared: PreparedTariff,
  clause: ContractedDemandClause,
  { columns, holds }: { columns: MeterColumns; holds(month: number): boolean },
): MonthDemand[] {
  const { ground, readings, calendar } = prepared;
  const demand = readings.demand(selectionOf(ground, clause), 'month', clause.reactive ?? 'lagging');
  const rule = new QuantityRule(clause.wholeUnits === undefined ? {} : { wholeUnits: clause.wholeUnits }, 0);
  return calendar.months.flatMap((month, m) => {
    if (!holds(month.month)) return [];
    readings.read(m, columns);
    return [{ own: rule.own(DEMAND_BASES[clause.basis].of(demand, 0, clause.kvaShare ?? 0)), month }];
  });
}

function leastCost(
  prepared: PreparedTariff,
  clause: ContractedDemandClause,
  months: readonly MonthDemand[],
): ContractCost {
  const amountAt = (contracted: number): number =>
    months.reduce((sum, { own, month }) => {
      const { base, overrun } = contractedParts(clause, own, contracted);
      const formed = (base * clause.pricePerUnit + overrun * clause.overrunPricePerUnit) * month.coverage;
      return sum + roundAmount(formed, prepared.decimals);
    }, 0);
  const least = { contracted: clause.contracted, amount: amountAt(clause.contracted) };
  const { amount } = least;
  const tolerated = 1 + (clause.tolerancePct ?? 0) / 100;
  const share = (clause.leastPct ?? 100) / 100;
  const values = months.flatMap(({ own }) => [own, own / tolerated, ...(share > 0 ? [own / share] : [])]);
  for (const contracted of values.sort((a, b) => b - a)) {
    const found = amountAt(contracted);
    if (found < least.amount - NEAR_AMOUNT) Object.assign(least, { contracted, amount: found });
  }
  return { amount, proposed: least.contracted, amountProposed: least.amount };
}
