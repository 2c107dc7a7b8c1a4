import { describe, expect, it } from 'vitest';
import {
  billMonth,
  billRange,
  compileFormula,
  exactBox,
  formulaRange,
  InputProblem,
  type MeterColumns,
  newCarried,
  type PreparedTariff,
  prepareTariff,
  rangeTariff,
  scalePct,
  scaleRange,
  UTC_TABLE,
} from '#libs/engine/index.js';
import { type Chance, chance } from '../support/chance.js';
import { madeScale, madeTariff } from '../support/made-tariff.js';
import { madeMeter } from '../support/priced-meter.js';
import { runs, SEED } from '../support/soak.js';

/** Bounds may be a cent off on either side of a rounding, never more. */
const WIDTH = 1e-6;

// A factor that rounds to 0 has no ratio: such a tariff is refused, and there is nothing to bound.
function billsOf(prepared: PreparedTariff, columns: MeterColumns): number[] {
  const carried = newCarried(prepared);
  try {
    return prepared.calendar.months.map((_, m) => billMonth(prepared, m, columns, carried));
  } catch (problem) {
    if (problem instanceof InputProblem && problem.code === 'not-finite') return [];
    throw problem;
  }
}

// A meter, the same with more and less of everything, and one somewhere between.
function madeBox(random: Chance, days: number) {
  const count = days * 24;
  const list = (make: () => number): number[] => Array.from({ length: count }, make);
  const middle = {
    activeKw: list(() => random.between(-20, 300)),
    laggingKvar: list(() => random.between(0, 250)),
    leadingKvar: list(() => (random.next() < 0.3 ? random.between(0, 100) : 0)),
  };
  const width = random.oneOf([0, 1, 30, 200]);
  const spread = (column: number[], floor: number) => {
    const ends = column.map((value) => {
      const [a, b] = [value - width * random.next(), value + width * random.next()];
      return { lo: Math.max(a, floor), hi: Math.max(b, floor) };
    });
    return {
      low: ends.map(({ lo }) => lo),
      high: ends.map(({ hi }) => hi),
      inside: ends.map(({ lo, hi }) => random.oneOf([lo, hi, random.between(lo, hi)])),
    };
  };
  // only a transformer moves the active power, so mostly it is known
  const kw =
    random.next() < 0.6
      ? { low: middle.activeKw, high: middle.activeKw, inside: middle.activeKw }
      : spread(middle.activeKw, -1e9);
  const lagging = spread(middle.laggingKvar, 0);
  const leading = spread(middle.leadingKvar, 0);
  const times = { begin: '2024-11-20T00:00Z', intervalS: 3600 };
  const meter = (end: 'low' | 'high' | 'inside') =>
    madeMeter({ activeKw: kw[end], laggingKvar: lagging[end], leadingKvar: leading[end] }, times);
  return {
    span: meter('low').span,
    low: meter('low').columns,
    high: meter('high').columns,
    inside: meter('inside').columns,
  };
}

describe(`bounds of a bill (seed ${SEED})`, () => {
  it('hold every meter within them', () => {
    for (let run = 0; run < runs(150, 5000); run++) {
      const random = chance(SEED + 300_000 + run);
      const { span, low, high, inside } = madeBox(random, random.whole(5, 60));
      const prepared = prepareTariff(madeTariff(random, [3600, 7200]), span, UTC_TABLE);
      const ranges = billRange(rangeTariff(prepared), { low, high });
      for (const [m, total] of billsOf(prepared, inside).entries()) {
        const where = `${run} ${m} ${JSON.stringify(prepared.tariff.clauses)}`;
        expect(ranges[m]!.lo, where).toBeLessThanOrEqual(total + WIDTH);
        expect(ranges[m]!.hi, where).toBeGreaterThanOrEqual(total - WIDTH);
      }
    }
  });

  it('close on a meter that is known, but for the last bits of a rounding', () => {
    for (let run = 0; run < runs(60, 2000); run++) {
      const random = chance(SEED + 400_000 + run);
      const { span, inside } = madeBox(random, random.whole(5, 40));
      const tariff = { ...madeTariff(random, [3600, 7200]), decimals: null };
      const prepared = prepareTariff(tariff, span, UTC_TABLE);
      const ranges = billRange(rangeTariff(prepared), exactBox(inside));
      for (const [m, total] of billsOf(prepared, inside).entries()) {
        expect(ranges[m]!.lo).toBeCloseTo(total, 2);
        expect(ranges[m]!.hi).toBeCloseTo(total, 2);
      }
    }
  });

  it('of a scale hold its per cent at every power factor within', () => {
    for (let run = 0; run < runs(400, 20_000); run++) {
      const random = chance(SEED + 500_000 + run);
      const scale = madeScale(random);
      if (scale.form === 'points' && random.next() < 0.3) scale.below![0]!.pctPerPoint *= -1;
      const [a, b] = [random.between(0.3, 1), random.between(0.3, 1)];
      const factor = { lo: Math.min(a, b), hi: Math.max(a, b) };
      const range = scaleRange(scale)(factor);
      for (let k = 0; k <= 20; k++) {
        const pct = scalePct(scale)(factor.lo + ((factor.hi - factor.lo) * k) / 20);
        expect(pct, JSON.stringify(scale)).toBeGreaterThanOrEqual(range.lo - 1e-9);
        expect(pct, JSON.stringify(scale)).toBeLessThanOrEqual(range.hi + 1e-9);
      }
    }
  });

  it.each([
    'maxKw * maxKva - 3 / (maxKvar + 1)',
    'if(maxKw > 50, maxKva ^ 2, -maxKvar)',
    'min(maxKw, maxKva, 20) + max(-maxKw, maxKvar) * abs(maxKva - 40)',
    'round(maxKw / 7, 1) + floor(maxKva) - ceil(maxKvar) + sqrt(maxKw)',
    '(maxKw - 50) ^ 2 + (maxKva - 50) ^ 3 + 2 ^ (maxKvar / 10)',
    '(maxKw >= maxKva) * 10 + (maxKvar != 30) + (maxKw == maxKvar)',
    'maxKw / (maxKva - 50)',
  ])('of %s hold its value', (text) => {
    const formula = compileFormula(text, []);
    for (let run = 0; run < runs(300, 5000); run++) {
      const random = chance(SEED + run);
      const ranges = new Map(
        formula.names.map((name) => {
          const [a, b] = [random.between(0, 100), random.between(0, 100)];
          return [name, random.next() < 0.2 ? { lo: a, hi: a } : { lo: Math.min(a, b), hi: Math.max(a, b) }] as const;
        }),
      );
      const range = formulaRange(formula.tree, (name) => ranges.get(name)!);
      const values = Float64Array.from(formula.names, (name) => {
        const { lo, hi } = ranges.get(name)!;
        return random.oneOf([lo, hi, random.between(lo, hi)]);
      });
      const value = formula.evaluate(values);
      if (!Number.isFinite(value)) continue;
      expect(value).toBeGreaterThanOrEqual(range.lo - 1e-6 * Math.abs(range.lo));
      expect(value).toBeLessThanOrEqual(range.hi + 1e-6 * Math.abs(range.hi));
    }
  });
});
