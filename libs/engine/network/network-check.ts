import { type SupplyPath, shortCircuitMva } from '../supply/supply-path.js';
import type { Corner } from './corners.js';
import type { BankModel, Flow } from './flow.js';
import type { NetworkModel } from './network-model.js';
import type { PeakFinder } from './peaks.js';

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
  bus: 'main';
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

/** Collects the nominal and the worst case of every level from the flows that pass. */
export class LevelCollector {
  readonly #model: NetworkModel;
  readonly #nominal: (Kept | undefined)[] = [];
  readonly #worst: (Kept | undefined)[] = [];

  /** @param model the network without the bank */
  constructor(model: NetworkModel) {
    this.#model = model;
  }

  /** @param flow the next flow; levels, corners and vectors in their fixed order */
  take(flow: Flow): void {
    const isNominal = flow.corner === this.#model.corners.corners[0];
    if (isNominal && this.#nominal[flow.level] === undefined) {
      this.#nominal[flow.level] = this.#kept(flow, 'nominal');
    }
    const worst = this.#worst[flow.level];
    const least = worst === undefined ? -1 : worst.level.voltageDistortionPct * (1 + WORSE_SHARE);
    if (flow.voltageDistortionPct > least) this.#worst[flow.level] = this.#kept(flow, 'worst');
  }

  /**
   * @param finder peaks of the same bank on the same network
   * @returns every level twice, nominal then worst, ascending
   */
  levels(finder: PeakFinder): NetworkLevel[] {
    const all: NetworkLevel[] = [];
    for (const [k, nominal] of this.#nominal.entries()) {
      for (const kept of [nominal!, this.#worst[k]!]) {
        const peak = finder.greatest(kept.vector, kept.corner);
        all.push({ ...kept.level, parallelOrderH: peak?.orderH ?? null, peakOhm: peak?.impedanceOhm ?? null });
      }
    }
    return all;
  }

  #kept(flow: Flow, name: NetworkLevel['case']): Kept {
    const phaseV = this.#model.nominalV / Math.sqrt(3);
    return {
      vector: flow.vector,
      corner: flow.corner,
      level: {
        bus: 'main',
        levelKvar: flow.levelKvar,
        case: name,
        corner: { ...flow.corner.corner },
        parallelOrderH: null,
        peakOhm: null,
        voltageDistortionPct: flow.voltageDistortionPct,
        currentDistortionPct: flow.currentDistortionPct,
        orders: Array.from(flow.ordersH, (orderH, i) => ({
          orderH,
          voltagePct: (100 * flow.voltageV[i]!) / phaseV,
          sourceA: flow.sourceA[i]!,
          bankA: flow.bankA[i]!,
        })),
      },
    };
  }
}

/** A peak within reach of an order that is present. */
export interface NearPeak {
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
  for (const peak of everyPeak(model, bank, finder)) {
    const awayH = Math.abs(peak.peakOrderH - peak.presentOrderH);
    if (awayH > reachH || awayH >= leastH) continue;
    leastH = awayH;
    nearest = peak;
  }
  return nearest;
}

// Levels above 0, corners, count vectors, in that order of nesting; each peak with the order present it is nearest to.
function* everyPeak(model: NetworkModel, bank: BankModel, finder: PeakFinder): Generator<NearPeak> {
  for (const level of bank.levels.slice(1)) {
    for (const corner of model.corners.corners) {
      for (const { orderH } of level.vectors.flatMap((vector) => finder.peaks(vector, corner))) {
        const presentOrderH = nearestOrder(model.excitation.ordersH, orderH);
        yield { levelKvar: level.levelKvar, corner: corner.corner, peakOrderH: orderH, presentOrderH };
      }
    }
  }
}

function nearestOrder(ordersH: Float64Array, orderH: number): number {
  return ordersH.reduce((best, h) => (Math.abs(h - orderH) < Math.abs(best - orderH) ? h : best));
}

/**
 * Short-circuit power at both ends of the supply's range.
 * @param model the network without the bank
 * @param levels levels already collected
 * @returns the network in figures
 * @source method-network
 */
export function summarizeNetwork(model: NetworkModel, levels: NetworkLevel[]): NetworkSummary {
  const { networks } = model.corners;
  const strongest: SupplyPath = networks[1]!.path;
  const weakest: SupplyPath = networks[networks.length - 1]!.path;
  return {
    shortCircuitMva: shortCircuitMva(strongest, model.nominalV),
    shortCircuitMinMva: shortCircuitMva(weakest, model.nominalV),
    levels,
  };
}
