// Closed form: a supply R·h^k + jhX beside capacitors of susceptance hB, worked out here from the nameplates.
import { describe, expect, it } from 'vitest';
import {
  basisOf,
  type Corner,
  firmVerdict,
  networkScene,
  PeakFinder,
  type Site,
  settleControl,
} from '#libs/engine/index.js';
import { Complex } from '../support/complex.js';
import { madeSite } from '../support/made-site.js';

const NOMINAL_V = 400;
const EACH_KVAR = 75;
const LOAD_A = 5;

// 75 kvar of old capacitors beside a bank of 75 kvar on 20 MVA: together at +10 % they resonate at order 11.
function siteWith(network: Partial<Site['network']> = {}): Site {
  return madeSite({
    bus: { nominalV: NOMINAL_V, highestV: NOMINAL_V },
    supply: { faultLevelMva: { max: 20, min: 20 }, rOverX: 0.1 },
    loads: {
      distorting: [{ name: 'drive', fundamentalA: 100, orders: [{ orderH: 11, pct: LOAD_A }] }],
      backgroundPct: [],
      dampingKw: { max: 0, min: 0 },
    },
    network: {
      buses: [{ name: 'A' }],
      capacitors: [{ bus: 'A', count: 1, ratedKvar: EACH_KVAR, ratedV: NOMINAL_V }],
      ...network,
    },
    bank: { stages: [{ count: 1, ratedKvar: EACH_KVAR, ratedV: NOMINAL_V }], interStageUh: 50 },
  });
}

/** |Z| seen at the bus, capacitance of the bank and of the network's own capacitors each by its factor. */
function impedance(h: number, bankFactor: number, networkFactor: number): number {
  const xOhm = NOMINAL_V ** 2 / 20e6 / Math.sqrt(1.01);
  const siemens = (EACH_KVAR * 1000 * (bankFactor + networkFactor)) / NOMINAL_V ** 2;
  const supply = new Complex(0.1 * xOhm * Math.sqrt(h), xOhm * h).inverse();
  return supply.plus(new Complex(0, h * siemens)).inverse().size;
}

const voltagePct = (bankFactor: number, networkFactor: number): number =>
  (100 * LOAD_A * impedance(11, bankFactor, networkFactor)) / (NOMINAL_V / Math.sqrt(3));

describe('capacitors of the network at the ends of their tolerance', () => {
  const scene = networkScene(siteWith());
  const { corners } = scene.model.corners;
  const factorOf = ({ networkCapacitanceFactor = 1 }: Corner): number => networkCapacitanceFactor;

  it('stand at each end in every corner of the bank, and as their nameplate says too', () => {
    const pairs = corners.slice(1).map(({ corner }) => `${corner.capacitanceFactor} ${factorOf(corner)}`);
    expect(new Set(pairs)).toEqual(new Set(['0.95 1', '0.95 0.95', '0.95 1.1', '1.1 1', '1.1 0.95', '1.1 1.1']));
    expect(factorOf(corners[0]!.corner)).toBe(1);
  });

  it('move the resonance as the closed form says', () => {
    const finder = new PeakFinder(scene.model, scene.bank);
    for (const corner of corners) {
      const peak = finder.greatest(Int32Array.of(1), corner)!;
      const [bank, own] = [corner.corner.capacitanceFactor, factorOf(corner.corner)];
      expect(peak.impedanceOhm / impedance(peak.orderH, bank, own)).toBeCloseTo(1, 9);
      const [before, after] = [-1e-4, 1e-4].map((step) => impedance(peak.orderH + step, bank, own));
      expect(peak.impedanceOhm).toBeGreaterThan(Math.max(before!, after!));
    }
  });

  it('make a verdict of avoid that no corner with them at their nameplate would', () => {
    const { control } = settleControl(undefined, scene.bank, scene.site);
    const { verdict, duties } = firmVerdict(scene.model, scene.bank, basisOf(scene, control));
    expect(verdict).toBe('avoid');
    const row = duties.find(({ name }) => name === 'harmonic voltage')!;
    expect(row.corner).toMatchObject({ capacitanceFactor: 1.1, networkCapacitanceFactor: 1.1 });
    expect(row.value / voltagePct(1.1, 1.1)).toBeCloseTo(1, 9);
    // control: without their tolerance the worst would stay within the limit
    expect(Math.max(voltagePct(1, 1), voltagePct(0.95, 1), voltagePct(1.1, 1))).toBeLessThan(row.limit!);
  });

  it('add nothing where they are out, and their reactors’ ends only where they have some', () => {
    const cornersOf = (site: Site): number => networkScene(site).model.corners.corners.length;
    const none = cornersOf(siteWith({ capacitors: [] }));
    expect(cornersOf(siteWith()) - 1).toBe(3 * (none - 1));
    const old = { bus: 'A', count: 1, ratedKvar: EACH_KVAR, ratedV: 480, reactorPct: 7 };
    expect(cornersOf(siteWith({ capacitors: [old] })) - 1).toBe(5 * (none - 1));
    expect(cornersOf(siteWith({ capacitors: [{ ...old, switched: true }] })) - 1).toBe(6 * (none - 1));
  });
});
