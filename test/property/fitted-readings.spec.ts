// Round trip: a works whose drives truly inject other currents than stated is read with the engine's own nominal case, and
// the fit to that reading must find the true currents again. The order's exponents are IEC TR 61000-3-6.
import { describe, expect, it } from 'vitest';
import { InputProblem, type Result, type Site } from '#libs/engine/index.js';
import { assessedSite } from '../support/assessed-site.js';
import { chance } from '../support/chance.js';
import { runs, SEED } from '../support/soak.js';

type Loads = NonNullable<Site['loads']>;
type Measured = NonNullable<Loads['measured']>;

const STATED_PCT: Readonly<Record<number, number>> = { 3: 2, 5: 30, 7: 12, 11: 9 };
const BACKGROUND: Loads['backgroundPct'] = [
  { orderH: 5, pct: 1 },
  { orderH: 7, pct: 0.4 },
  { orderH: 11, pct: 0.2 },
];

function loadsWith(factors: Readonly<Record<number, number>>, more: Partial<Loads> = {}): Loads {
  const drives = (fundamentalA: number) => ({
    name: `drives ${fundamentalA}`,
    fundamentalA,
    orders: Object.entries(STATED_PCT).map(([h, pct]) => ({ orderH: Number(h), pct: pct * (factors[Number(h)] ?? 1) })),
  });
  return { distorting: [drives(150), drives(60)], backgroundPct: BACKGROUND!, ...more };
}

function readOf(result: Result, levelKvar: number): Measured {
  const level = result.network.levels.find((one) => one.levelKvar === levelKvar && one.case === 'nominal')!;
  return {
    bankKvar: levelKvar,
    voltagePct: level.orders.map(({ orderH, voltagePct }) => ({ orderH, pct: voltagePct })),
    currentA: level.orders.map(({ orderH, sourceA }) => ({ orderH, a: sourceA })),
  };
}

function fitted(measured: Measured, loads: Partial<Loads> = {}): Result {
  return assessedSite({ loads: loadsWith({}, { ...loads, measured: { ...measured, use: 'fit' } }) });
}

function factorsOf(result: Result): Record<number, { factor: number; residualPct: number }> {
  const lines = result.assumptions.filter(({ code }) => code === 'measured.fitted');
  return Object.fromEntries(
    lines.map(({ values }) => [
      Number(values.orderH),
      { factor: Number(values.factor), residualPct: Number(values.residualPct) },
    ]),
  );
}

function problemsOf(ask: () => unknown): [string, string | undefined][] {
  try {
    ask();
  } catch (error) {
    if (error instanceof InputProblem) return error.problems.map(({ code, path }) => [code, path]);
    throw error;
  }
  return [];
}

describe('loads fitted to a reading', () => {
  const plain = assessedSite({ loads: loadsWith({}) });
  const topKvar = plain.bank.levelsKvar.at(-1)!;

  it.each([
    ['voltages', 0],
    ['currents', 0],
    ['both', 0],
    ['voltages', topKvar],
    ['both', topKvar],
  ] as const)('find the currents there truly are from %s, with %d kvar in', (of, levelKvar) => {
    const random = chance(SEED + levelKvar);
    for (let k = 0; k < runs(1, 20); k++) {
      const truly = Object.fromEntries(Object.keys(STATED_PCT).map((h) => [Number(h), random.between(0.2, 3)]));
      const there = assessedSite({ loads: loadsWith(truly) });
      const { voltagePct, currentA, bankKvar } = readOf(there, levelKvar);
      const found = fitted({
        bankKvar,
        ...(of === 'currents' ? {} : { voltagePct: voltagePct! }),
        ...(of === 'voltages' ? {} : { currentA: currentA! }),
      });
      for (const [h, { factor, residualPct }] of Object.entries(factorsOf(found))) {
        expect(factor / truly[Number(h)]!).toBeCloseTo(1, 9);
        expect(residualPct).toBeLessThan(1e-9);
      }
      expect(Object.keys(factorsOf(found))).toEqual(Object.keys(STATED_PCT));
      // Scaled, not added: the whole network is that of the true currents.
      for (const [n, level] of found.network.levels.entries()) {
        const same = there.network.levels[n]!.voltageDistortionPct;
        expect(Math.abs(level.voltageDistortionPct - same)).toBeLessThan(1e-9 * same);
      }
    }
  });

  it('are as stated where the reading only checks them (control)', () => {
    const there = assessedSite({ loads: loadsWith({ 5: 2 }) });
    const checked = assessedSite({ loads: loadsWith({}, { measured: readOf(there, 0) }) });
    expect(checked.network).toEqual(plain.network);
    expect(fitted(readOf(there, 0)).network).not.toEqual(plain.network);
  });

  it('keep their currents at orders that were not read, and say so', () => {
    const { voltagePct } = readOf(plain, 0);
    const result = fitted({ bankKvar: 0, voltagePct: voltagePct!.filter(({ orderH }) => orderH === 5) });
    expect(Object.keys(factorsOf(result))).toEqual(['5']);
    expect(result.assumptions.find(({ code }) => code === 'measured.keptOrders')!.values.orders).toBe('3, 7, 11');
  });

  it('say what is left over where voltage and current disagree, the factor between the two', () => {
    const of = (factor: number) => readOf(assessedSite({ loads: loadsWith({ 11: factor }) }), 0);
    const [low, high] = [of(1), of(2)];
    const voltagePct = high.voltagePct!.filter(({ orderH }) => orderH === 11);
    const currentA = low.currentA!.filter(({ orderH }) => orderH === 11);
    const { factor, residualPct } = factorsOf(fitted({ bankKvar: 0, voltagePct, currentA }))[11]!;
    expect(factor).toBeGreaterThan(1);
    expect(factor).toBeLessThan(2);
    expect(residualPct).toBeGreaterThan(5);
  });

  it('are refused where the reading leaves open what to scale', () => {
    const reading = readOf(plain, 0);
    const { backgroundPct: _unknown, ...withoutBackground } = loadsWith({});
    const asked = (loads: Loads, measured: Measured) => () =>
      assessedSite({ loads: { ...loads, measured: { ...measured, use: 'fit' } } });
    expect(problemsOf(asked(withoutBackground, reading))).toEqual([['missing', 'loads.backgroundPct']]);
    expect(problemsOf(asked({ backgroundPct: [] }, reading))).toEqual([['missing', 'loads.distorting']]);
    expect(problemsOf(asked(loadsWith({}), { ...reading, bankKvar: topKvar + 5 }))).toEqual([
      ['unknown-level', 'loads.measured.bankKvar'],
    ]);
    const strange = { bankKvar: 0, voltagePct: [{ orderH: 13, pct: 1 }] };
    expect(problemsOf(asked(loadsWith({}), strange))).toEqual([['inconsistent', 'loads.measured.voltagePct[0]']]);
    const tooLittle = { bankKvar: 0, voltagePct: [{ orderH: 5, pct: 0.3 }] };
    expect(problemsOf(asked(loadsWith({}), tooLittle))).toEqual([['inconsistent', 'loads.measured.voltagePct[0]']]);
  });
});
