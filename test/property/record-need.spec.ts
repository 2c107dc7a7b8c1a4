// Second methods: the need behind a transformer by halving on the voltage equations written out, percentiles by counting,
// months by the run-time's own calendar. Laws: energy under resampling, scaling.
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  busFromPrimary,
  needColumn,
  percentile,
  primaryFromBus,
  summarizeRecord,
  type TransformerPassage,
} from '#libs/engine/index.js';
import { chance } from '../support/chance.js';
import { Complex } from '../support/complex.js';
import { madeRecord } from '../support/made-record.js';
import { runs, SEED } from '../support/soak.js';

const many = (usual: number, soaked: number) => ({ seed: SEED, numRuns: runs(usual, soaked) });

const passage = fc.record({
  baseKva: fc.double({ min: 50, max: 3000, noNaN: true }),
  noLoadKw: fc.double({ min: 0, max: 3, noNaN: true }),
  noLoadKvar: fc.double({ min: 0, max: 30, noNaN: true }),
  rPu: fc.double({ min: 0, max: 0.02, noNaN: true }),
  xPu: fc.double({ min: 0.02, max: 0.1, noNaN: true }),
});

// Per unit of the transformer: from −30 % (export) to full load, lagging and leading.
const share = fc.record({
  p: fc.double({ min: -0.3, max: 1, noNaN: true }),
  q: fc.double({ min: -0.3, max: 0.9, noNaN: true }),
});

/** Primary power by halving on the bus voltage until the source voltage is 1, phasors written out. */
function primaryByHalving({ rPu, xPu, baseKva, noLoadKw, noLoadKvar }: TransformerPassage, kw: number, kvar: number) {
  const z = new Complex(rPu, xPu);
  // With the bus voltage real, I = (P − jQ)/V₂ and V₁ = V₂ + z·I; |V₁| rises with V₂ on the upper branch.
  const at = (v: number): { source: number; current: Complex } => {
    const current = new Complex(kw / baseKva / v, -kvar / baseKva / v);
    return { source: new Complex(v).plus(z.times(current)).size, current };
  };
  let [low, high] = [0.5, 2];
  for (let step = 0; step < 100; step++) {
    const middle = (low + high) / 2;
    if (at(middle).source < 1) low = middle;
    else high = middle;
  }
  const square = at(low).current.size ** 2;
  return {
    activeKw: kw + rPu * square * baseKva + noLoadKw,
    reactiveKvar: kvar + xPu * square * baseKva + noLoadKvar,
    busVoltagePu: low,
  };
}

describe(`power through a transformer (seed ${SEED})`, () => {
  it('from bus to primary is what halving on the bus voltage finds', () => {
    fc.assert(
      fc.property(passage, share, (through, { p, q }) => {
        const found = primaryFromBus(through, p * through.baseKva, q * through.baseKva)!;
        const expected = primaryByHalving(through, p * through.baseKva, q * through.baseKva);
        expect(found.busVoltagePu).toBeCloseTo(expected.busVoltagePu, 12);
        expect(found.activeKw / through.baseKva).toBeCloseTo(expected.activeKw / through.baseKva, 12);
        expect(found.reactiveKvar / through.baseKva).toBeCloseTo(expected.reactiveKvar / through.baseKva, 12);
      }),
      many(300, 50_000),
    );
  });

  it('from primary to bus and back is the identity', () => {
    fc.assert(
      fc.property(passage, share, (through, { p, q }) => {
        const [kw, kvar] = [p * through.baseKva, q * through.baseKva];
        const bus = busFromPrimary(through, kw, kvar);
        const back = primaryFromBus(through, bus.activeKw, bus.reactiveKvar)!;
        expect(back.activeKw / through.baseKva).toBeCloseTo(p, 12);
        expect(back.reactiveKvar / through.baseKva).toBeCloseTo(q, 12);
      }),
      many(300, 50_000),
    );
  });
});

describe(`need behind a transformer (seed ${SEED})`, () => {
  it('is what halving on the bank’s kvar finds, to 1e-6 kvar, and 0 where the primary has less already', () => {
    const target = fc.record({
      powerFactor: fc.double({ min: 0.8, max: 1, noNaN: true }),
      onExport: fc.constantFrom('importOnly' as const, 'absolute' as const),
    });
    let needed = 0;
    fc.assert(
      fc.property(passage, share, target, (through, { p, q }, wanted) => {
        const [kw, kvar] = [p * through.baseKva, q * through.baseKva];
        const load = {
          metering: { at: 'primary' as const, passage: through },
          activeKw: Float64Array.of(kw),
          reactiveKvar: Float64Array.of(kvar),
        };
        const tan = Math.tan(Math.acos(wanted.powerFactor));
        const excess = (bank: number): number => {
          const primary = primaryByHalving(through, kw, kvar - bank);
          const active = wanted.onExport === 'absolute' ? Math.abs(primary.activeKw) : Math.max(primary.activeKw, 0);
          return primary.reactiveKvar - active * tan;
        };
        let [low, high] = [0, 2 * through.baseKva];
        if (excess(0) <= 0) high = 0;
        for (let step = 0; step < 80 && high > 0; step++) {
          const middle = (low + high) / 2;
          if (excess(middle) > 0) low = middle;
          else high = middle;
        }
        if (high > 0) needed++;
        const found = needColumn(load, wanted, Float64Array.of(0))[0]!;
        expect(Math.abs(found - high)).toBeLessThan(1e-6);
      }),
      many(300, 20_000),
    );
    expect(needed).toBeGreaterThan(runs(100, 5000));
  });

  it('tends to the need at the bus where the transformer tends to nothing', () => {
    const through = { baseKva: 1000, noLoadKw: 0, noLoadKvar: 0, rPu: 1e-12, xPu: 1e-12 };
    const columns = { activeKw: Float64Array.of(500), reactiveKvar: Float64Array.of(400) };
    const target = { powerFactor: 0.95, onExport: 'importOnly' as const };
    const behind = needColumn(
      { metering: { at: 'primary', passage: through }, ...columns },
      target,
      Float64Array.of(0),
    );
    const direct = needColumn({ metering: { at: 'bus' }, ...columns }, target, Float64Array.of(0));
    expect(behind[0]).toBeCloseTo(direct[0]!, 6);
  });
});

describe(`percentile (seed ${SEED})`, () => {
  const column = fc.array(fc.double({ min: -1e6, max: 1e6, noNaN: true }), { minLength: 1, maxLength: 50 });

  it('divides the ranks: at most that share below it, at most the rest above', () => {
    fc.assert(
      fc.property(column, fc.double({ min: 0, max: 1, noNaN: true }), (values, p) => {
        const ascending = Float64Array.from(values).sort();
        const found = percentile(ascending, p);
        const position = (values.length - 1) * p;
        expect(values.filter((value) => value < found).length).toBeLessThanOrEqual(Math.ceil(position));
        expect(values.filter((value) => value > found).length).toBeLessThanOrEqual(
          values.length - 1 - Math.floor(position),
        );
      }),
      many(300, 20_000),
    );
  });

  it('moves in a straight line from neighbour to neighbour', () => {
    fc.assert(
      fc.property(column, fc.double({ min: 0, max: 1, noNaN: true }), (values, within) => {
        const ascending = Float64Array.from(values).sort();
        const k = Math.floor((values.length - 1) / 2);
        const next = Math.min(values.length - 1, k + 1);
        const share = values.length === 1 ? 0 : Math.min(1, (k + within) / (values.length - 1));
        const expected = values.length === 1 ? ascending[0]! : (1 - within) * ascending[k]! + within * ascending[next]!;
        expect(percentile(ascending, share) - expected).toBeCloseTo(0, 6);
      }),
      many(300, 20_000),
    );
  });
});

describe(`energies of a record (seed ${SEED})`, () => {
  const load = fc.array(
    fc.record({
      p: fc.double({ min: 0, max: 2000, noNaN: true }),
      q: fc.double({ min: -500, max: 1500, noNaN: true }),
    }),
    { minLength: 1, maxLength: 40 },
  );

  it('are kept where each interval is cut into equal parts, and so are need and maximum demand', () => {
    fc.assert(
      fc.property(load, fc.integer({ min: 2, max: 5 }), (rows, parts) => {
        const columns = { activeKw: rows.map(({ p }) => p), reactiveKvar: rows.map(({ q }) => q) };
        const cut = <T>(list: T[]): T[] => list.flatMap((value) => Array<T>(parts).fill(value));
        const whole = summarizeRecord(madeRecord({ ...columns, intervalS: 900 * parts }));
        const fine = summarizeRecord(
          madeRecord({ activeKw: cut(columns.activeKw), reactiveKvar: cut(columns.reactiveKvar), intervalS: 900 }),
        );
        for (const key of ['activeKwh', 'laggingKvarh', 'leadingKvarh'] as const) {
          expect(Math.abs(fine[key] - whole[key])).toBeLessThanOrEqual(1e-12 * whole[key]);
        }
        expect(fine.maxKw).toBe(whole.maxKw);
        expect(fine.maxKva).toBe(whole.maxKva);
        expect(fine.endS).toBe(whole.endS);
      }),
      many(200, 10_000),
    );
  });

  it('are kept where intervals are averaged, column by column; the maximum never rises', () => {
    fc.assert(
      fc.property(load, fc.integer({ min: 2, max: 4 }), (rows, parts) => {
        const full = rows.slice(0, Math.max(parts, rows.length - (rows.length % parts)));
        while (full.length % parts !== 0) full.push({ p: 0, q: 0 });
        const mean = (from: number, of: (row: (typeof rows)[number]) => number): number =>
          full.slice(from, from + parts).reduce((sum, row) => sum + of(row), 0) / parts;
        const starts = full.map((_, i) => i).filter((i) => i % parts === 0);
        const fine = madeRecord({ activeKw: full.map(({ p }) => p), reactiveKvar: full.map(({ q }) => q) });
        const coarse = {
          ...madeRecord({
            activeKw: starts.map((i) => mean(i, ({ p }) => p)),
            reactiveKvar: starts.map(() => 0),
            intervalS: 900 * parts,
          }),
          laggingKvar: Float64Array.from(starts, (i) => mean(i, ({ q }) => Math.max(q, 0))),
          leadingKvar: Float64Array.from(starts, (i) => mean(i, ({ q }) => Math.max(-q, 0))),
        };
        const [before, after] = [summarizeRecord(fine), summarizeRecord(coarse)];
        for (const key of ['activeKwh', 'laggingKvarh', 'leadingKvarh'] as const) {
          expect(Math.abs(after[key] - before[key])).toBeLessThanOrEqual(1e-12 * before[key] + 1e-12);
        }
        expect(after.maxKw).toBeLessThanOrEqual(before.maxKw * (1 + 1e-12));
      }),
      many(200, 10_000),
    );
  });

  it('control: integers of a year that a plain sum would round are exact', () => {
    const random = chance(SEED);
    const activeKw = Array.from({ length: 35_040 }, (_, i) => (i % 2 === 0 ? 1e16 : random.whole(1, 9)));
    const exact = activeKw.reduce((sum, kw) => sum + BigInt(kw), 0n) / 4n;
    const { activeKwh } = summarizeRecord(madeRecord({ activeKw, reactiveKvar: activeKw.map(() => 0) }));
    const plain = activeKw.reduce((sum, kw) => sum + kw, 0) / 4;
    expect(activeKwh).toBe(Number(exact));
    expect(plain).not.toBe(Number(exact));
  });
});
