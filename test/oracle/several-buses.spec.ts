// Reference: ngspice 45 as packed in eecircuit-engine 1.8.0, a general-purpose circuit simulator. The circuits are
// built from the site file alone (test/support/buses-netlist.ts): R, L and C of every part, one an order because
// resistances grow as h^k.
import { beforeAll, describe, expect, it } from 'vitest';
import {
  bankModel,
  type CornerCase,
  combine,
  type DistortingLoad,
  eachFlow,
  networkScene,
  type Site,
  scanSite,
} from '#libs/engine/index.js';
import { busesNetlist, type Circuit, type Drive } from '../support/buses-netlist.js';
import { chance } from '../support/chance.js';
import { CircuitSimulator, type Magnitudes } from '../support/circuit-simulator.js';
import { madeBuses } from '../support/made-buses.js';
import { runs, SEED, SOAKED } from '../support/soak.js';

const simulator = new CircuitSimulator();
beforeAll(() => simulator.start(), 60_000);

/** The project promises 1e-6; what is reached is held. */
const RELATIVE = 1e-9;
const SCENES = 3;
const LOAD_A = 100;
const BACKGROUND_PCT = 1;

/** One level in one corner of a generated site. */
interface Scene {
  corner: CornerCase;
  index: number;
  toleranceSign: number;
  vector: Int32Array;
  level: number;
  levelKvar: number;
}

interface Case {
  number: number;
  site: Site;
  ordersH: number[];
  scenes: Scene[];
}

function madeCase(number: number): Case {
  const random = chance(SEED + 7919 * number);
  const site = madeBuses(random);
  const { model, levels } = networkScene(site);
  const { corners } = model.corners;
  const scene = (index: number, level: number): Scene => ({
    corner: corners[index]!,
    index,
    toleranceSign: index === 0 ? 0 : index <= (corners.length - 1) / 2 ? -1 : 1,
    vector: levels[level]!.vectors[0]!,
    level,
    levelKvar: levels[level]!.levelKvar,
  });
  const scenes = Array.from({ length: SCENES - 1 }, () =>
    scene(random.whole(0, corners.length - 1), random.whole(0, levels.length - 1)),
  );
  const drawn = [random.oneOf([5, 7, 11, 13]), random.whole(2, 50), Math.round(random.between(1, 30) * 100) / 100];
  return { number, site, ordersH: [...new Set(drawn)], scenes: [scene(0, levels.length - 1), ...scenes] };
}

const cases = Array.from({ length: SOAKED ? 200 : 11 }, (_, k) => madeCase(k));

const busNames = (site: Site): string[] => site.network!.buses.map(({ name }) => name);
const drives = (site: Site): Drive[] => [...busNames(site).map((bus): Drive => ({ bus })), 'background'];

// Every bus driven alone and the background alone, all in one netlist.
async function simulated(made: Case, scene: Scene, orderH: number): Promise<Magnitudes[]> {
  const circuits = drives(made.site).map(
    (drive, k): Circuit => ({
      tag: `q${k}`,
      corner: scene.corner.corner,
      toleranceSign: scene.toleranceSign,
      counts: scene.vector,
      drive,
    }),
  );
  const lines = circuits.flatMap((circuit) => busesNetlist(made.site, circuit, orderH));
  const names = (tag: string): string[] => [
    ...busNames(made.site).map((_, k) => `v(n${k}${tag})`),
    `i(ls${tag})`,
    `i(va${tag})`,
  ];
  const wanted = circuits.flatMap(({ tag }) => names(tag));
  const found = await simulator.magnitudes(lines, orderH * made.site.frequencyHz, wanted);
  return circuits.map(({ tag }) => new Map(names(tag).map((name) => [name.replace(tag, ''), found.get(name)!])));
}

interface Flowed {
  buses: Float64Array[];
  sourceA: Float64Array;
  bankA: Float64Array;
}

// The engine's flow in one scene of a site with these loads and this background.
function flowed(made: Case, scene: Scene, drive: { at?: readonly string[]; background: boolean }): Flowed {
  const orders = made.ordersH.map((orderH) => ({ orderH, pct: 50 }));
  const distorting = (drive.at ?? []).map(
    (bus): DistortingLoad => ({ name: bus, bus, fundamentalA: 2 * LOAD_A, orders }),
  );
  const backgroundPct = drive.background ? made.ordersH.map((orderH) => ({ orderH, pct: BACKGROUND_PCT })) : [];
  const { model, bank, levels } = networkScene({
    ...made.site,
    loads: { ...made.site.loads, distorting, backgroundPct },
  });
  const here = model.corners.corners[scene.index]!;
  const level = { ...levels[scene.level]!, vectors: [scene.vector] };
  const found: Flowed[] = [];
  eachFlow({ ...model, corners: { ...model.corners, corners: [here] } }, bankModel(model, bank, [level]), (flow) => {
    const place = made.ordersH.map((h) => flow.ordersH.indexOf(h));
    const inOrder = (column: Float64Array): Float64Array => Float64Array.from(place, (i) => column[i]!);
    found.push({
      buses: flow.buses.map(({ voltageV }) => inOrder(voltageV)),
      sourceA: inOrder(flow.sourceA),
      bankA: inOrder(flow.bankA),
    });
  });
  return found[0]!;
}

const backgroundV = (site: Site): number => ((BACKGROUND_PCT / 100) * site.bus.nominalV) / Math.sqrt(3);

// Where a background meets nothing but an open end no current flows: both are rounding.
function off(engine: number, circuit: number, floor = 0): number {
  return Math.abs(engine - circuit) <= floor ? 0 : Math.abs(engine - circuit) / circuit;
}

// The part of a flow that is farthest from the circuit.
function worstPart(
  flow: Flowed,
  i: number,
  { circuit, eachOf }: { circuit: Magnitudes; eachOf: number },
): { part: string; worst: number } {
  const at = (name: string): number => eachOf * circuit.get(name)!;
  const parts = [
    ...flow.buses.map((voltageV, k) => ({ part: `bus ${k}`, worst: off(voltageV[i]!, at(`v(n${k})`)) })),
    { part: 'source', worst: off(flow.sourceA[i]!, at('i(ls)'), 1e-9) },
    { part: 'bank', worst: off(flow.bankA[i]!, at('i(va)'), 1e-9) },
  ];
  return parts.reduce((most, each) => (each.worst > most.worst ? each : most));
}

describe(`networks of several buses against a circuit simulator (seed ${SEED})`, () => {
  it('meets every kind of network: rings, couplers of every state, several transformers, one out', () => {
    const parts = cases.map(({ site: { network, supply } }) => ({ ...network!, transformers: supply.transformers! }));
    const standings = cases.flatMap(({ scenes }) => scenes.map(({ corner }) => corner.corner.standing ?? ''));
    expect(new Set(parts.map(({ buses }) => buses.length)).size).toBeGreaterThan(4);
    expect(parts.some(({ cables, couplers, buses }) => cables!.length + couplers!.length >= buses.length)).toBe(true);
    const states = parts.flatMap(({ couplers }) => couplers!.map(({ state }) => state));
    expect(new Set(states)).toEqual(new Set(SOAKED ? ['open', 'closed', 'either'] : states));
    expect(states).toContain('closed');
    expect(parts.some(({ transformers }) => transformers.length === 0)).toBe(true);
    expect(parts.some(({ transformers }) => transformers.length > 1)).toBe(true);
    expect(parts.some(({ capacitors }) => capacitors!.length > 1)).toBe(true);
    expect(standings.some((standing) => standing !== '')).toBe(true);
    if (SOAKED) {
      for (const word of ['closed', 'running', ' of ', 'out']) {
        expect(
          standings.some((standing) => standing.includes(word)),
          word,
        ).toBe(true);
      }
    }
  });

  it.each(cases)(
    'network $number: voltages, source and bank current of each load alone and of the background alone',
    async (made) => {
      for (const scene of made.scenes) {
        const alone = drives(made.site).map((drive) =>
          flowed(made, scene, drive === 'background' ? { background: true } : { at: [drive.bus], background: false }),
        );
        for (const [i, orderH] of made.ordersH.entries()) {
          const circuits = await simulated(made, scene, orderH);
          for (const [d, circuit] of circuits.entries()) {
            const eachOf = d < circuits.length - 1 ? LOAD_A : backgroundV(made.site);
            const { part, worst } = worstPart(alone[d]!, i, { circuit, eachOf });
            const at = { seed: SEED, network: made.number, orderH, drive: d, corner: scene.corner.corner };
            expect(worst, `${part} ${JSON.stringify(at)}`).toBeLessThan(RELATIVE);
          }
        }
      }
    },
    120_000,
  );

  it.each(cases.slice(0, runs(5, 60)))(
    'network $number: impedance over order at every bus, as the scan gives it',
    async (made) => {
      for (const scene of made.scenes) {
        const options = { levelKvar: scene.levelKvar, corner: scene.index, ordersH: Float64Array.from(made.ordersH) };
        const { levels } = scanSite(made.site, options);
        expect(levels.map(({ bus }) => bus)).toEqual(busNames(made.site));
        for (const [i, orderH] of made.ordersH.entries()) {
          const circuits = await simulated(made, scene, orderH);
          for (const [k, { impedanceOhm }] of levels.entries()) {
            const label = JSON.stringify({ seed: SEED, network: made.number, orderH, bus: k });
            expect(off(impedanceOhm[i]!, circuits[k]!.get(`v(n${k})`)!), label).toBeLessThan(RELATIVE);
          }
        }
      }
    },
    120_000,
  );

  it.each(cases)('network $number: loads of several buses and the background combine with the exponent', (made) => {
    const scene = made.scenes[1]!;
    const buses = busNames(made.site);
    const each = [
      ...buses.map((bus) => flowed(made, scene, { at: [bus], background: false })),
      flowed(made, scene, { background: true }),
    ];
    const all = flowed(made, scene, { at: buses, background: true });
    const combined = (i: number, of: (flow: Flowed) => Float64Array): number => {
      const h = made.ordersH[i]!;
      const alpha = h < 5 ? 1 : h <= 10 ? 1.4 : 2;
      return each.reduce((sum, flow) => combine(sum, of(flow)[i]!, alpha), 0);
    };
    for (const i of made.ordersH.keys()) {
      for (const k of buses.keys()) {
        expect(all.buses[k]![i]! / combined(i, (flow) => flow.buses[k]!)).toBeCloseTo(1, 9);
      }
      expect(all.sourceA[i]! / combined(i, (flow) => flow.sourceA)).toBeCloseTo(1, 9);
    }
  });

  it('control: a circuit with one cable a little longer is told apart', async () => {
    const made = cases.find(({ site }) => site.network!.cables!.length > 0)!;
    const scene = made.scenes[0]!;
    const [cable, ...others] = made.site.network!.cables!;
    const longer = { ...made.site.network!, cables: [{ ...cable!, lengthM: cable!.lengthM * 1.001 }, ...others] };
    const changed = { ...made, site: { ...made.site, network: longer } };
    const [i, orderH] = [1, made.ordersH[1]!];
    const circuits = await simulated(changed, scene, orderH);
    const worst = busNames(made.site).reduce((most, bus, d) => {
      const { buses } = flowed(made, scene, { at: [bus], background: false });
      return Math.max(most, ...buses.map((v, k) => off(v[i]!, LOAD_A * circuits[d]!.get(`v(n${k})`)!)));
    }, 0);
    expect(worst).toBeGreaterThan(1e3 * RELATIVE);
  });
});
