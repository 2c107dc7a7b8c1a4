import { InputProblem } from '../problem.js';
import type { ZoneTable } from '../record/zone-table.js';
import { type ClauseGround, type MonthRun, type ReadyClause } from './clause-ground.js';
import { contractedClause } from './contracted-clause.js';
import { demandClause, kvarClause } from './demand-clauses.js';
import { formulaClause, percentClause, quantityOf } from './derived-clauses.js';
import { energyByFactorClause, energyClause, fixedClause, kvarhClause } from './energy-clauses.js';
import { WINDOWED_NAMES } from './formula.js';
import { Groupings } from './grouping.js';
import type { MeterColumns } from './meter-columns.js';
import type { Clause, Tariff } from './papers.js';
import { powerFactorBy, settleFactorRule } from './power-factor-rule.js';
import { ALWAYS, WindowMasks } from './selection.js';
import { type RecordSpan, type TariffCalendar, tariffCalendar } from './tariff-calendar.js';
import { TariffReadings } from './tariff-readings.js';

/** A clause with what prices it. */
export interface PreparedClause {
  clause: Clause;
  ready: ReadyClause;
  /** does it hold in a calendar month, 1 … 12 */
  holds(month: number): boolean;
}

/** A tariff on a record's calendar: everything about its bills that does not depend on the bank. */
export interface PreparedTariff {
  tariff: Tariff;
  calendar: TariffCalendar;
  /** decimals of a line, or null */
  decimals: number | null;
  taxPct: number;
  demandS: number;
  readings: TariffReadings;
  clauses: PreparedClause[];
  /** rows of quantities that months hand on to later ones */
  carriedRows: number;
  /** rounded lines of the month being formed */
  amounts: Float64Array;
  ground: ClauseGround;
}

const DECIMALS = 2;

/**
 * Puts a tariff on a record's calendar: months, windows, demand blocks and periods found once for every bank that is
 * priced on it.
 * @param tariff the tariff, as the site file's schema leaves it
 * @param span the record's times
 * @param zone the site's zone over the record and the months it touches
 * @returns the tariff, ready to price meters
 * @throws InputProblem naming the clause where the tariff does not fit the record, or a formula can't be used
 * @source method-money
 */
export function prepareTariff(tariff: Tariff, span: RecordSpan, zone: ZoneTable): PreparedTariff {
  const demandS = tariff.demandS ?? span.intervalS;
  if (demandS < span.intervalS || demandS % span.intervalS !== 0) throw wrongDemand(demandS, span.intervalS);
  const calendar = tariffCalendar(span, zone, tariff.holidays ?? []);
  const groupings = new Groupings(calendar, demandS);
  const ground: ClauseGround = {
    tariff,
    calendar,
    masks: new WindowMasks(calendar, tariff.windows ?? []),
    groupings,
    readings: new TariffReadings(groupings),
    factor: settleFactorRule(tariff.factor),
    carriedRows: 0,
  };
  const clauses = (tariff.clauses ?? []).map((clause, k) => prepareClause(ground, clause, k));
  return {
    tariff,
    calendar,
    decimals: tariff.decimals === undefined ? DECIMALS : tariff.decimals,
    taxPct: tariff.taxPct ?? 0,
    demandS,
    readings: ground.readings,
    clauses,
    carriedRows: ground.carriedRows,
    amounts: new Float64Array(clauses.length),
    ground,
  };
}

function wrongDemand(demandS: number, intervalS: number): InputProblem {
  return new InputProblem([
    {
      code: 'inconsistent',
      path: 'tariff.demandS',
      expected: `a multiple of the record's interval, ${intervalS}`,
      found: `${demandS}`,
      unit: 's',
    },
  ]);
}

function prepareClause(ground: ClauseGround, clause: Clause, k: number): PreparedClause {
  const { months } = clause;
  return {
    clause,
    ready: readyClause(ground, clause, k),
    holds: (month) => months === undefined || months.includes(month),
  };
}

function readyClause(ground: ClauseGround, clause: Clause, k: number): ReadyClause {
  const path = `tariff.clauses[${k}]`;
  switch (clause.kind) {
    case 'fixed':
      return fixedClause(clause);
    case 'energy':
      return energyClause(ground, clause, path);
    case 'energyByFactor':
      return energyByFactorClause(ground, clause);
    case 'kvarhBeyondRatio':
      return kvarhClause(ground, clause);
    case 'kvarBeyondRatio':
      return kvarClause(ground, clause);
    case 'demand':
      return demandClause(ground, clause, path);
    case 'contractedDemand':
      return contractedClause(ground, clause);
    case 'percent': {
      const earlier = (ground.tariff.clauses ?? []).slice(0, k).map(({ name }) => name);
      return percentClause(ground, clause, earlier);
    }
    case 'formula':
      return formulaClause(ground, clause, path);
  }
}

/**
 * The named quantities of a month, for the bill that is shown: those of a formula but month and the bill so far, the
 * powers and energies also by window.
 * @param prepared the tariff on its record
 * @returns a function of the month and the meter
 * @source method-money
 */
export function tariffQuantities(
  prepared: PreparedTariff,
): (run: MonthRun, columns: MeterColumns) => Record<string, number | null> {
  // Readings of their own: what is only shown must not slow down what is priced a thousand times.
  const readings = new TariffReadings(prepared.ground.groupings);
  const ground: ClauseGround = { ...prepared.ground, readings };
  const all = ground.masks.selection(ALWAYS);
  const meant = { selection: all, basis: 'lagging' } as const;
  const windows = (prepared.tariff.windows ?? []).map(({ name }) => name);
  const names = [
    ...WINDOWED_NAMES,
    ...['hours', 'days', 'coverage'],
    ...WINDOWED_NAMES.flatMap((name) => windows.map((window) => `${name}.${window}`)),
  ];
  const quantities = names.map((name) => [name, quantityOf(ground, meant, name)] as const);
  const factor = { energy: readings.energy(all, 'month'), demand: readings.demand(all, 'month', 'lagging') };
  return (run, columns) => {
    readings.read(run.m, columns);
    const found: Record<string, number | null> = {};
    for (const [name, quantity] of quantities) {
      found[name] = quantity(run);
      if (name === 'maxKvar') found.powerFactor = powerFactorBy(ground.factor, factor, 0);
    }
    return found;
  };
}
