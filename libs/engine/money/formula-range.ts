import { OPERATIONS, roundTo } from './formula.js';
import type { FormulaPart, Operation } from './formula-tree.js';
import { around, exactly, plus, type Range, scaled, through, times, UNKNOWN } from './range.js';

/**
 * Where a formula's value lies while each of its quantities lies within a range.
 * @param part the formula's tree
 * @param of range of each quantity
 * @returns its range; unknown where the arithmetic can't say
 * @source derived: interval arithmetic, part by part
 */
export function formulaRange(part: FormulaPart, of: (name: string) => Range): Range {
  switch (part.kind) {
    case 'number':
      return exactly(part.value);
    case 'name':
      return of(part.name);
    case 'minus':
      return scaled(formulaRange(part.of, of), -1);
    case 'operation':
      return operationRange(part.sign, formulaRange(part.left, of), formulaRange(part.right, of));
    case 'call':
      return callRange(part, of);
  }
}

function operationRange(sign: Operation, a: Range, b: Range): Range {
  switch (sign) {
    case '+':
      return known(plus(a, b));
    case '-':
      return known(plus(a, scaled(b, -1)));
    case '*':
      return known(times(a, b));
    case '/':
      return b.lo > 0 || b.hi < 0 ? known(times(a, { lo: 1 / b.hi, hi: 1 / b.lo })) : same(sign, a, b);
    case '^':
      return powerRange(a, b);
    default:
      return comparisonRange(sign, a, b);
  }
}

function same(sign: Operation, a: Range, b: Range): Range {
  if (a.lo !== a.hi || b.lo !== b.hi) return UNKNOWN;
  const value = OPERATIONS[sign](a.lo, b.lo);
  return Number.isFinite(value) ? exactly(value) : UNKNOWN;
}

function known(range: Range): Range {
  return Number.isNaN(range.lo) || Number.isNaN(range.hi) ? UNKNOWN : range;
}

// x^y of a base that is never negative is monotone in each of them apart, so the corners hold the extremes.
function powerRange(a: Range, b: Range): Range {
  if (a.lo > 0 || (a.lo === 0 && b.lo > 0)) {
    return known(around(a.lo ** b.lo, a.lo ** b.hi, a.hi ** b.lo, a.hi ** b.hi));
  }
  const whole = b.lo === b.hi && Number.isInteger(b.lo) && b.lo > 0;
  if (!whole) return same('^', a, b);
  const ends = around(a.lo ** b.lo, a.hi ** b.lo);
  return known(b.lo % 2 === 0 && a.lo < 0 && a.hi > 0 ? { lo: 0, hi: ends.hi } : ends);
}

const EITHER: Range = { lo: 0, hi: 1 };

function comparisonRange(sign: Operation, a: Range, b: Range): Range {
  if (a.lo === a.hi && b.lo === b.hi) return exactly(OPERATIONS[sign](a.lo, b.lo));
  const apart = a.hi < b.lo || b.hi < a.lo;
  if (apart) return exactly(OPERATIONS[sign](a.lo, b.lo));
  if (sign === '<=' && a.hi <= b.lo) return exactly(1);
  if (sign === '>=' && a.lo >= b.hi) return exactly(1);
  if (sign === '<' && a.lo >= b.hi) return exactly(0);
  if (sign === '>' && a.hi <= b.lo) return exactly(0);
  return EITHER;
}

function callRange(part: Extract<FormulaPart, { kind: 'call' }>, of: (name: string) => Range): Range {
  if (part.name === 'if') return branchRange(part.terms, of);
  const terms = part.terms.map((term) => formulaRange(term, of));
  const [a, b] = terms as [Range, Range | undefined];
  switch (part.name) {
    case 'min':
      return { lo: Math.min(...terms.map(({ lo }) => lo)), hi: Math.min(...terms.map(({ hi }) => hi)) };
    case 'max':
      return { lo: Math.max(...terms.map(({ lo }) => lo)), hi: Math.max(...terms.map(({ hi }) => hi)) };
    case 'abs':
      return a.lo >= 0 ? a : { lo: a.hi < 0 ? -a.hi : 0, hi: Math.max(-a.lo, a.hi) };
    case 'round':
      return roundRange(a, b ?? exactly(0));
    case 'floor':
      return through(a, Math.floor);
    case 'ceil':
      return through(a, Math.ceil);
    case 'sqrt':
      return a.lo >= 0 ? through(a, Math.sqrt) : UNKNOWN;
  }
}

function roundRange(value: Range, decimals: Range): Range {
  if (decimals.lo !== decimals.hi) return UNKNOWN;
  return known(through(value, (x) => (Number.isFinite(x) ? roundTo(x, decimals.lo) : x)));
}

function branchRange(terms: readonly FormulaPart[], of: (name: string) => Range): Range {
  const condition = formulaRange(terms[0]!, of);
  const never = condition.lo === 0 && condition.hi === 0;
  const always = condition.lo > 0 || condition.hi < 0;
  const taken = never ? null : formulaRange(terms[1]!, of);
  const other = always ? null : formulaRange(terms[2]!, of);
  if (taken === null) return other!;
  return other === null ? taken : { lo: Math.min(taken.lo, other.lo), hi: Math.max(taken.hi, other.hi) };
}
