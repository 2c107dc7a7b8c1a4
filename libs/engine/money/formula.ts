import { type FormulaPart, type Operation, readFormula } from './formula-tree.js';
import { roundAmount } from './round-amount.js';
import { put } from './working.js';

/** Quantities a formula may use, each also with a window's name after a point. */
export const WINDOWED_NAMES = ['activeKwh', 'laggingKvarh', 'leadingKvarh', 'maxKw', 'maxKva', 'maxKvar'] as const;
/** Quantities a formula may use as they are. */
export const MONTHLY_NAMES = ['powerFactor', 'hours', 'days', 'coverage', 'month', 'billSoFar'] as const;

/** A formula ready to be evaluated. */
export interface Formula {
  /** names it uses, each once, in the order of their values */
  names: string[];
  tree: FormulaPart;
  /**
   * @param values one for each of `names`
   * @returns the amount; not finite where the arithmetic has no value
   */
  evaluate(values: Float64Array): number;
}

/**
 * Reads a formula and closes it into a function; nothing of its text is ever run as code.
 * @param text the formula
 * @param windows names of the tariff's windows
 * @returns the formula
 * @throws FormulaFault where it can't be read or uses an unknown name
 * @source method-money
 */
export function compileFormula(text: string, windows: readonly string[]): Formula {
  const known = new Set<string>([...WINDOWED_NAMES, ...MONTHLY_NAMES]);
  for (const name of WINDOWED_NAMES) for (const window of windows) known.add(`${name}.${window}`);
  const tree = readFormula(text, known, windows);
  const names: string[] = [];
  return { names, tree, evaluate: closed(tree, names) };
}

type Evaluate = (values: Float64Array) => number;

function closed(part: FormulaPart, names: string[]): Evaluate {
  switch (part.kind) {
    case 'number': {
      const { value } = part;
      return () => value;
    }
    case 'name': {
      const slot = slotOf(part.name, names);
      return (values) => values[slot]!;
    }
    case 'minus': {
      const of = closed(part.of, names);
      return (values) => -of(values);
    }
    case 'operation': {
      const operate = OPERATIONS[part.sign];
      const left = closed(part.left, names);
      const right = closed(part.right, names);
      return (values) => operate(left(values), right(values));
    }
    case 'call':
      return closedCall(part, names);
  }
}

function slotOf(name: string, names: string[]): number {
  const known = names.indexOf(name);
  return known >= 0 ? known : names.push(name) - 1;
}

/** What each sign does with two values; a comparison gives 1 or 0. */
export const OPERATIONS: Record<Operation, (a: number, b: number) => number> = {
  '+': (a, b) => a + b,
  '-': (a, b) => a - b,
  '*': (a, b) => a * b,
  '/': (a, b) => a / b,
  '^': (a, b) => a ** b,
  '<': (a, b) => truth(a < b, a, b),
  '<=': (a, b) => truth(a <= b, a, b),
  '>': (a, b) => truth(a > b, a, b),
  '>=': (a, b) => truth(a >= b, a, b),
  '==': (a, b) => truth(a === b, a, b),
  '!=': (a, b) => truth(a !== b, a, b),
};

// What has no value is neither more nor less than anything.
function truth(holds: boolean, a: number, b: number): number {
  if (Number.isNaN(a) || Number.isNaN(b)) return Number.NaN;
  return holds ? 1 : 0;
}

function closedCall(part: Extract<FormulaPart, { kind: 'call' }>, names: string[]): Evaluate {
  const terms = part.terms.map((term) => closed(term, names));
  const [a, b, c] = terms as [Evaluate, Evaluate, Evaluate];
  switch (part.name) {
    case 'min':
      return (values) => terms.reduce((least, term) => Math.min(least, term(values)), Number.POSITIVE_INFINITY);
    case 'max':
      return (values) => terms.reduce((most, term) => Math.max(most, term(values)), Number.NEGATIVE_INFINITY);
    case 'abs':
      return (values) => Math.abs(a(values));
    case 'round':
      return (values) => roundTo(a(values), b === undefined ? 0 : b(values));
    case 'floor':
      return (values) => Math.floor(a(values));
    case 'ceil':
      return (values) => Math.ceil(a(values));
    case 'sqrt':
      return (values) => Math.sqrt(a(values));
    case 'if':
      return (values) => {
        const condition = a(values);
        if (Number.isNaN(condition)) return Number.NaN;
        return condition === 0 ? c(values) : b(values);
      };
  }
}

const MOST_DECIMALS = 15;

/**
 * Rounding in a formula: to whole decimals, −15 … 15; anything else has no value.
 * @param value what is rounded
 * @param decimals d
 * @returns rounded as a bill's lines are, or NaN
 * @source method-money
 */
export function roundTo(value: number, decimals: number): number {
  if (!Number.isInteger(decimals) || Math.abs(decimals) > MOST_DECIMALS) return Number.NaN;
  return roundAmount(value, decimals);
}

/**
 * A formula with the values put in.
 * @param formula the formula
 * @param values one for each of its names
 * @returns arithmetic, for example "max(512.3 − 100, 0) · 1.5"
 */
export function formulaWorking(formula: Formula, values: Float64Array): string {
  return written(formula.tree, (name) => put(values[formula.names.indexOf(name)]!), 0);
}

const STRENGTH: Record<Operation, number> = {
  '<': 1,
  '<=': 1,
  '>': 1,
  '>=': 1,
  '==': 1,
  '!=': 1,
  '+': 2,
  '-': 2,
  '*': 3,
  '/': 3,
  '^': 5,
};
const SHOWN: Partial<Record<Operation, string>> = { '-': '−', '*': '·' };
const MINUS_STRENGTH = 4;

function written(part: FormulaPart, value: (name: string) => string, within: number): string {
  switch (part.kind) {
    case 'number':
      return put(part.value);
    case 'name':
      return value(part.name);
    case 'minus': {
      const text = `−${written(part.of, value, MINUS_STRENGTH)}`;
      return within > 0 ? `(${text})` : text;
    }
    case 'operation': {
      const strength = STRENGTH[part.sign];
      const power = part.sign === '^';
      const left = written(part.left, value, power ? strength + 1 : strength);
      const right = written(part.right, value, power ? strength : strength + 1);
      const text = `${left} ${SHOWN[part.sign] ?? part.sign} ${right}`;
      return strength < within ? `(${text})` : text;
    }
    case 'call':
      return `${part.name}(${part.terms.map((term) => written(term, value, 0)).join(', ')})`;
  }
}
