import type { Bank } from '../layout/bank.js';
import { effectiveKvar } from '../layout/stage.js';
import { type Bill, billYear } from '../money/bill.js';
import type { MeterColumns } from '../money/meter-columns.js';
import type { Clause, FactorRule, Tariff } from '../money/papers.js';
import { type PreparedTariff, prepareTariff } from '../money/prepare-tariff.js';
import { type Remark, remark } from '../problem.js';
import { tanFromPowerFactor } from '../quantity/power-factor.js';
import { monthSpan } from '../record/month-span.js';
import type { BillBounds } from '../requirement/bill-bounds.js';
import type { EstimateMoney } from './estimate-result.js';
import type { EstimateStudy } from './estimate-study.js';
import type { Site } from './site.js';

/** Demand block of the stand-in where the tariff names none [s]. */
const BLOCK_S = 900;
/** Quantities of a month that a bill holds; all others are null. */
const BILLED_NAMES: ReadonlySet<string> = new Set([
  'activeKwh',
  'laggingKvarh',
  'powerFactor',
  'hours',
  'days',
  'coverage',
]);

/** Bills of an estimate, or why there are none. */
export interface EstimatedBills {
  money: EstimateMoney | null;
  moneyRefused: Remark[];
  moneyAssumptions: Remark[];
}

/**
 * Bills before and after a bank where every clause depends on month totals that the bills hold. After the bank each
 * month's kvarh fall to the target's, by no more than the bank can give.
 * @param study site and estimated load
 * @param site validated site
 * @param bank the bank
 * @returns bills, or the reason why there are none; neither without a tariff
 * @source method-estimate, method-money
 */
export function estimateMoney(study: EstimateStudy, site: Site, bank: Bank): EstimatedBills {
  const { tariff } = site;
  if (tariff === undefined) return { money: null, moneyRefused: [], moneyAssumptions: [] };
  const blockS = tariff.demandS ?? BLOCK_S;
  const { months } = study.load;
  const names = unsupportedClauses(tariff, {
    hasMaxKw: (site.estimate?.bills ?? []).every((bill) => bill.maxKw !== undefined),
  });
  if (names.length > 0)
    return refused(remark('estimate.noBillsByClause', { clauses: names.join(', ') }, { path: 'tariff' }));
  const standIn = months.length === 0 || !consecutive(months) ? null : standInMeter(study, blockS);
  if (standIn === null) return refused(remark('estimate.noBillsByMonths', {}, { path: 'tariff' }));
  const prepared = prepareTariff({ ...tariff, demandS: blockS }, standIn.span, study.zone);
  const bankKvar = bank.groups.reduce((sum, g) => sum + g.count * effectiveKvar(g, study.site.nominalV), 0);
  const shares = months.map((month) => shareLeft(study, month, bankKvar));
  const after = standIn.columns.laggingKvar.map((kvar, i) => kvar * shares[standIn.ofInterval[i]!]!);
  const bills = {
    after: shownBill(prepared, { ...standIn.columns, laggingKvar: after }, false),
    before: shownBill(prepared, standIn.columns, true),
  };
  return {
    money: { bills },
    moneyRefused: [remark('estimate.noSaving', {}, { path: 'tariff' })],
    moneyAssumptions: [remark('estimate.billsAfter', {}, { path: 'tariff' })],
  };
}

function refused(why: Remark): EstimatedBills {
  return { money: null, moneyRefused: [why], moneyAssumptions: [] };
}

interface Held {
  hasMaxKw: boolean;
}

function unsupportedClauses({ clauses = [], factor }: Tariff, held: Held): string[] {
  return clauses.filter((clause) => !dependsOnTotals(clause, factor, held)).map(({ name }) => name);
}

function dependsOnTotals(clause: Clause, factor: FactorRule | undefined, held: Held): boolean {
  const whole = clause.windows === undefined && (clause.per ?? 'month') === 'month';
  const lagging = (clause.reactive ?? 'lagging') === 'lagging';
  const byEnergy = (factor?.basis ?? 'energy') === 'energy' && (factor?.reactive ?? 'lagging') === 'lagging';
  if (!whole || !lagging) return false;
  switch (clause.kind) {
    case 'fixed':
    case 'energyByFactor':
      return true;
    case 'energy':
      return (clause.of ?? 'kWh') === 'kWh' && clause.prices === undefined;
    case 'kvarhBeyondRatio':
      return clause.byWindow !== true;
    case 'kvarBeyondRatio':
      return false;
    case 'demand':
      return (
        clause.basis === 'kW' &&
        clause.prices === undefined &&
        held.hasMaxKw &&
        (clause.scale === undefined || byEnergy)
      );
    case 'contractedDemand':
      return clause.basis === 'kW' && held.hasMaxKw;
    case 'percent':
      return byEnergy;
    case 'formula':
      return byEnergy && heldByBills(clause.expression, held);
  }
}

// A window's quantity has a point in its name.
function heldByBills(expression: string, { hasMaxKw }: Held): boolean {
  if (/leadingKvarh|maxKva\b|maxKvar|[A-Za-z]\./.test(expression)) return false;
  return hasMaxKw || !expression.includes('maxKw');
}

function consecutive(months: readonly BillBounds[]): boolean {
  const at = months.map(({ month }) => 12 * Number(month.slice(0, 4)) + Number(month.slice(5)));
  return at.every((count, k) => k === 0 || count === at[k - 1]! + 1);
}

// What is left of a month's kvarh: the target's, or what the bank can't take off.
function shareLeft({ site }: EstimateStudy, month: BillBounds, bankKvar: number): number {
  const addedKvar = site.recordedBank.state === 'fixed' ? site.recordedBank.kvar : 0;
  const { hours, activeKwh, laggingKvarh } = month;
  if (laggingKvarh === 0) return 1;
  const loadKvarh = laggingKvarh + addedKvar * hours;
  const beyond = Math.max(0, loadKvarh - activeKwh * tanFromPowerFactor(site.targetPowerFactor));
  return (loadKvarh - Math.min(bankKvar * hours, beyond)) / laggingKvarh;
}

interface StandIn {
  span: { intervalS: number; beginS: Float64Array; firstS: number; endS: number };
  columns: MeterColumns;
  /** month of each interval, an index */
  ofInterval: Uint16Array;
}

/**
 * A meter with the totals of the bills and nothing else: one block at the month's greatest demand, the rest level. Only
 * what depends on the totals may be priced on it. Null where no whole number of blocks fits, or one block holds more than
 * the month.
 */
function standInMeter({ load, zone }: EstimateStudy, blockS: number): StandIn | null {
  const beginS: number[] = [];
  const activeKw: number[] = [];
  const laggingKvar: number[] = [];
  const ofInterval: number[] = [];
  for (const [m, bill] of load.months.entries()) {
    const span = monthSpan(zone, Number(bill.month.slice(0, 4)), Number(bill.month.slice(5)));
    const blocks = (span.endS - span.beginS) / blockS;
    const peakKw = Math.max(bill.maxKw, bill.meanKw);
    const restKw = (bill.meanKw * blocks - peakKw) / (blocks - 1);
    if (!Number.isInteger(blocks) || blocks < 2 || restKw < 0) return null;
    for (let k = 0; k < blocks; k++) {
      beginS.push(span.beginS + k * blockS);
      activeKw.push(k === 0 ? peakKw : restKw);
      laggingKvar.push(bill.meanKvar);
      ofInterval.push(m);
    }
  }
  return {
    span: { intervalS: blockS, beginS: Float64Array.from(beginS), firstS: beginS[0]!, endS: beginS.at(-1)! + blockS },
    columns: {
      activeKw: Float64Array.from(activeKw),
      laggingKvar: Float64Array.from(laggingKvar),
      leadingKvar: new Float64Array(beginS.length),
    },
    ofInterval: Uint16Array.from(ofInterval),
  };
}

// Quantities the stand-in only makes up are not shown.
function shownBill(prepared: PreparedTariff, columns: MeterColumns, isReal: boolean): Bill {
  const bill = billYear(prepared, columns, isReal);
  const months = bill.months.map((month) => ({
    ...month,
    quantities: Object.fromEntries(
      Object.entries(month.quantities).map(([name, value]) => [name, BILLED_NAMES.has(name) ? value : null]),
    ),
  }));
  return { ...bill, months };
}
