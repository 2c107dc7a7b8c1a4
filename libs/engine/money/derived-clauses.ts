import { InputProblem } from '../problem.js';
import { type ClauseGround, factorReadings, type MonthRun, type ReadyClause, selectionOf } from './clause-ground.js';
import { compileFormula, type Formula, formulaWorking } from './formula.js';
import { FormulaFault } from './formula-tokens.js';
import type { FormulaClause, PercentClause, ReactiveBasis } from './papers.js';
import { powerFactorBy } from './power-factor-rule.js';
import { scalePct } from './scale.js';
import type { Selection } from './selection.js';
import { bracketed, put } from './working.js';

/**
 * A percentage, by the power factor, of earlier lines as they were rounded.
 * @param ground what the tariff's clauses are made ready on
 * @param clause the clause
 * @param earlier names of the clauses before it
 * @returns it, ready
 * @source method-money
 */
export function percentClause(ground: ClauseGround, clause: PercentClause, earlier: readonly string[]): ReadyClause {
  const selection = selectionOf(ground, clause);
  const readings = factorReadings(ground, selection, 'month');
  const pct = scalePct(clause.scale);
  const applies =
    clause.applies === 'all' ? earlier.map((_, k) => k) : clause.applies.map((name) => earlier.indexOf(name));
  return {
    unit: '%',
    carries: false,
    price(run) {
      let base = 0;
      for (const k of applies) base += run.amounts[k]!;
      run.quantity = pct(powerFactorBy(ground.factor, readings, 0));
      if (run.say) {
        const terms = applies.length === 0 ? ['0'] : applies.map((k) => put(run.amounts[k]!));
        run.working = `${put(run.quantity)} / 100 · ${bracketed(terms)}`;
      }
      return (run.quantity / 100) * base;
    },
  };
}

/**
 * An amount by a formula over the month's quantities.
 * @param ground what the tariff's clauses are made ready on
 * @param clause the clause
 * @param path its path, for a refusal
 * @returns it, ready
 * @throws InputProblem where the formula can't be read or uses an unknown name
 * @source method-money
 */
export function formulaClause(ground: ClauseGround, clause: FormulaClause, path: string): ReadyClause {
  const formula = readExpression(ground, clause, path);
  const selection = selectionOf(ground, clause);
  const meant = { selection, basis: clause.reactive ?? 'lagging' } as const;
  const quantities = formula.names.map((name) => quantityOf(ground, meant, name));
  const values = new Float64Array(quantities.length);
  return {
    unit: '',
    carries: false,
    price(run) {
      for (let k = 0; k < quantities.length; k++) values[k] = quantities[k]!(run);
      run.quantity = formula.evaluate(values);
      if (run.say) run.working = formulaWorking(formula, values);
      return run.quantity;
    },
  };
}

function readExpression(ground: ClauseGround, clause: FormulaClause, path: string): Formula {
  const windows = (ground.tariff.windows ?? []).map(({ name }) => name);
  try {
    return compileFormula(clause.expression, windows);
  } catch (fault) {
    if (!(fault instanceof FormulaFault)) throw fault;
    const code = ({ unreadable: 'unreadable', 'unknown-name': 'inconsistent', 'too-large': 'too-large' } as const)[
      fault.kind
    ];
    throw new InputProblem([{ code, path: `${path}.expression`, expected: fault.expected, found: fault.found }]);
  }
}

/**
 * Reads a named quantity of a month: of the given intervals, or, with a window's name after a point, of that window's.
 * @param ground what the tariff's clauses are made ready on
 * @param meant the intervals of a name without a window, and the kvar that `maxKvar` looks at
 * @param name one of section 4's names
 * @returns the value in the month of a run
 * @source method-money
 */
export function quantityOf(
  ground: ClauseGround,
  meant: { selection: Selection; basis: ReactiveBasis },
  name: string,
): (run: MonthRun) => number {
  const point = name.indexOf('.');
  const quantity = point < 0 ? name : name.slice(0, point);
  const chosen = point < 0 ? meant.selection : ground.masks.selection({ union: [name.slice(point + 1)], within: null });
  const energy = ground.readings.energy(chosen, 'month');
  const demand = () => ground.readings.demand(chosen, 'month', meant.basis);
  switch (quantity) {
    case 'activeKwh':
      return () => energy.activeKwh(0);
    case 'laggingKvarh':
      return () => energy.laggingKvarh(0);
    case 'leadingKvarh':
      return () => energy.leadingKvarh(0);
    case 'maxKw':
    case 'maxKva':
    case 'maxKvar': {
      const reading = demand();
      return () => reading[quantity](0);
    }
    case 'powerFactor': {
      const readings = factorReadings(ground, chosen, 'month');
      return () => powerFactorBy(ground.factor, readings, 0) ?? 1;
    }
    default:
      return calendarQuantity(ground, chosen, quantity);
  }
}

function calendarQuantity(ground: ClauseGround, selection: Selection, quantity: string): (run: MonthRun) => number {
  switch (quantity) {
    case 'hours':
      return ({ m }) => ((selection.monthFrom[m + 1]! - selection.monthFrom[m]!) * ground.calendar.intervalS) / 3600;
    case 'days': {
      const { sizes } = ground.groupings.days(selection);
      return ({ m }) => sizes[m]!.length;
    }
    case 'coverage':
      return ({ month }) => month.coverage;
    case 'month':
      return ({ month }) => month.month;
    case 'billSoFar':
      return (run) => run.billSoFar;
    default:
      throw new Error(`no quantity of the name ${quantity}`);
  }
}
