// Oracle: mathjs 15, a general-purpose reader of formulas, evaluates what is printed.
import { evaluate } from 'mathjs';
import { describe, expect, it } from 'vitest';
import type { Figure } from '#libs/engine/index.js';
import { formatNumber } from '#libs/present/format-number.js';
import { workedInterval } from '#libs/present/worst-interval.js';
import { generatedCase } from '../support/generated-site.js';
import { madeOutcome } from '../support/outcome.js';
import { printedNumber } from '../support/pdf-text.js';
import { runs } from '../support/soak.js';

type Worked = Pick<Figure, 'label' | 'formula' | 'working' | 'value'>;

/** The printed arithmetic in the oracle's own signs. */
function forOracle(working: string): string {
  return working
    .replaceAll('\u2212', '-')
    .replaceAll('·', '*')
    .replaceAll('√', 'sqrt')
    .replace(/\bln\(/g, 'log(')
    .replaceAll('π', 'pi');
}

function disagreeing(
  figures: readonly Worked[],
): { label: string; working: string; printed: string; evaluated: number }[] {
  return figures.flatMap(({ label, working, value, formula }) => {
    if (formula === '') return [];
    const evaluated = evaluate(forOracle(working)) as number;
    const printed = formatNumber(value, 'answer');
    const { value: shown, half } = printedNumber(printed);
    // the working is rounded too, in the ninth digit
    const width = half * (1 + 1e-9) + 1e-7 * Math.abs(value);
    return Math.abs(evaluated - shown) <= width ? [] : [{ label, working, printed, evaluated }];
  });
}

describe('the working of every figure', () => {
  it.each(Array.from({ length: runs(12, 50) }, (_, at) => at))(
    'gives the figure within its rounding, generated site %i',
    (number) => {
      const { parts, load } = generatedCase(number);
      const outcome = madeOutcome(parts, load);
      expect(outcome.result.figures.length).toBeGreaterThan(3);
      expect(disagreeing(outcome.result.figures)).toEqual([]);
      expect(disagreeing(workedInterval(outcome).steps)).toEqual([]);
    },
  );

  it('has a label for every figure, and every symbol of the formula put in', () => {
    const { figures } = madeOutcome({}, { days: 40 }).result;
    for (const { id, label, formula, working, inputs } of figures) {
      expect(label).not.toBe(id);
      expect(label).not.toBe('');
      for (const { symbol } of inputs) {
        expect(formula).toContain(symbol);
        if (symbol.length > 1) expect(working).not.toContain(symbol);
      }
    }
  });

  it('is caught when a value is put in wrongly (control)', () => {
    const { figures } = madeOutcome({}, { days: 40 }).result;
    const spoilt = figures.map((figure) => ({
      ...figure,
      working: figure.working.replace(/\d/, (digit) => String((Number(digit) + 1) % 10)),
    }));
    expect(disagreeing(spoilt).length).toBeGreaterThan(figures.length / 2);
  });
});
