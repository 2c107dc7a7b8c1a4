import { pathImpedanceInto, type SeriesOhm, type SupplyPath, shortCircuitMva } from '../supply/supply-path.js';
import type { Flow } from './bus-flow.js';
import type { Corner } from './corners.js';
import type { BankModel } from './flow.js';
import type { NetworkModel } from './network-model.js';
import { networkStates } from './network-states.js';
import { nodalCase } from './nodal-case.js';
import { nodalTable } from './nodal-impedance.js';
import type { PeakFinder } from './peaks.js';
import type { NetworkState } from './topology.js';

/** Voltage and currents at one order. */
export interface OrderResult {
  orderH: number;
  /** V_h, % of nominal */
  voltagePct: number;
  /** per phase [A] */
  sourceA: number;
  /** the whole bank's, per phase [A] */
  bankA: number;
}

/** A level in the nominal or in its worst corner. */
export interface NetworkLevel {
  /** name of the bus */
  bus: string;
  levelKvar: number;
  case: 'nominal' | 'worst';
  corner: Corner;
  parallelOrderH: number | null;
  peakOhm: number | null;
  voltageDistortionPct: number;
  currentDistortionPct: number;
  orders: OrderResult[];
}

/** The network seen from the bus. */
export interface NetworkSummary {
  /** at the greatest fault level and the least transformer impedance [MVA] */
  shortCircuitMva: number;
  /** at the least fault level and the greatest transformer impedance [MVA] */
  shortCircuitMinMva: number;
  levels: NetworkLevel[];
}

/** A later case replaces an earlier one only where it is greater by more than this share. */
export const WORSE_SHARE = 1e-9;

/** A case that was kept. */
interface Kept {
  vector: Int32Array;
  level: NetworkLevel;
  corner: Flow['corner'];
}

/** Collects the nominal and the worst case of every level at every bus from the flows that pass. */
export class LevelCollector {
  readonly #model: NetworkModel;
  readonly #nominal: (Kept | undefined)[][];
  readonly #worst: (Kept | undefined)[][];

  /** @param model the network without the bank */
  constructor(model: NetworkModel) {
    this.#model = model;
    this.#nominal = model.buses.map(() => []);
    this.#worst = model.buses.map(() => []);
  }

  /** @param flow the next flow; levels, corners and vectors in their fixed order */
  take(flow: Flow): void {
    const isNominal = flow.corner === this.#model.corners.corners[0];
    for (let bus = 0; bus < flow.buses.length; bus++) {
      const nominal = this.#nominal[bus]!;
      const worst = this.#worst[bus]!;
      if (isNominal && nominal[flow.level] === undefined) nominal[flow.level] = this.#kept(flow, bus, 'nominal');
      const known = worst[flow.level];
      const least = known === undefined ? -1 : known.level.voltageDistortionPct * (1 + WORSE_SHARE);
      if (flow.buses[bus]!.voltageDistortionPct > least) worst[flow.level] = this.#kept(flow, bus, 'worst');
    }
  }

  /**
   * @param finder peaks of the same bank on the same network
   * @returns every level twice, nominal then worst, ascending; bus after bus
   */
  levels(finder: PeakFinder): NetworkLevel[] {
    const all: NetworkLevel[] = [];
    for (let bus = 0; bus < this.#nominal.length; bus++) {
      for (const [k, nominal] of this.#nominal[bus]!.entries()) {
        for (const kept of [nominal!, this.#worst[bus]![k]!]) {
          const peak = finder.greatest(kept.vector, kept.corner, bus);
          all.push({ ...kept.level, parallelOrderH: peak?.orderH ?? null, peakOhm: peak?.impedanceOhm ?? null });
        }
      }
    }
    return all;
  }

  #kept(flow: Flow, bus: number, name: NetworkLevel['case']): Kept {
    const phaseV = this.#model.nominalV / Math.sqrt(3);
    const { voltageV, voltageDistortionPct } = flow.buses[bus]!;
    return {
      vector: flow.vector,
      corner: flow.corner,
      level: {
        bus: this.#model.buses[bus]!,
        levelKvar: flow.levelKvar,
        case: name,
        corner: { ...flow.corner.corner },
        parallelOrderH: null,
        peakOhm: null,
        voltageDistortionPct,
        currentDistortionPct: flow.currentDistortionPct,
        orders: Array.from(flow.ordersH, (orderH, i) => ({
          orderH,
          voltagePct: (100 * voltageV[i]!) / phaseV,
          sourceA: flow.sourceA[i]!,
          bankA: flow.bankA[i]!,
        })),
      },
    };
  }
}

/** A peak within reach of an order that is present. */
export interface NearPeak {
  bus: string;
  levelKvar: number;
  corner: Corner;
  peakOrderH: number;
  presentOrderH: number;
}

/**
 * The peak that comes nearest to an order present, over every level above 0 and every corner.
 * @param model the network without the bank
 * @param bank the bank
 * @param finder peaks of the same bank
 * @param reachH how near counts [order]
 * @returns the nearest within reach, or null
 * @source method-limits
 */
export function nearestPeak(model: NetworkModel, bank: BankModel, finder: PeakFinder, reachH: number): NearPeak | null {
  if (model.excitation.ordersH.length === 0) return null;
  let nearest: NearPeak | null = null;
  let leastH = Number.POSITIVE_INFINITY;
  for (const peak of everyPeak(model, bank, finder, () => Math.min(reachH, leastH))) {
    const awayH = Math.abs(peak.peakOrderH - peak.presentOrderH);
    if (awayH > reachH || awayH >= leastH) continue;
    leastH = awayH;
    nearest = peak;
  }
  return nearest;
}

/**
 * Does any peak come near an order present; stops at the first.
 * @param model the network without the bank
 * @param bank the bank
 * @param finder peaks of the same bank
 * @param reachH how near counts [order]
 * @returns true where one does
 * @source method-limits
 */
export function hasNearPeak(model: NetworkModel, bank: BankModel, finder: PeakFinder, reachH: number): boolean {
  if (model.excitation.ordersH.length === 0) return false;
  for (const { peakOrderH, presentOrderH } of everyPeak(model, bank, finder, () => reachH)) {
    if (Math.abs(peakOrderH - presentOrderH) <= reachH) return true;
  }
  return false;
}

// Levels above 0, corners, electrical states, buses, in that order of nesting; each peak with the order present it is
// nearest to. Brackets wholly out of reach are not refined.
function* everyPeak(
  model: NetworkModel,
  bank: BankModel,
  finder: PeakFinder,
  reachH: () => number,
): Generator<NearPeak> {
  const within = (lowH: number, highH: number): boolean =>
    model.excitation.ordersH.some((h) => h >= lowH - reachH() && h <= highH + reachH());
  for (const [k, { levelKvar }] of bank.levels.slice(1).entries()) {
    for (const corner of model.corners.corners) {
      for (const { vector } of bank.states[k + 1]!) {
        for (const [at, bus] of model.buses.entries()) {
          for (const { orderH } of finder.peaks(vector, corner, at, within)) {
            const presentOrderH = nearestOrder(model.excitation.ordersH, orderH);
            yield { bus, levelKvar, corner: corner.corner, peakOrderH: orderH, presentOrderH };
          }
        }
      }
    }
  }
}

function nearestOrder(ordersH: Float64Array, orderH: number): number {
  return ordersH.reduce((best, h) => (Math.abs(h - orderH) < Math.abs(best - orderH) ? h : best));
}

/**
 * Short-circuit power at the bank's bus at both ends of the supply's range; in a network of several buses the greatest
 * and the least over its standings, capacitors and damping loads not counted, running generators counted.
 * @param model the network without the bank
 * @param levels levels already collected
 * @returns the network in figures
 * @source method-network
 */
export function summarizeNetwork(model: NetworkModel, levels: NetworkLevel[]): NetworkSummary {
  const { networks } = model.corners;
  const strongest: SupplyPath = networks[1]!.path;
  const weakest: SupplyPath = networks[networks.length - 1]!.path;
  const ends = model.nodal === null ? null : nodalShortCircuit(model, { strongest, weakest });
  return {
    shortCircuitMva: ends?.mostMva ?? shortCircuitMva(strongest, model.nominalV),
    shortCircuitMinMva: ends?.leastMva ?? shortCircuitMva(weakest, model.nominalV),
    levels,
  };
}

function nodalShortCircuit(
  model: NetworkModel,
  paths: { strongest: SupplyPath; weakest: SupplyPath },
): { mostMva: number; leastMva: number } {
  const atBus = (path: SupplyPath): number[] =>
    bareImpedances(model, path).map(([re, im]) => model.nominalV ** 2 / Math.sqrt(re * re + im * im) / 1e6);
  return { mostMva: Math.max(...atBus(paths.strongest)), leastMva: Math.min(...atBus(paths.weakest)) };
}

/**
 * Impedance of the supply at its strongest, seen from the bank's bus at the fundamental, loads and capacitors left out.
 * @param model the network without the bank
 * @param states standings to choose from; all of them where absent
 * @returns R and X per phase of the one with the least |Z| [Ω]
 * @source method-network
 */
export function strongestOhm(model: NetworkModel, states?: readonly NetworkState[]): SeriesOhm {
  const { path } = model.corners.networks[1]!;
  if (model.nodal === null) {
    const z = new Float64Array(2);
    pathImpedanceInto(path, 1, z);
    return { rOhm: z[0]!, xOhm: z[1]! };
  }
  const found = bareImpedances(model, path, states);
  const size = ([re, im]: [number, number]): number => re * re + im * im;
  const [rOhm, xOhm] = found.reduce((least, z) => (size(z) < size(least) ? z : least));
  return { rOhm, xOhm };
}

// Source, transformers, cables and running generators alone, in every standing.
function bareImpedances(
  model: NetworkModel,
  path: SupplyPath,
  states: readonly NetworkState[] = networkStates(model.nodal!.topology),
): [number, number][] {
  const { topology } = model.nodal!;
  const none = topology.motorKw.map(() => 0);
  const bare = { ...topology, motorKw: none, resistiveKw: none };
  return bareStandings(states).map((state) => {
    const withoutCapacitors = { ...state, capacitorsIn: state.capacitorsIn.map(() => 0) };
    const nodal = nodalCase(bare, withoutCapacitors, path, { ...model.damping, dampingKw: 0, listedShare: 0 });
    const { z, nodes } = nodalTable(nodal, Float64Array.of(1));
    const at = 2 * nodal.busNode[model.bankBus]! * (nodes + 1);
    return [z[at]!, z[at + 1]!];
  });
}

// Standings that differ in their capacitors alone are one where those are left out.
function bareStandings(states: readonly NetworkState[]): NetworkState[] {
  const distinct = new Map<string, NetworkState>();
  for (const state of states) {
    const key = JSON.stringify([state.closedCouplers, state.runningGenerators, state.transformerOut]);
    if (!distinct.has(key)) distinct.set(key, state);
  }
  return [...distinct.values()];
}
