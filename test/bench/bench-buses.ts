import {
  type BusColumns,
  busColumns,
  type ComplexColumn,
  type CornerCase,
  invertInto,
  type NetworkScene,
  networkColumns,
  networkScene,
  nodalTable,
  type Site,
  scanBusesInto,
  stageAdmittance,
  stageBranch,
} from '#libs/engine/index.js';
import type { TwinWork } from './compare-twins.js';

const BUSES = 6;
const LEVELS = 64;
const ORDERS = 2451;
const CORNERS = 8;

/** 1/|Z|² in a network of six buses; the twin factorises the network at every level, corner and order. */
export function busesWorks(): TwinWork[] {
  return [
    scanOf("the bank's bus", 1, 1 / 60),
    // One factorisation serves the twin for six buses too, and a root a point is most of what is left to us.
    scanOf('every bus', BUSES, 1 / 30),
  ];
}

function scanOf(what: string, buses: number, limit: number): TwinWork {
  const scene = networkScene(sixBuses());
  const { model, bank } = scene;
  const ordersH = Float64Array.from({ length: ORDERS }, (_, i) => 1 + i * 0.02);
  const counts = Float64Array.from({ length: LEVELS }, (_, i) => i);
  // The network's own capacitors as their nameplates say: at their ends a corner costs the same.
  const corners = model.corners.corners.slice(1).filter(({ corner }) => corner.networkCapacitanceFactor === undefined);
  if (corners.length !== CORNERS || bank.groups.length !== 1) throw new Error('eight corners of one group were meant');
  const size = buses * LEVELS * ORDERS;
  const output = new Float64Array(CORNERS * size);
  const stageAt = (factors: number) =>
    stageAdmittance(stageBranch(bank.groups[0]!, model.corners.factors[factors]!, 0.5), ordersH);
  const columnsOf = (network: number): BusColumns[] =>
    buses === 1 ? [busColumns(model, network, model.bankBus, ordersH)] : networkColumns(model, network, ordersH);
  return {
    title: `1/|Z|² of ${what} of ${BUSES}, ${LEVELS} levels, ${CORNERS} corners, ${ORDERS} orders, factorised at every point`,
    twin: 'buses',
    limit,
    runs: { ours: 40, twin: 5 },
    input: twinInput(scene, { buses, corners, ordersH, counts, stageAt }),
    ours: () => {
      const columns: BusColumns[][] = [];
      const stages: ComplexColumn[] = [];
      for (const [k, { network, factors }] of corners.entries()) {
        columns[network] ??= columnsOf(network);
        stages[factors] ??= stageAt(factors);
        scanBusesInto(columns[network], stages[factors], counts, output.subarray(k * size, (k + 1) * size));
      }
    },
    output: () => output,
  };
}

/** Two transformers on boards of their own, the rest hung from them by cables, one ring, some capacitors. */
function sixBuses(): Site {
  const cable = (from: number, to: number, lengthM: number) => ({
    between: [`b${from}`, `b${to}`] as [string, string],
    lengthM,
    resistanceOhmPerKm: 0.12,
    reactanceOhmPerKm: 0.08,
  });
  return {
    name: 'Made-up works',
    timeZone: 'UTC',
    rules: 'iec',
    frequencyHz: 50,
    bus: { nominalV: 400 },
    meteredAt: 'bus',
    supply: {
      faultLevelMva: { max: 250, min: 180 },
      transformers: [
        { bus: 'b0', ratedKva: 1000, impedancePct: 6, loadLossKw: 10.5 },
        { bus: 'b1', ratedKva: 800, impedancePct: 6, loadLossKw: 8.5 },
      ],
    },
    loads: { distorting: [], backgroundPct: [], dampingKw: { max: 0, min: 0 } },
    network: {
      buses: Array.from({ length: BUSES }, (_, k) => ({ name: `b${k}` })),
      cables: [cable(0, 2, 80), cable(0, 3, 120), cable(1, 4, 60), cable(4, 5, 40), cable(3, 5, 150)],
      capacitors: [{ bus: 'b5', count: 1, ratedKvar: 25, ratedV: 440 }],
      bankBus: 'b2',
    },
    bank: { stages: [{ count: LEVELS - 1, ratedKvar: 12.5, ratedV: 480, reactorPct: 7 }] },
  };
}

// Nodal admittances without the bank and the stage, each corner's own.
function twinInput(
  { model }: NetworkScene,
  grid: {
    buses: number;
    corners: readonly CornerCase[];
    ordersH: Float64Array;
    counts: Float64Array;
    stageAt(factors: number): { re: Float64Array; im: Float64Array };
  },
): Float64Array {
  const { nodes, busNode } = model.nodal!.cases[0]!;
  const parts = grid.corners.flatMap(({ network, factors }) => {
    const { z } = nodalTable(model.nodal!.cases[network]!, grid.ordersH);
    const y = new Float64Array(z.length);
    for (let i = 0; i < ORDERS; i++) {
      const from = 2 * i * nodes * nodes;
      invertInto(z.slice(from, from + 2 * nodes * nodes), nodes, y, from);
    }
    const { re, im } = grid.stageAt(factors);
    return [y, re, im];
  });
  const bankNode = busNode[model.bankBus]!;
  const asked = grid.buses === 1 ? [bankNode] : [...busNode];
  const head = [ORDERS, LEVELS, CORNERS, nodes, grid.buses, bankNode, ...asked, ...grid.counts];
  const input = new Float64Array(parts.reduce((sum, part) => sum + part.length, head.length));
  input.set(head);
  let at = head.length;
  for (const part of parts) {
    input.set(part, at);
    at += part.length;
  }
  return input;
}
