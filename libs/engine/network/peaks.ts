import type { Bank } from '../layout/bank.js';
import { goldenMinimum } from '../quantity/minimum.js';
import { type ComplexColumn, type NetworkTable, networkTable } from './bus-admittance.js';
import type { CornerCase } from './corners.js';
import type { NetworkModel } from './network-model.js';
import { admittanceSquareInto } from './scan-into.js';
import { HIGHEST_ORDER_H } from './spectra.js';
import { branchRatio, stageAdmittance, stageBranch } from './stage-admittance.js';

/** An interior local maximum of |Z(h)| at the bus. */
export interface Peak {
  orderH: number;
  impedanceOhm: number;
}

const GRID_STEP_H = 0.02;
/** Peaks are refined to well within 1e-4 of an order. */
const REFINED_WIDTH_H = 1e-6;
/** Points on either side of a tuned order close in on it by this factor, from this share of the order. */
const APPROACH = 0.7;
const APPROACH_FROM = 0.05;
const APPROACH_POINTS = 30;
/** Points nearer than this are one: groups of one ratio but other ratings differ in the last digit of their tuned order,
 * and two samples a rounding apart would make a false valley of the rounding. */
const ONE_POINT_H = 1e-9;

interface FactorGrid {
  ordersH: Float64Array;
  /** per group */
  stages: ComplexColumn[];
  /** per network, filled on first use */
  networks: (NetworkTable | undefined)[];
}

/**
 * Finds every interior local maximum of |Z(h)|, 1 < h < 50, of a bank on a network.
 *
 * A peak can hide between two points of an even grid only where |Z| turns twice within a step. On a bus whose supply
 * and loads are inductive and resistive it turns only beside a branch's tuned order (between two tuned orders of the
 * lossless circuit there is exactly one pole), so the even grid is joined by points that close in geometrically on
 * every tuned order from both sides: each rising and each falling piece then holds a sample.
 */
export class PeakFinder {
  readonly #model: NetworkModel;
  readonly #bank: Bank;
  readonly #grids: (FactorGrid | undefined)[] = [];

  /**
   * @param model the network without the bank
   * @param bank the bank
   */
  constructor(model: NetworkModel, bank: Bank) {
    this.#model = model;
    this.#bank = bank;
  }

  /**
   * Every peak at one count vector in one corner.
   * @param vector connected stages per group
   * @param corner corner of the network
   * @returns peaks by ascending order [Ω]
   * @source method-network
   */
  peaks(vector: Int32Array, corner: CornerCase): Peak[] {
    const grid = this.#grid(corner.factors);
    const network = this.#table(grid, corner.network);
    const square = new Float64Array(grid.ordersH.length);
    admittanceSquareInto(network.bus, grid.stages, vector, square);
    const peaks: Peak[] = [];
    for (let i = 1; i < square.length - 1; i++) {
      if (!(square[i]! < square[i - 1]! && square[i]! <= square[i + 1]!)) continue;
      const exact = (h: number): number => this.#admittanceSquare(h, vector, corner);
      const orderH = goldenMinimum(exact, grid.ordersH[i - 1]!, grid.ordersH[i + 1]!, REFINED_WIDTH_H);
      if (orderH > 1 + GRID_STEP_H / 100 && orderH < HIGHEST_ORDER_H - GRID_STEP_H / 100) {
        peaks.push({ orderH, impedanceOhm: 1 / Math.sqrt(exact(orderH)) });
      }
    }
    return peaks;
  }

  /**
   * The peak with the largest |Z|.
   * @param vector connected stages per group
   * @param corner corner of the network
   * @returns the parallel resonance, or null where |Z| has no interior maximum
   * @source method-network
   */
  greatest(vector: Int32Array, corner: CornerCase): Peak | null {
    let greatest: Peak | null = null;
    for (const peak of this.peaks(vector, corner)) {
      if (greatest === null || peak.impedanceOhm > greatest.impedanceOhm) greatest = peak;
    }
    return greatest;
  }

  #grid(factors: number): FactorGrid {
    const known = this.#grids[factors];
    if (known !== undefined) return known;
    const exponent = this.#model.corners.networks[0]!.path.resistanceExponent;
    const branches = this.#bank.groups.map((group) =>
      stageBranch(group, this.#model.corners.factors[factors]!, exponent),
    );
    const tuned = branches.filter((b) => b.inductiveOhm > 0).map((b) => 1 / Math.sqrt(branchRatio(b)));
    const ordersH = peakGrid(tuned);
    const grid = { ordersH, stages: branches.map((branch) => stageAdmittance(branch, ordersH)), networks: [] };
    this.#grids[factors] = grid;
    return grid;
  }

  #table(grid: FactorGrid, network: number): NetworkTable {
    grid.networks[network] ??= networkTable(this.#model.corners.networks[network]!, this.#model.damping, grid.ordersH);
    return grid.networks[network];
  }

  #admittanceSquare(orderH: number, vector: Int32Array, corner: CornerCase): number {
    const at = Float64Array.of(orderH);
    const network = this.#model.corners.networks[corner.network]!;
    const table = networkTable(network, this.#model.damping, at);
    const exponent = network.path.resistanceExponent;
    const factors = this.#model.corners.factors[corner.factors]!;
    const stages = this.#bank.groups.map((group) => stageAdmittance(stageBranch(group, factors, exponent), at));
    const out = new Float64Array(1);
    admittanceSquareInto(table.bus, stages, vector, out);
    return out[0]!;
  }
}

/**
 * Orders at which peaks are looked for: an even grid and points closing in on each tuned order.
 * @param tunedH tuned orders of the branches
 * @returns ascending orders, 1 … 50
 */
export function peakGrid(tunedH: readonly number[]): Float64Array {
  const count = Math.round((HIGHEST_ORDER_H - 1) / GRID_STEP_H);
  const points = new Set<number>();
  for (let i = 0; i <= count; i++) points.add(1 + (i * (HIGHEST_ORDER_H - 1)) / count);
  for (const tuned of tunedH) {
    for (let k = 0; k < APPROACH_POINTS; k++) {
      const step = tuned * APPROACH_FROM * APPROACH ** k;
      points.add(tuned - step);
      points.add(tuned + step);
    }
  }
  const ascending = Float64Array.from(points)
    .filter((h) => h >= 1 && h <= HIGHEST_ORDER_H)
    .sort();
  return ascending.filter((h, i) => i === 0 || h - ascending[i - 1]! > ONE_POINT_H);
}
