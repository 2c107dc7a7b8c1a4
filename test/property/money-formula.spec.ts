import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { compileFormula, FormulaFault, MONTHLY_NAMES, WINDOWED_NAMES } from '#libs/engine/index.js';
import { slowFormula } from '../support/slow-formula.js';
import { runs, SEED } from '../support/soak.js';

const WINDOWS = ['peak'];
const NAMES = [...WINDOWED_NAMES, ...MONTHLY_NAMES, ...WINDOWED_NAMES.map((name) => `${name}.peak`)];

// Formulas as text, brackets everywhere or only where a level of strength asks for them: both must be read alike.
const { formula } = fc.letrec<{ formula: string; sum: string; product: string; signed: string; single: string }>(
  (tie) => ({
    formula: fc.oneof(
      { weight: 4, arbitrary: tie('sum') },
      fc
        .tuple(tie('sum'), fc.constantFrom('<', '<=', '>', '>=', '==', '!='), tie('sum'))
        .map(([a, sign, b]) => `${a} ${sign} ${b}`),
    ),
    sum: fc
      .tuple(tie('product'), fc.array(fc.tuple(fc.constantFrom('+', '-', ' − '), tie('product')), { maxLength: 1 }))
      .map(([first, rest]) => first + rest.map(([sign, part]) => sign + part).join('')),
    product: fc
      .tuple(tie('signed'), fc.array(fc.tuple(fc.constantFrom('*', ' / ', '×'), tie('signed')), { maxLength: 1 }))
      .map(([first, rest]) => first + rest.map(([sign, part]) => sign + part).join('')),
    signed: fc.oneof(
      { weight: 5, arbitrary: tie('single') },
      tie('single').map((part) => `-${part}`),
      fc.tuple(tie('single'), fc.constantFrom('2', '3', '-1', '0.5')).map(([base, power]) => `${base}^${power}`),
    ),
    single: fc.oneof(
      { maxDepth: 2, depthIdentifier: 'formula' },
      fc.constantFrom('0', '1', '2', '0.5', '12.75', '3e2', '1.5e-1', '.25'),
      fc.constantFrom(...NAMES),
      tie('formula').map((part) => `(${part})`),
      fc
        .tuple(fc.constantFrom('min', 'max'), fc.array(tie('formula'), { minLength: 1, maxLength: 3 }))
        .map(([name, terms]) => `${name}(${terms.join(', ')})`),
      fc
        .tuple(fc.constantFrom('abs', 'floor', 'ceil', 'sqrt', 'round'), tie('formula'))
        .map(([name, term]) => `${name}(${term})`),
      fc
        .tuple(tie('formula'), tie('formula'), tie('formula'))
        .map(([condition, a, b]) => `if(${condition}, ${a}, ${b})`),
    ),
  }),
);

const quantities = fc.array(fc.constantFrom(0, 1, 2, 7.5, 100, 250.25, 12_000), {
  minLength: NAMES.length,
  maxLength: NAMES.length,
});

describe(`formulas of every shape (seed ${SEED})`, () => {
  it('have the value a general mathematics library gives them', () => {
    let compared = 0;
    fc.assert(
      fc.property(formula, quantities, (text, values) => {
        const of = (name: string): number => values[NAMES.indexOf(name)]!;
        let compiled: ReturnType<typeof compileFormula>;
        try {
          compiled = compileFormula(text, WINDOWS);
        } catch (fault) {
          // too long or too deep is all that may be said against them
          expect((fault as FormulaFault).kind).toBe('too-large');
          return;
        }
        const ours = compiled.evaluate(Float64Array.from(compiled.names, of));
        const theirs = slowFormula(text, of);
        if (!Number.isFinite(ours)) return;
        compared++;
        expect(Math.abs(ours - theirs)).toBeLessThanOrEqual(1e-9 * Math.max(1, Math.abs(theirs)));
      }),
      { seed: SEED, numRuns: runs(1500, 50_000) },
    );
    expect(compared).toBeGreaterThan(runs(700, 20_000));
  });

  it('and texts of any characters are read or refused, never anything else', () => {
    const text = fc.oneof(
      fc.string({ unit: 'grapheme', maxLength: 60 }),
      fc
        .array(
          fc.constantFrom(...'()+-*/^<>=!.,0123456789eE ×−'.split(''), ...NAMES, 'min(', 'if(', '__proto__', '`${'),
          {
            maxLength: 40,
          },
        )
        .map((parts) => parts.join('')),
    );
    fc.assert(
      fc.property(text, (candidate) => {
        try {
          const compiled = compileFormula(candidate, WINDOWS);
          expect(typeof compiled.evaluate(new Float64Array(compiled.names.length))).toBe('number');
        } catch (fault) {
          expect(fault).toBeInstanceOf(FormulaFault);
        }
      }),
      { seed: SEED, numRuns: runs(3000, 100_000) },
    );
  });
});
