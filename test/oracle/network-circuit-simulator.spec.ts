// Reference: ngspice 45 as packed in eecircuit-engine 1.8.0, a general-purpose circuit simulator. The circuits are
// built here from the nameplates alone: R, L and C of every part, one netlist an order because resistances grow as h^k.
import { beforeAll, describe, expect, it } from 'vitest';
import {
  bankLevels,
  bankModel,
  type CornerCase,
  eachFlow,
  type Flow,
  type Loads,
  networkModel,
  type OrderPct,
  type Site,
  type StageGroup,
  scanSite,
} from '#libs/engine/index.js';
import { CircuitSimulator, type Magnitudes } from '../support/circuit-simulator.js';
import { madeSite } from '../support/made-site.js';

const simulator = new CircuitSimulator();
beforeAll(() => simulator.start(), 60_000);

/** The stated limit of the comparison. */
const RELATIVE = 1e-9;
const ORDERS_H = [1, 2, 3.7, 5, 7, 11.5, 13, 25, 49];

const group = (parts: Partial<StageGroup>): StageGroup => ({
  count: 1,
  ratedKvar: 50,
  ratedV: 400,
  reactorPct: 0,
  reactorQuality: 30,
  dischargeOhm: null,
  reactorMaxA: null,
  switchPeakA: null,
  fixed: false,
  ...parts,
});

interface Network {
  name: string;
  nominalV: number;
  frequencyHz: number;
  faultLevelMva: { max: number; min: number };
  rOverX: number;
  exponent: number;
  transformers: { ratedKva: number; impedancePct: number; impedanceTolerancePct: number; loadLossKw: number }[];
  motorSharePct: number;
  dampingKw: { max: number; min: number };
  groups: StageGroup[];
}

const NETWORKS: Network[] = [
  {
    name: 'plain bank behind one transformer',
    nominalV: 400,
    frequencyHz: 50,
    faultLevelMva: { max: 250, min: 120 },
    rOverX: 0.1,
    exponent: 0.5,
    transformers: [{ ratedKva: 1000, impedancePct: 6, impedanceTolerancePct: 10, loadLossKw: 10.5 }],
    motorSharePct: 60,
    dampingKw: { max: 400, min: 90 },
    groups: [group({ count: 6 })],
  },
  {
    name: 'tuned bank behind two unequal transformers',
    nominalV: 480,
    frequencyHz: 60,
    faultLevelMva: { max: 300, min: 80 },
    rOverX: 0.35,
    exponent: 0.8,
    transformers: [
      { ratedKva: 1000, impedancePct: 5.75, impedanceTolerancePct: 7.5, loadLossKw: 14 },
      { ratedKva: 630, impedancePct: 4, impedanceTolerancePct: 0, loadLossKw: 3.1 },
    ],
    motorSharePct: 100,
    dampingKw: { max: 250, min: 0 },
    groups: [group({ count: 4, ratedV: 600, ratedKvar: 75, reactorPct: 7, reactorQuality: 22 })],
  },
  {
    name: 'tuned and plain stages together, no transformer, no motors',
    nominalV: 690,
    frequencyHz: 50,
    faultLevelMva: { max: 20, min: 20 },
    rOverX: 1,
    exponent: 1,
    transformers: [],
    motorSharePct: 0,
    dampingKw: { max: 120, min: 120 },
    groups: [
      group({ count: 2, ratedV: 800, ratedKvar: 60, reactorPct: 5.67, reactorQuality: 80 }),
      group({ count: 1, ratedV: 800, ratedKvar: 100, reactorPct: 14, reactorQuality: 15 }),
      group({ count: 1, ratedV: 690, ratedKvar: 25 }),
    ],
  },
];

/** One circuit: a corner and a count of stages, driven by 1 A at the bus or by 1 V behind the source. */
interface Copy {
  tag: string;
  corner: CornerCase['corner'];
  /** sign of the tolerance on u_k: as given, least, most */
  toleranceSign: number;
  vector: Int32Array;
  drive: 'bus' | 'background';
}

// Every part of one circuit; nodes and elements carry the circuit's tag.
function elements(network: Network, copy: Copy, orderH: number): string[] {
  const { nominalV, exponent, frequencyHz } = network;
  const t = copy.tag;
  const growth = orderH ** exponent;
  const henry = (ohm: number): number => ohm / (2 * Math.PI * frequencyHz);
  const coil = (name: string, from: string, to: string, ohm: { r: number; x: number }): string[] => [
    `r${name}${t} ${from}${t} m${name}${t} ${ohm.r * growth}`,
    `l${name}${t} m${name}${t} ${to === '0' ? '0' : to + t} ${henry(ohm.x)}`,
  ];
  const z = nominalV ** 2 / (copy.corner.faultLevelMva * 1e6);
  const x = z / Math.sqrt(1 + network.rOverX ** 2);
  const lines = [
    `v${t} e${t} 0 dc 0 ac ${copy.drive === 'background' ? 1 : 0}`,
    `i${t} 0 b${t} dc 0 ac ${copy.drive === 'bus' ? 1 : 0}`,
    ...coil('s', 'e', network.transformers.length > 0 ? 'p' : 'b', { r: network.rOverX * x, x }),
    ...network.transformers.flatMap((transformer, k) => {
      const baseOhm = nominalV ** 2 / (transformer.ratedKva * 1000);
      const r = (transformer.loadLossKw / transformer.ratedKva) * baseOhm;
      const tolerance = (copy.toleranceSign * transformer.impedanceTolerancePct) / 100;
      const zt = (transformer.impedancePct / 100) * (1 + tolerance) * baseOhm;
      return coil(`t${k}`, 'p', 'b', { r, x: Math.sqrt(zt ** 2 - r ** 2) });
    }),
    `va${t} b${t} k${t} dc 0 ac 0`,
  ];
  const motorKw = (network.motorSharePct / 100) * copy.corner.dampingKw;
  const restKw = copy.corner.dampingKw - motorKw;
  if (motorKw > 0) {
    const xm = nominalV ** 2 / (motorKw * 1000) / 6;
    lines.push(...coil('m', 'b', '0', { r: 0.3 * xm, x: xm }));
  }
  if (restKw > 0) lines.push(`rr${t} b${t} 0 ${nominalV ** 2 / (restKw * 1000)}`);
  network.groups.forEach((stage, g) => {
    const xc = stage.ratedV ** 2 / (stage.ratedKvar * 1000);
    const xl = (stage.reactorPct / 100) * xc;
    const farad = copy.corner.capacitanceFactor / (2 * Math.PI * frequencyHz * xc);
    for (let n = 0; n < copy.vector[g]!; n++) {
      const from = xl > 0 ? `n${g}x${n}` : 'k';
      if (xl > 0) {
        // The resistance is the nominal reactor's: the tolerance moves its reactance alone.
        lines.push(
          ...coil(`g${g}x${n}`, 'k', from, { r: xl / stage.reactorQuality, x: xl * copy.corner.inductanceFactor }),
        );
      }
      lines.push(`c${g}x${n}${t} ${from}${t} 0 ${farad}`);
    }
  });
  return lines;
}

interface Visited {
  copy: Omit<Copy, 'drive' | 'tag'>;
  voltageV: Float64Array;
  sourceA: Float64Array;
  bankA: Float64Array;
}

// What the engine makes of 100 A at every order, or of 1 % behind the source at every order.
function engineFlows(network: Network, drive: Copy['drive']): { visited: Visited[]; each: number } {
  const every = (pct: number): OrderPct[] => ORDERS_H.map((orderH) => ({ orderH, pct }));
  const loads: Loads = {
    motorSharePct: network.motorSharePct,
    distorting: drive === 'bus' ? [{ name: 'drive', fundamentalA: 200, orders: every(50) }] : [],
    backgroundPct: drive === 'background' ? every(1) : [],
    dampingKw: network.dampingKw,
    summation: 'exponent',
  };
  const supply = {
    faultLevelMva: network.faultLevelMva,
    rOverX: network.rOverX,
    resistanceExponent: network.exponent,
    rippleHz: null,
    transformers: network.transformers.map((t) => ({ ...t, noLoadLossKw: 0, noLoadCurrentPct: 0 })),
  };
  const model = networkModel(supply, loads, network.nominalV, 100);
  const bank = { groups: network.groups, interStageUh: 2, interStageGiven: true, ambientCategory: null };
  const tables = bankModel(model, bank, bankLevels(bank, network.nominalV));
  const visited: Visited[] = [];
  eachFlow(model, tables, ({ corner, vector, voltageV, sourceA, bankA }: Flow) => {
    const index = model.corners.corners.indexOf(corner);
    // Nominal first; then half of the corners at the greatest fault level, half at the least.
    const toleranceSign = index === 0 ? 0 : index <= (model.corners.corners.length - 1) / 2 ? -1 : 1;
    visited.push({
      copy: { corner: corner.corner, toleranceSign, vector },
      voltageV: voltageV.slice(),
      sourceA: sourceA.slice(),
      bankA: bankA.slice(),
    });
  });
  return { visited, each: drive === 'bus' ? 100 : (0.01 * network.nominalV) / Math.sqrt(3) };
}

async function simulated(network: Network, copies: Copy[], orderH: number): Promise<Magnitudes> {
  const lines = copies.flatMap((copy) => elements(network, copy, orderH));
  return simulator.magnitudes(lines, orderH * network.frequencyHz);
}

function worstOff(pairs: { engine: number; circuit: number }[]): number {
  return pairs.reduce((worst, { engine, circuit }) => Math.max(worst, Math.abs(engine - circuit) / circuit), 0);
}

describe.each(NETWORKS)('$name, against a circuit simulator', (network) => {
  it.each(['bus', 'background'] as const)(
    'gives bus voltage, source current and bank current for a source at the %s, every corner and level',
    async (drive) => {
      const { visited, each } = engineFlows(network, drive);
      const copies = visited.map(({ copy }, k): Copy => ({ ...copy, drive, tag: `q${k}` }));
      expect(new Set(copies.map(({ corner }) => JSON.stringify(corner))).size).toBeGreaterThan(8);
      for (const [i, orderH] of ORDERS_H.entries()) {
        const circuit = await simulated(network, copies, orderH);
        const pairs = visited.flatMap(({ voltageV, sourceA, bankA, copy }, k) => {
          const at = (name: string): number => each * circuit.get(name)!;
          const found = [{ engine: voltageV[i]!, circuit: at(`v(bq${k})`) }];
          const bankIn = copy.vector.some((count) => count > 0);
          if (bankIn) found.push({ engine: bankA[i]!, circuit: at(`i(vaq${k})`) });
          else expect(bankA[i]).toBe(0);
          // With nothing at the bus a background drives no current: both are rounding, and have no relative error.
          if (bankIn || drive === 'bus' || copy.corner.dampingKw > 0) {
            found.push({ engine: sourceA[i]!, circuit: at(`i(lsq${k})`) });
          } else expect(sourceA[i]!).toBeLessThan(1e-9);
          return found;
        });
        expect(pairs.length).toBeGreaterThan(2 * copies.length - 1);
        expect(worstOff(pairs), `order ${orderH}`).toBeLessThan(RELATIVE);
      }
    },
    120_000,
  );

  it('scans the same impedance over order in every corner', async () => {
    const site = siteOf(network);
    const { levels } = scanSite(site, { ordersH: Float64Array.from(ORDERS_H) });
    const vector = Int32Array.from(network.groups, ({ count }) => count);
    const copies = levels.map(
      ({ corner }, k): Copy => ({
        corner,
        toleranceSign: k === 0 ? 0 : k <= (levels.length - 1) / 2 ? -1 : 1,
        vector,
        drive: 'bus',
        tag: `q${k}`,
      }),
    );
    for (const [i, orderH] of ORDERS_H.entries()) {
      const circuit = await simulated(network, copies, orderH);
      const pairs = levels.map((level, k) => ({ engine: level.impedanceOhm[i]!, circuit: circuit.get(`v(bq${k})`)! }));
      expect(worstOff(pairs), `order ${orderH}`).toBeLessThan(RELATIVE);
    }
  }, 120_000);

  it('control: a circuit whose resistances do not grow with the order is told apart', async () => {
    const { visited, each } = engineFlows(network, 'bus');
    const last = visited.length - 1;
    const copy: Copy = { ...visited[last]!.copy, drive: 'bus', tag: 'q0' };
    const circuit = await simulated({ ...network, exponent: 0 }, [copy], 13);
    const at13 = ORDERS_H.indexOf(13);
    expect(
      worstOff([{ engine: visited[last]!.voltageV[at13]!, circuit: each * circuit.get('v(bq0)')! }]),
    ).toBeGreaterThan(1e3 * RELATIVE);
  });
});

function siteOf(network: Network): Site {
  return madeSite({
    frequencyHz: network.frequencyHz,
    bus: { nominalV: network.nominalV },
    supply: {
      faultLevelMva: network.faultLevelMva,
      rOverX: network.rOverX,
      resistanceExponent: network.exponent,
      arrangement: 'parallel',
      transformers: network.transformers,
    },
    loads: {
      motorSharePct: network.motorSharePct,
      distorting: [],
      backgroundPct: [],
      dampingKw: network.dampingKw,
    },
    bank: {
      stages: network.groups.map(({ count, ratedKvar, ratedV, reactorPct, reactorQuality }) => ({
        count,
        ratedKvar,
        ratedV,
        reactorPct,
        reactorQuality,
      })),
    },
  });
}
