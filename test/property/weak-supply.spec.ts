// What the network cannot be asked for: each is a problem that names the part, or a limitation that is said.
import { describe, expect, it } from 'vitest';
import { zoneTable } from '#libs/contract/time-zone.js';
import {
  assessBank,
  type DistortingLoad,
  InputProblem,
  networkScene,
  type Outcome,
  type Problem,
  type Site,
  scanSite,
  siteNetlist,
} from '#libs/engine/index.js';
import { remarkSentence } from '#libs/present/remark-words.js';
import { FIRST_S, madeRecord } from '../support/made-record.js';
import { madeSite } from '../support/made-site.js';

const bank = { stages: [{ count: 2, ratedKvar: 50, ratedV: 480, reactorPct: 7 }] };
const zone = zoneTable('UTC', FIRST_S, FIRST_S + 40 * 86_400);

// A steady load of 300 kW and 240 kvar for 30 days behind a supply of so many MVA.
function assessed(faultLevelMva: number): Outcome {
  const site = madeSite({
    bank,
    supply: { faultLevelMva: { max: faultLevelMva }, transformers: [] },
    loads: { distorting: [], backgroundPct: [] },
  });
  const steady = (value: number): number[] => Array.from({ length: 30 * 96 }, () => value);
  return assessBank(site, madeRecord({ activeKw: steady(300), reactiveKvar: steady(240) }), zone);
}

describe('a supply weaker than its load', () => {
  // √(300² + 240²) = 384 kVA.
  it('is said, and never judged clear', () => {
    const { result } = assessed(0.3);
    const said = result.reasons.find(({ code }) => code === 'supply.weakerThanLoad')!;
    expect(said.values.loadKva).toBeCloseTo(Math.hypot(300, 240), 6);
    expect(said.values.shortCircuitMinMva).toBeCloseTo(0.3, 9);
    expect(said.path).toBe('supply.faultLevelMva');
    expect(remarkSentence(said)).toMatch(/384.*kVA.*0\.3.*MVA/s);
    expect(result.verdict).not.toBe('clear');
    expect(JSON.stringify(result)).not.toMatch(/NaN|Infinity/);
  });

  it('control: is not said of one that is a little stronger', () => {
    expect(assessed(0.39).result.reasons.map(({ code }) => code)).not.toContain('supply.weakerThanLoad');
  });
});

function problemsOf(work: () => unknown): readonly Problem[] {
  try {
    work();
  } catch (error) {
    if (error instanceof InputProblem) return error.problems;
    throw error;
  }
  return [];
}

const load = (parts: Partial<DistortingLoad>): DistortingLoad => ({
  name: 'drives',
  fundamentalA: 100,
  spectrum: 'six-pulse',
  ...parts,
});
const withLoads = (distorting: DistortingLoad[], parts: Partial<Site> = {}): Site =>
  madeSite({ bank, loads: { distorting, backgroundPct: [] }, ...parts });

describe('a distorting load', () => {
  it.each([
    ['no orders at all', []],
    ['orders of no magnitude', [{ orderH: 5, pct: 0 }]],
    ['orders beyond the fiftieth alone', [{ orderH: 53, pct: 4 }]],
  ])('of %s is refused by its path: it would drop out unseen', (_what, orders) => {
    const problems = problemsOf(() => networkScene(withLoads([load({}), load({ orders })])));
    expect(problems.map(({ path }) => path)).toEqual(['loads.distorting[1].orders']);
  });

  it('on a bus that is not there is refused by its path', () => {
    const network = { buses: [{ name: 'a' }] };
    const supply = { faultLevelMva: { max: 20 } };
    expect(
      problemsOf(() => networkScene(withLoads([load({ bus: 'b' })], { network, supply }))).map(({ path }) => path),
    ).toEqual(['loads.distorting[0].bus']);
    expect(problemsOf(() => networkScene(withLoads([load({ bus: 'b' })])))).toHaveLength(1);
    expect(problemsOf(() => networkScene(withLoads([load({ bus: 'a' })], { network, supply })))).toEqual([]);
  });

  it('has zero sequence at multiples of three alone: a 5th said to be would vanish unseen', () => {
    const zero = (orderH: number) => load({ orders: [{ orderH, pct: 30, sequence: 'zero' }] });
    expect(problemsOf(() => networkScene(withLoads([zero(5)]))).map(({ path }) => path)).toEqual([
      'loads.distorting[0].orders[0].sequence',
    ]);
    expect(problemsOf(() => networkScene(withLoads([zero(9)])))).toEqual([]);
  });

  it('control: of no current is declared, not wrong', () => {
    expect(problemsOf(() => networkScene(withLoads([load({ fundamentalA: 0 })])))).toEqual([]);
  });
});

describe('orders asked for', () => {
  const site = madeSite({ bank });

  it.each([0, 0.99, -5, Number.NaN, Number.POSITIVE_INFINITY])('%f is refused by its place', (orderH) => {
    const ordersH = Float64Array.of(5, orderH);
    for (const work of [() => scanSite(site, { ordersH }), () => siteNetlist(site, { ordersH })]) {
      expect(problemsOf(work)).toMatchObject([{ code: 'out-of-range', path: 'orders[1]' }]);
    }
  });

  it('a corner that is not there is refused with those there are', () => {
    for (const corner of [-1, 9, 0.5, Number.NaN]) {
      const [problem] = problemsOf(() => scanSite(site, { corner, ordersH: Float64Array.of(5) }));
      expect(problem).toMatchObject({
        code: 'out-of-range',
        path: 'corner',
        expected: expect.stringContaining('to 8'),
      });
    }
  });

  it('more than a thousand copies of the network are refused', () => {
    const ordersH = Float64Array.from({ length: 1001 }, (_, i) => 1 + i / 100);
    expect(problemsOf(() => siteNetlist(site, { ordersH }))).toMatchObject([{ code: 'too-large', path: 'orders' }]);
  });
});
