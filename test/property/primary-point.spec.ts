// Second methods: the circuit put together from the site file alone, every element a row (test/support/slow-circuit.ts),
// and the same site written as a network of one bus.
import { describe, expect, it } from 'vitest';
import {
  assessBank,
  bankModel,
  eachFlow,
  InputProblem,
  networkScene,
  type Site,
  UTC_TABLE,
} from '#libs/engine/index.js';
import { busesNetlist, type Drive } from '../support/buses-netlist.js';
import { type Chance, chance } from '../support/chance.js';
import { madeBuses } from '../support/made-buses.js';
import { madeRecord } from '../support/made-record.js';
import { madeSite } from '../support/made-site.js';
import { slowCircuit } from '../support/slow-circuit.js';
import { runs, SEED } from '../support/soak.js';

const ORDERS_H = [5, 7, 13];

// One load at a bus of chance, or the background, so that a voltage is one magnitude.
function drivenSite(random: Chance, made: Site): { site: Site; drive: Drive; by: number } {
  const bus = random.oneOf(made.network!.buses.map(({ name }) => name));
  const orders = ORDERS_H.map((orderH) => ({ orderH, pct: 50 }));
  const isLoad = random.next() < 0.5;
  const loads = {
    ...made.loads,
    distorting: isLoad ? [{ name: 'drive', bus, fundamentalA: 200, orders }] : [],
    backgroundPct: isLoad ? [] : ORDERS_H.map((orderH) => ({ orderH, pct: 1 })),
  };
  const backgroundV = (0.01 * made.bus.nominalV) / Math.sqrt(3);
  const network = { ...made.network!, couplingPoint: 'primary' };
  return { site: { ...made, loads, network }, drive: isLoad ? { bus } : 'background', by: isLoad ? 100 : backgroundV };
}

function furthest(random: Chance, made: Site): number {
  const { site, drive, by } = drivenSite(random, made);
  const { model, bank, levels } = networkScene(site);
  const { corners } = model.corners;
  const index = random.whole(0, corners.length - 1);
  const vector = random.oneOf(levels).vectors[0]!;
  const toleranceSign = index === 0 ? 0 : index <= (corners.length - 1) / 2 ? -1 : 1;
  const here = { ...model, corners: { ...model.corners, corners: [corners[index]!] } };
  const level = { levelKvar: 0, vectors: [vector] };
  let worst = 0;
  eachFlow(here, bankModel(here, bank, [level]), ({ primary }) => {
    for (const [i, orderH] of ORDERS_H.entries()) {
      const circuit = { tag: 'q', corner: corners[index]!.corner, toleranceSign, counts: vector, drive };
      const volts = slowCircuit(busesNetlist(site, circuit, orderH), orderH * site.frequencyHz).get('primq')! * by;
      worst = Math.max(worst, Math.abs(primary!.voltageV[i]! / volts - 1));
    }
  });
  return worst;
}

describe(`the voltage at the transformers’ primary (seed ${SEED})`, () => {
  it('is that of the circuit, in networks of chance', () => {
    let looked = 0;
    for (let k = 0; k < runs(40, 800); k++) {
      const random = chance(SEED + 379 * k);
      const made = madeBuses(random);
      if (made.supply.transformers!.length === 0) continue;
      looked++;
      expect(furthest(random, made), `site ${k}`).toBeLessThan(1e-9);
    }
    expect(looked).toBeGreaterThan(20);
  });

  it('of a site with one bus is that of the same site written as a network', () => {
    const site = madeSite({
      meteredAt: 'primary',
      loads: {
        distorting: [{ name: 'drive', fundamentalA: 200, orders: [5, 7, 13].map((orderH) => ({ orderH, pct: 20 })) }],
        backgroundPct: [5, 7].map((orderH) => ({ orderH, pct: 1 })),
        dampingKw: { max: 100, min: 20 },
      },
      bank: { stages: [{ count: 3, ratedKvar: 25, ratedV: 525, reactorPct: 7 }], interStageUh: 20 },
    });
    const [one, several] = [site, { ...site, network: { buses: [{ name: 'main' }] } }].map((each) => {
      const { model, bank, levels } = networkScene(each);
      const found: number[] = [];
      eachFlow(model, bankModel(model, bank, levels), ({ primary }) => found.push(...primary!.voltageV));
      return found;
    });
    expect(one!.length).toBeGreaterThan(100);
    for (const [k, volts] of one!.entries()) expect(volts / several![k]!).toBeCloseTo(1, 9);
  });

  it('is named where it is the one that passes a limit', () => {
    // Far behind a small transformer the bus follows the primary, and the ieee row from 1 kV on is the tighter.
    const site = madeSite({
      rules: 'ieee',
      meteredAt: 'primary',
      loads: { distorting: [], backgroundPct: [{ orderH: 5, pct: 4 }], dampingKw: { max: 0 } },
      bank: { stages: [{ count: 1, ratedKvar: 25, ratedV: 525, reactorPct: 7 }], interStageUh: 20 },
    });
    const record = madeRecord({ activeKw: [200, 220], reactiveKvar: [120, 130] });
    const { result } = assessBank(site, record, UTC_TABLE);
    const row = (name: string) => result.duties.find((duty) => duty.name === name)!;
    expect(row('harmonic voltage at the primary')).toMatchObject({ bus: 'primary', limit: 3, orderH: 5 });
    expect(row('harmonic voltage at the primary').ratio).toBeGreaterThan(1);
    expect(row('harmonic voltage').limit).toBe(5);
    const atBus = assessBank({ ...site, meteredAt: 'bus' }, record, UTC_TABLE).result;
    expect(atBus.duties.some(({ bus }) => bus === 'primary')).toBe(false);
  });
});

describe('a record at the primary of several transformers', () => {
  const transformer = { ratedKva: 630, impedancePct: 6, loadLossKw: 6.5 };
  const site = (couplers: NonNullable<Site['network']>['couplers']): Site =>
    madeSite({
      meteredAt: 'primary',
      supply: {
        faultLevelMva: { max: 250 },
        transformers: [
          { ...transformer, bus: 'A' },
          { ...transformer, bus: 'B' },
        ],
      },
      network: { buses: [{ name: 'A' }, { name: 'B' }], couplers: couplers! },
      bank: { stages: [{ count: 2, ratedKvar: 25, ratedV: 525, reactorPct: 7 }], interStageUh: 20 },
    });
  const record = madeRecord({ activeKw: [200, 220], reactiveKvar: [120, 130] });

  it('on boards of their own is refused, naming them: it does not say how the load divides', () => {
    expect(() => assessBank(site([]), record, UTC_TABLE)).toThrow(InputProblem);
    expect(() => assessBank(site([]), record, UTC_TABLE)).toThrow(/"A", "B"/);
  });

  it('on one board is taken through all of them in parallel', () => {
    const joined = assessBank(site([{ between: ['A', 'B'], state: 'closed' }]), record, UTC_TABLE);
    const twin = { ...site([]), network: undefined };
    const { network: _, ...plain } = { ...twin, supply: { ...twin.supply, arrangement: 'parallel' as const } };
    const alone = assessBank(plain, record, UTC_TABLE);
    expect(joined.result.requirement.maxKvar).toBeCloseTo(alone.result.requirement.maxKvar, 9);
  });
});
