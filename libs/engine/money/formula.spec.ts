import { describe, expect, it } from 'vitest';
import { compileFormula, formulaWorking } from './formula.js';
import { FormulaFault } from './formula-tokens.js';

const WINDOWS = ['peak', 'off-peak', 'off'];

function value(text: string, quantities: Record<string, number> = {}): number {
  const formula = compileFormula(text, WINDOWS);
  return formula.evaluate(Float64Array.from(formula.names, (name) => quantities[name] ?? Number.NaN));
}

function fault(text: string): FormulaFault {
  try {
    compileFormula(text, WINDOWS);
  } catch (error) {
    if (error instanceof FormulaFault) return error;
    throw error;
  }
  throw new Error(`${text} was accepted`);
}

describe('a formula', () => {
  it.each([
    ['1 + 2 * 3', 7, 'products before sums'],
    ['(1 + 2) * 3', 9, 'brackets first'],
    ['10 - 4 - 3', 3, 'sums from the left'],
    ['24 / 4 / 2', 3, 'products from the left'],
    ['2 ^ 3 ^ 2', 512, 'powers from the right'],
    ['-2 ^ 2', -4, 'a power before a minus'],
    ['2 ^ -1', 0.5, 'a minus in the exponent'],
    ['2 * -3', -6, 'a minus after a sign'],
    ['6 × 2 − 1', 11, 'the signs of print'],
    ['1.5e2 + .5 + 2.', 152.5, 'decimals and exponents'],
    ['1 + 1 < 3', 1, 'comparisons weakest'],
    ['(1 >= 2) + (2 != 3) + (2 == 2) + (1 <= 1) + (2 > 1)', 4, 'a comparison is 1 or 0'],
    ['min(3, 1, 2) + max(5) + abs(-4)', 10, 'one to twenty terms'],
    ['round(2.5) + round(-2.5) + round(1.245, 2)', 1.25, 'halves away from zero'],
    ['floor(-1.5) + ceil(1.2) + sqrt(9)', 3, 'whole numbers and roots'],
    ['if(1 > 2, 1 / 0, 7)', 7, 'the taken branch alone'],
  ])('%s is %f: %s', (text, result) => {
    expect(value(text)).toBe(result);
  });

  it('takes quantities, with the name of a window after a point, the longest that fits', () => {
    expect(value('maxKw.off-peak + maxKw.off - maxKw', { 'maxKw.off-peak': 100, 'maxKw.off': 30, maxKw: 7 })).toBe(123);
  });

  it.each([
    ['', 'nothing'],
    ['1 +', 'a missing term'],
    ['1 2', 'two numbers'],
    ['(1', 'an open bracket'],
    ['1)', 'a bracket too many'],
    ['1 < 2 < 3', 'a chained comparison'],
    ['+1', 'a plus before a number'],
    ['min()', 'no terms'],
    [`max(${new Array(21).fill('1').join(',')})`, 'twenty-one terms'],
    ['if(1, 2)', 'half an if'],
    ['round(1, 2, 3)', 'three terms of round'],
    ['maxKw = 3', 'an assignment'],
    ['1; 2', 'two statements'],
    ['[1, 2]', 'a list'],
    ['"a"', 'a text'],
    ['abs("return process")', 'a text as a term'],
    ['2 maxKw', 'a product without its sign'],
    ['3!', 'a factorial'],
    ['1 ? 2 : 3', 'a question'],
    ['maxKw\u0000', 'a control character'],
  ])('that is %s is refused as unreadable: %s', (text) => {
    expect(fault(text).kind).toBe('unreadable');
  });

  it.each([
    'kw',
    'maxKW',
    'maxKw.valley',
    'powerFactor.peak',
    'constructor',
    '__proto__',
    'toString',
    'process',
    'globalThis',
    'import(1)',
    'constructor(1)(2)',
    'eval(1)',
    'maxKw.constructor',
    'sin(1)',
  ])('with the unknown name in %s is refused, naming it', (text) => {
    const { kind, found } = fault(text);
    expect(kind).toBe('unknown-name');
    expect(found).toMatch(/^".+" at \d+$/);
  });

  it('of 200 parts is read and one of more is refused', () => {
    const sum = (terms: number): string => new Array(terms).fill('1').join('+');
    expect(value(`-(${sum(100)})`)).toBe(-100);
    expect(fault(`--(${sum(100)})`).kind).toBe('too-large');
    expect(fault(`${'-'.repeat(900)}1`).kind).toBe('too-large');
  });

  it('is read 40 brackets deep and no deeper', () => {
    const nested = (depth: number): string => `${'('.repeat(depth)}1${')'.repeat(depth)}`;
    expect(value(nested(40))).toBe(1);
    expect(fault(nested(41)).kind).toBe('too-large');
    expect(fault('abs('.repeat(41)).kind).toBe('too-large');
  });

  it('longer than 1 000 characters is refused', () => {
    expect(value(`1${' '.repeat(999)}`)).toBe(1);
    expect(fault(`1${' '.repeat(1000)}`).kind).toBe('too-large');
  });

  it.each(['1 / 0', '0 / 0', 'sqrt(-1)', '(-8) ^ (1 / 3)', '1e999', 'round(1, 0.5)', 'if(0 / 0, 1, 2)', '0 / 0 < 1'])(
    '%s has no finite value',
    (text) => {
      expect(Number.isFinite(value(text))).toBe(false);
    },
  );

  it('is shown with its values put in', () => {
    const formula = compileFormula('max(maxKva - 100, 0) * -(2 + month) ^ 2', WINDOWS);
    expect(
      formulaWorking(
        formula,
        Float64Array.from(formula.names, (name) => (name === 'month' ? 4 : 512.3)),
      ),
    ).toBe('max(512.3 − 100, 0) · (−(2 + 4) ^ 2)');
  });
});
