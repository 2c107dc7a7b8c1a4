import type { Bank } from '../layout/bank.js';
import { goldenMinimum } from '../quantity/minimum.js';
import type { ComplexColumn } from './bus-admittance.js';
import { type BusColumns, bankColumn, busColumns, networkColumns, seenSquareInto } from './bus-columns.js';
import type { CornerCase } from './corners.js';
import type { NetworkModel } from './network-model.js';
import { HIGHEST_ORDER_H } from './spectra.js';
import { branchRatio, type StageBranch, stageAdmittance, stageBranch } from './stage-admittance.js';
import { kindShares, type StageKinds, stageKinds } from './stage-kinds.js';
import { NAMEPLATE, toleranceEnds } from './tolerance-factors.js';

/** An interior local maximum of |Z(h)| at the bus. */
export interface Peak {
  orderH: number;
  impedanceOhm: number;
}

const GRID_STEP_H = 0.02;
const EVEN_STEPS = Math.round((HIGHEST_ORDER_H - 1) / GRID_STEP_H);
const EVEN_GRID_H = Float64Array.from(
  { length: EVEN_STEPS + 1 },
  (_, i) => 1 + (i * (HIGHEST_ORDER_H - 1)) / EVEN_STEPS,
);
/** Peaks are refined to well within 1e-4 of an order. */
const REFINED_WIDTH_H = 1e-6;
/** Points on either side of a tuned order close in on it by this factor, from this share of the order. */
const APPROACH = 0.7;
const APPROACH_FROM = 0.05;
const APPROACH_POINTS = 30;
/** Looks at a shoulder, three steps of the grid. */
const SHOULDER_POINTS = 60;
/** Neighbouring shoulders overlap. */
const SAME_PEAK_H = 1e-4;
/** Points nearer than this are one: groups of one ratio but other ratings differ in the last digit of their tuned order,
 * and two samples a rounding apart would make a false valley of the rounding. */
const ONE_POINT_H = 1e-9;

/**
 * Finds every interior local maximum of |Z(h)|, 1 < h < 50, of a bank on a network, at any bus.
 *
 * A peak can hide between two points of an even grid only where |Z| turns twice within a step. Where supply and loads
 * are inductive and resistive it turns only beside a branch's tuned order (between two tuned orders of the lossless
 * circuit there is exactly one pole), so the even grid is joined by points that close in geometrically on every tuned
 * order, in every corner, from both sides: each rising and each falling piece then holds a sample. Capacitors of the
 * network itself add tuned orders of their own, and where the slope all but vanishes the grid is refined.
 */
export class PeakFinder {
  readonly #model: NetworkModel;
  readonly #kinds: StageKinds;
  readonly #ordersH: Float64Array;
  /** reused from call to call */
  readonly #square: Float64Array;
  readonly #stages: (ComplexColumn[] | undefined)[] = [];
  readonly #buses: (BusColumns[] | undefined)[] = [];
  #last: { shares: Float64Array; factors: number; column: ComplexColumn } | null = null;

  /**
   * @param model the network without the bank
   * @param bank the bank
   * @param near looks only within this of an order present [order]; everywhere where absent
   */
  constructor(model: NetworkModel, bank: Bank, near?: number) {
    this.#model = model;
    this.#kinds = stageKinds(bank);
    const all = peakGrid([...this.#tunedOrders(), ...networkTunedOrders(model)]);
    // A step more on either side, so that a peak at the edge still has a sample beyond it.
    this.#ordersH = near === undefined ? all : nearOrders(all, model.excitation.ordersH, near + 2 * GRID_STEP_H);
    this.#square = new Float64Array(this.#ordersH.length);
  }

  /**
   * Every peak at one count vector in one corner.
   * @param vector connected stages per group
   * @param corner corner of the network
   * @param bus index of the bus; the bank's where absent
   * @param worthRefining leaves out brackets of orders that don't matter to the caller
   * @returns peaks by ascending order [Ω]
   * @source method-network
   */
  peaks(
    vector: Int32Array,
    corner: CornerCase,
    bus = this.#model.bankBus,
    worthRefining: (lowH: number, highH: number) => boolean = () => true,
  ): Peak[] {
    const columns = this.#columns(corner.network, bus);
    const square = this.#square;
    const shares = kindShares(this.#kinds, vector);
    seenSquareInto(columns, this.#bankAt(shares, corner.factors), square);
    const peaks: Peak[] = [];
    for (let i = nextMinimum(square, 1); i < square.length - 1; i = nextMinimum(square, i + 1)) {
      const lowH = this.#ordersH[i - 1]!;
      const highH = this.#ordersH[i + 1]!;
      if (!worthRefining(lowH, highH)) continue;
      const exact = (h: number): number => this.#squareAt(h, shares, { corner, bus });
      const orderH = goldenMinimum(exact, lowH, highH, REFINED_WIDTH_H);
      if (orderH > 1 + GRID_STEP_H / 100 && orderH < HIGHEST_ORDER_H - GRID_STEP_H / 100) {
        peaks.push({ orderH, impedanceOhm: 1 / Math.sqrt(exact(orderH)) });
      }
    }
    return this.#model.nodal === null
      ? peaks
      : this.#withShoulders(peaks, square, (h) => this.#squareAt(h, shares, { corner, bus }));
  }

  /**
   * The peak with the largest |Z|.
   * @param vector connected stages per group
   * @param corner corner of the network
   * @param bus index of the bus; the bank's where absent
   * @returns the parallel resonance, or null where |Z| has no interior maximum
   * @source method-network
   */
  greatest(vector: Int32Array, corner: CornerCase, bus = this.#model.bankBus): Peak | null {
    let greatest: Peak | null = null;
    for (const peak of this.peaks(vector, corner, bus)) {
      if (greatest === null || peak.impedanceOhm > greatest.impedanceOhm) greatest = peak;
    }
    return greatest;
  }

  // Cables and capacitors of the network can make |Z| turn twice within a step on a steep side: there its slope all but
  // vanishes against what it changes by from step to step, and the place is looked at more closely.
  #withShoulders(peaks: Peak[], square: Float64Array, exact: (h: number) => number): Peak[] {
    const found = [...peaks];
    for (let i = nextShoulder(this.#ordersH, square, 1); i < square.length - 2; ) {
      for (const orderH of hiddenMinima(exact, this.#ordersH[i - 1]!, this.#ordersH[i + 2]!)) {
        if (found.some((peak) => Math.abs(peak.orderH - orderH) < SAME_PEAK_H)) continue;
        found.push({ orderH, impedanceOhm: 1 / Math.sqrt(exact(orderH)) });
      }
      i = nextShoulder(this.#ordersH, square, i + 1);
    }
    return found.sort((a, b) => a.orderH - b.orderH);
  }

  // Corners of one pair of factors follow each other, and a bank is the same in all of them.
  #bankAt(shares: Float64Array, factors: number): ComplexColumn {
    const last = this.#last;
    if (last?.factors === factors && last.shares.every((share, kind) => share === shares[kind])) return last.column;
    const column = bankColumn(this.#stagesAt(factors), shares, this.#square.length);
    this.#last = { shares, factors, column };
    return column;
  }

  #branches(factors: number): StageBranch[] {
    const exponent = this.#model.corners.networks[0]!.path.resistanceExponent;
    const factor = this.#model.corners.factors[factors]!;
    return this.#kinds.first.map((group) => stageBranch(group, factor, exponent));
  }

  #tunedOrders(): number[] {
    return this.#model.corners.factors.flatMap((_, factors) =>
      this.#branches(factors)
        .filter((branch) => branch.inductiveOhm > 0)
        .map((branch) => 1 / Math.sqrt(branchRatio(branch))),
    );
  }

  #stagesAt(factors: number): ComplexColumn[] {
    this.#stages[factors] ??= this.#branches(factors).map((branch) => stageAdmittance(branch, this.#ordersH));
    return this.#stages[factors];
  }

  #columns(network: number, bus: number): BusColumns {
    this.#buses[network] ??= networkColumns(this.#model, network, this.#ordersH);
    return this.#buses[network][bus]!;
  }

  #squareAt(orderH: number, shares: Float64Array, at: { corner: CornerCase; bus: number }): number {
    const ordersH = Float64Array.of(orderH);
    const stages = this.#branches(at.corner.factors).map((branch) => stageAdmittance(branch, ordersH));
    const out = new Float64Array(1);
    seenSquareInto(busColumns(this.#model, at.corner.network, at.bus, ordersH), bankColumn(stages, shares, 1), out);
    return out[0]!;
  }
}

// The place of the next sample that is less than the one before and no more than the one after; the end where there is
// none. A loop of its own, kept small.
function nextMinimum(square: Float64Array, from: number): number {
  let i = from;
  while (i < square.length - 1 && !(square[i]! < square[i - 1]! && square[i]! <= square[i + 1]!)) i++;
  return i;
}

// Those of ascending orders that lie within reach of an order present.
function nearOrders(ordersH: Float64Array, present: Float64Array, reachH: number): Float64Array {
  let at = 0;
  return ordersH.filter((h) => {
    while (at < present.length - 1 && h - present[at]! > reachH) at++;
    return at < present.length && Math.abs(h - present[at]!) <= reachH;
  });
}

// The place of the next shoulder; where there is none, the last that could be one or beyond. Slopes go from step to step.
function nextShoulder(ordersH: Float64Array, square: Float64Array, from: number): number {
  const end = square.length - 2;
  if (from >= end) return end;
  let before = slopeAt(ordersH, square, from - 1);
  let here = slopeAt(ordersH, square, from);
  for (let i = from; i < end; i++) {
    const after = slopeAt(ordersH, square, i + 1);
    if (isShoulder(before, here, after)) return i;
    before = here;
    here = after;
  }
  return end;
}

function slopeAt(ordersH: Float64Array, square: Float64Array, k: number): number {
  return (square[k + 1]! - square[k]!) / (ordersH[k + 1]! - ordersH[k]!);
}

function isShoulder(before: number, here: number, after: number): boolean {
  if (before * here <= 0 || here * after <= 0) return false;
  if (Math.abs(here) > Math.abs(before) || Math.abs(here) >= Math.abs(after)) return false;
  return Math.abs(here) < Math.max(Math.abs(before - here), Math.abs(after - here));
}

function hiddenMinima(exact: (h: number) => number, lowH: number, highH: number): number[] {
  const orderH = (k: number): number => lowH + (k * (highH - lowH)) / SHOULDER_POINTS;
  const values = Array.from({ length: SHOULDER_POINTS + 1 }, (_, k) => exact(orderH(k)));
  const minima: number[] = [];
  for (let k = 1; k < SHOULDER_POINTS; k++) {
    if (!(values[k]! < values[k - 1]! && values[k]! <= values[k + 1]!)) continue;
    minima.push(goldenMinimum(exact, orderH(k - 1), orderH(k + 1), REFINED_WIDTH_H));
  }
  return minima;
}

// Capacitors that stand in the network: tuned orders of their own branches, in every corner of theirs.
function networkTunedOrders(model: NetworkModel): number[] {
  return (model.nodal?.topology.capacitors ?? [])
    .filter(({ group }) => group.reactorPct > 0)
    .flatMap(({ group }) =>
      [NAMEPLATE, ...toleranceEnds(true)].map((factors) => 1 / Math.sqrt(branchRatio(stageBranch(group, factors, 0)))),
    );
}

/**
 * Orders at which peaks are looked for: an even grid and points closing in on each tuned order.
 * @param tunedH tuned orders of the branches
 * @returns ascending orders, 1 … 50
 */
export function peakGrid(tunedH: readonly number[]): Float64Array {
  const approaching = tunedH.flatMap((tuned) =>
    Array.from({ length: APPROACH_POINTS }, (_, k) => tuned * APPROACH_FROM * APPROACH ** k).flatMap((step) => [
      tuned - step,
      tuned + step,
    ]),
  );
  const ascending = mergedWithGrid(Float64Array.from(approaching.filter((h) => h >= 1 && h <= HIGHEST_ORDER_H)).sort());
  return ascending.filter((h, i) => i === 0 || h - ascending[i - 1]! > ONE_POINT_H);
}

function mergedWithGrid(more: Float64Array): Float64Array {
  const all = new Float64Array(EVEN_GRID_H.length + more.length);
  let a = 0;
  let b = 0;
  for (let i = 0; i < all.length; i++) {
    const takesGrid = b === more.length || (a < EVEN_GRID_H.length && EVEN_GRID_H[a]! <= more[b]!);
    all[i] = takesGrid ? EVEN_GRID_H[a++]! : more[b++]!;
  }
  return all;
}
