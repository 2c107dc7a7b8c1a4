// Second method: what the network's own capacitors carry, from the voltages of a circuit put together from the site file
// alone, every element a row (test/support/slow-circuit.ts).
import { describe, expect, it } from 'vitest';
import { readSite } from '#libs/contract/read-site.js';
import {
  basisOf,
  type Corner,
  type Duty,
  firmVerdict,
  type NetworkInput,
  networkScene,
  type Site,
  settleControl,
} from '#libs/engine/index.js';
import { busesNetlist } from '../support/buses-netlist.js';
import { madeSite } from '../support/made-site.js';
import { slowCircuit } from '../support/slow-circuit.js';

const NOMINAL_V = 400;
const LOAD_A = 100;
const OLD = { bus: 'B', count: 1, ratedKvar: 60, ratedV: 440 };

/** Two boards of one transformer, 100 A of the fifth at the first; plain capacitors at the second; invented. */
function siteWith(network: Partial<NetworkInput>, bankKvar: number): Site {
  return madeSite({
    bus: { nominalV: NOMINAL_V, highestV: 410 },
    supply: {
      faultLevelMva: { max: 150, min: 150 },
      rOverX: 0.1,
      resistanceExponent: 0.5,
      transformers: [{ bus: 'A', ratedKva: 630, impedancePct: 4, impedanceTolerancePct: 0, loadLossKw: 6 }],
    },
    loads: {
      motorSharePct: 60,
      distorting: [{ name: 'drive', bus: 'A', fundamentalA: 100, orders: [{ orderH: 5, pct: LOAD_A }] }],
      backgroundPct: [],
      dampingKw: { max: 0, min: 0 },
    },
    network: {
      buses: [{ name: 'A' }, { name: 'B' }],
      cables: [{ between: ['A', 'B'], lengthM: 40, resistanceOhmPerKm: 0.1, reactanceOhmPerKm: 0.08 }],
      ...network,
    },
    bank: { stages: [{ count: 1, ratedKvar: bankKvar, ratedV: 440 }], interStageUh: 50 },
  });
}

function judged(site: Site) {
  const scene = networkScene(site);
  const { control } = settleControl(site.control, scene.bank, scene.site);
  return firmVerdict(scene.model, scene.bank, basisOf(scene, control));
}

/** rms current of the old capacitors in a corner, from the circuit's voltage at their bus [A] */
function slowCurrentA(site: Site, corner: Corner, bankStages: number): number {
  const circuit = { tag: 'q', corner, toleranceSign: 0, counts: [bankStages], drive: { bus: 'A' } };
  const volts = slowCircuit(busesNetlist(site, circuit, 5), 5 * site.frequencyHz).get('n1q')!;
  const siemens = ((corner.networkCapacitanceFactor ?? 1) * OLD.ratedKvar * 1000) / OLD.ratedV ** 2;
  return Math.hypot((siemens * 410) / Math.sqrt(3), LOAD_A * volts * 5 * siemens);
}

const rowOf = (duties: readonly Duty[], name: string): Duty => duties.find((duty) => duty.name === name)!;

describe('capacitors that stand in the network apart from the bank', () => {
  // 625 kvar at 440 V are 568 at 400 V and +10 %: on the 14.2 MVA of the board they resonate at order 5.
  const site = siteWith({ capacitors: [OLD] }, 565);
  const { verdict, duties } = judged(site);
  const current = rowOf(duties, 'network capacitor current');

  it('are named where the bank overloads them, with bus, level, corner and number', () => {
    expect(verdict).toBe('avoid');
    expect(current).toMatchObject({ verdict: 'avoid', capacitors: 'capacitors 1', bus: 'B', group: null });
    expect(current.limit! / (1.3 * current.corner!.networkCapacitanceFactor!)).toBeCloseTo(
      (OLD.ratedKvar * 1000) / (Math.sqrt(3) * OLD.ratedV),
      9,
    );
    expect(current.value / slowCurrentA(site, current.corner!, 1)).toBeCloseTo(1, 9);
  });

  it('control: with the bank out the same circuit stays within the limit', () => {
    expect(slowCurrentA(site, current.corner!, 0)).toBeLessThan(current.limit!);
    expect(slowCurrentA(site, current.corner!, 1)).toBeGreaterThan(current.limit!);
  });

  it('are not the bank’s doing where they were as badly off without it', () => {
    const heavy = { ...site, loads: { ...site.loads, distorting: [] }, bus: { nominalV: NOMINAL_V, highestV: 500 } };
    const row = rowOf(judged(heavy).duties, 'network capacitor voltage');
    // 500 V on 440 V: over 1.10, bank or no bank
    expect(row).toMatchObject({ value: 500, verdict: 'watch' });
    expect(row.ratio).toBeCloseTo(500 / 484, 12);
  });

  it('have crest and kvar under IEEE 18, and neither under IEC 60831', () => {
    const names = (rules: Site['rules']): string[] =>
      judged({ ...site, rules })
        .duties.filter(({ capacitors }) => capacitors !== undefined)
        .map(({ name }) => name);
    expect(names('iec')).toEqual(['network capacitor voltage', 'network capacitor current']);
    expect(names('ieee')).toEqual([
      'network capacitor voltage',
      'network capacitor voltage, crest',
      'network capacitor current',
      'network capacitor reactive power',
    ]);
  });
});

describe('a further bank on another bus', () => {
  const further = { name: 'west', bus: 'B', stages: [{ count: 2, ratedKvar: 30, ratedV: 440 }] };
  const withBank = siteWith({ banks: [further] }, 50);
  const cornersOf = (site: Site): Corner[] => networkScene(site).model.corners.corners.map(({ corner }) => corner);

  it('is every switched set of the same stages, in other words', () => {
    const set = { ...further.stages[0]!, name: 'west', bus: 'B', switched: true };
    const [banks, sets] = [withBank, siteWith({ capacitors: [set] }, 50)].map((site) => judged(site).duties);
    // a row keeps the level and corner of its largest ratio; only what the standing is called differs
    const bare = (duties: readonly Duty[]) =>
      duties.map(({ corner, ...duty }) => ({ ...duty, corner: corner && { ...corner, standing: '' } }));
    expect(bare(banks!)).toEqual(bare(sets!));
  });

  it('stands at nothing, at each level and at all of it, each in every corner', () => {
    const standings = new Set(cornersOf(withBank).map(({ standing }) => standing ?? ''));
    expect(standings).toEqual(new Set(['', 'west out', 'west with 1 stages in']));
  });

  it('turns a verdict at a level of its own, and the row names it', () => {
    // 375 + 250 kvar hit order 5 at +10 %; without the 250, or with twice as much, the resonance is far from it
    const made = siteWith({ banks: [{ ...further, stages: [{ count: 2, ratedKvar: 250, ratedV: 440 }] }] }, 375);
    const row = rowOf(judged(made).duties, 'harmonic voltage');
    expect(row.verdict).toBe('avoid');
    expect(row.corner!.standing).toBe('west with 1 stages in');
    // control: neither all of it nor none of it makes as much
    const ratio = (capacitors: number): number => {
      const fixed = capacitors === 0 ? [] : [{ bus: 'B', count: capacitors, ratedKvar: 250, ratedV: 440 }];
      return rowOf(judged(siteWith({ capacitors: fixed }, 375)).duties, 'harmonic voltage').value;
    };
    expect(row.value).toBeGreaterThan(1.05 * Math.max(ratio(0), ratio(2)));
    expect(row.value / ratio(1)).toBeCloseTo(1, 9);
  });

  it('is read with its reactors in any form, and says that its switching is not simulated', () => {
    const { network, ...site } = withBank;
    const stages = [{ ...further.stages[0], ratedKvar: '0.03 Mvar', tunedHz: 189 }];
    const read = readSite({ ...site, network: { ...network, banks: [{ ...further, stages }] } });
    expect(read.network!.banks![0]!.stages[0]).toMatchObject({ ratedKvar: 30 });
    expect(read.network!.banks![0]!.stages[0]!.reactorPct).toBeCloseTo(100 * (50 / 189) ** 2, 12);
    const paths = read.understood!.map(({ path }) => path);
    expect(paths).toContain('network.banks[0].stages[0].tunedHz');
  });

  it('on a bus that does not exist, or tuned twice, is refused by its path', () => {
    const { network, ...site } = withBank;
    const stages = [{ ...further.stages[0], tunedHz: 189, reactorPct: 7 }];
    const refused = () => readSite({ ...site, network: { ...network, banks: [{ ...further, bus: 'Z', stages }] } });
    expect(refused).toThrow(/network\.banks\[0\]\.bus/);
    expect(refused).toThrow(/network\.banks\[0\]\.stages\[0\]/);
  });
});
