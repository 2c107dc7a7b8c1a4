import { resistanceGrowth } from '../quantity/resistance-growth.js';
import type { ComplexColumn } from './bus-admittance.js';
import type { NodalBranch, NodalCase } from './nodal-case.js';
import type { Elimination, EliminationStep } from './node-elimination.js';

/** Orders worked on at once: few enough that all of it stays in the processor's nearest memory. */
export const BLOCK_ORDERS = 128;
/**
 * Greatest multiplier an elimination without exchange of rows may meet. Supply, cables and loads alone stay at 1 or below
 * it; beyond it a node is near resonance with itself, and that order is solved with rows exchanged.
 */
const MOST_MULTIPLIER = 8;

/** The entries of a block of orders, entry after entry, and the tiny loops that work on them. */
export class EliminationBlock {
  readonly #plan: Elimination;
  readonly #branches: readonly NodalBranch[];
  readonly #network: NodalCase;
  readonly #re: Float64Array;
  readonly #im: Float64Array;
  readonly #growth = new Float64Array(BLOCK_ORDERS);
  readonly #inverseH = new Float64Array(BLOCK_ORDERS);
  /** 1 where a multiplier was too great */
  readonly #doubtful = new Uint8Array(BLOCK_ORDERS);
  /** first entries past those of the plan: towards the bank one a node, a working one a neighbour */
  readonly #toBank: number;
  readonly #spare: number;
  #ordersH: Float64Array = new Float64Array();

  /**
   * @param network one standing of the network
   * @param plan order of the elimination
   */
  constructor(network: NodalCase, plan: Elimination) {
    this.#network = network;
    this.#plan = plan;
    this.#branches = network.branches;
    this.#toBank = plan.entries;
    this.#spare = plan.entries + network.nodes;
    const mostNeighbours = Math.max(...plan.steps.map(({ links }) => links.length));
    const size = (this.#spare + mostNeighbours) * BLOCK_ORDERS;
    this.#re = new Float64Array(size);
    this.#im = new Float64Array(size);
  }

  /**
   * @param node any node
   * @returns entry of z between it and the bank's, after `invert`
   */
  toBankEntry(node: number): number {
    return this.#toBank + node;
  }

  /**
   * Fills in the admittances and eliminates all nodes but the last.
   * @param ordersH at most a block's
   * @returns places of the orders that call for exchanged rows
   */
  factorise(ordersH: Float64Array): number[] {
    this.#ordersH = ordersH;
    this.#assemble();
    this.#doubtful.fill(0);
    for (const step of this.#plan.steps.slice(0, -1)) this.#eliminate(step);
    const found: number[] = [];
    for (let i = 0; i < ordersH.length; i++) if (this.#doubtful[i] === 1) found.push(i);
    return found;
  }

  /** Turns factors into impedances, from the last node back to the first. */
  invert(): void {
    const { steps } = this.#plan;
    const last = steps[steps.length - 1]!;
    this.#reciprocal(last.pivot);
    this.#copy(this.#toBank + last.node, last.pivot);
    for (let k = steps.length - 2; k >= 0; k--) this.#invertStep(steps[k]!);
  }

  /**
   * @param entry an entry
   * @param out receives its values
   * @param from where in `out` they begin
   */
  copyInto(entry: number, out: ComplexColumn, from: number): void {
    const n = this.#ordersH.length;
    out.re.set(this.#re.subarray(entry * BLOCK_ORDERS, entry * BLOCK_ORDERS + n), from);
    out.im.set(this.#im.subarray(entry * BLOCK_ORDERS, entry * BLOCK_ORDERS + n), from);
  }

  #assemble(): void {
    const { conductance, source, sourceNode, resistanceExponent } = this.#network;
    for (let i = 0; i < this.#ordersH.length; i++) {
      this.#growth[i] = resistanceGrowth(this.#ordersH[i]!, resistanceExponent);
      this.#inverseH[i] = 1 / this.#ordersH[i]!;
    }
    for (let entry = 0; entry < this.#plan.entries; entry++) this.#clear(entry);
    for (let node = 0; node < conductance.length; node++) {
      const at = this.#plan.diagonal[node]! * BLOCK_ORDERS;
      this.#re.fill(conductance[node]!, at, at + this.#ordersH.length);
    }
    this.#addBranch({ from: sourceNode, to: -1, steadyOhm: 0, ...source, capacitiveOhm: 0 }, -1);
    for (const [k, branch] of this.#branches.entries()) this.#addBranch(branch, this.#plan.branchEntry[k]!);
  }

  #addBranch({ from, to, steadyOhm, rOhm, xOhm, capacitiveOhm }: NodalBranch, link: number): void {
    const [re, im] = [this.#re, this.#im];
    const own = this.#plan.diagonal[from]! * BLOCK_ORDERS;
    const other = to < 0 ? -1 : this.#plan.diagonal[to]! * BLOCK_ORDERS;
    const between = link * BLOCK_ORDERS;
    for (let i = 0; i < this.#ordersH.length; i++) {
      const r = steadyOhm + rOhm * this.#growth[i]!;
      const x = xOhm * this.#ordersH[i]! - capacitiveOhm * this.#inverseH[i]!;
      const inverse = 1 / (r * r + x * x);
      const g = r * inverse;
      const b = -x * inverse;
      re[own + i]! += g;
      im[own + i]! += b;
      if (other < 0) continue;
      re[other + i]! += g;
      im[other + i]! += b;
      re[between + i]! -= g;
      im[between + i]! -= b;
    }
  }

  // Pivot becomes its inverse, links become multipliers, what is left among the neighbours is mended.
  #eliminate({ pivot, links, among }: EliminationStep): void {
    if (links.length === 2) {
      this.#eliminateBetween(pivot, links, among);
      return;
    }
    this.#reciprocal(pivot);
    for (let k = 0; k < links.length; k++) this.#multiplier(links[k]!, pivot, this.#spare + k);
    let at = 0;
    for (let row = 0; row < links.length; row++) {
      for (let column = 0; column <= row; column++) {
        this.#subtractProduct(among[at++]!, links[row]!, this.#spare + column);
      }
    }
  }

  // A node between two others, the commonest, in one go.
  #eliminateBetween(pivot: number, links: readonly number[], among: readonly number[]): void {
    const re = this.#re;
    const im = this.#im;
    const n = this.#ordersH.length;
    const d = pivot * BLOCK_ORDERS;
    const first = links[0]! * BLOCK_ORDERS;
    const second = links[1]! * BLOCK_ORDERS;
    const own = among[0]! * BLOCK_ORDERS;
    const mutual = among[1]! * BLOCK_ORDERS;
    const other = among[2]! * BLOCK_ORDERS;
    for (let i = 0; i < n; i++) {
      const inverse = 1 / (re[d + i]! * re[d + i]! + im[d + i]! * im[d + i]!);
      const dRe = re[d + i]! * inverse;
      const dIm = -im[d + i]! * inverse;
      const yRe = re[first + i]!;
      const yIm = im[first + i]!;
      const wRe = re[second + i]!;
      const wIm = im[second + i]!;
      const lRe = yRe * dRe - yIm * dIm;
      const lIm = yRe * dIm + yIm * dRe;
      const mRe = wRe * dRe - wIm * dIm;
      const mIm = wRe * dIm + wIm * dRe;
      re[d + i] = dRe;
      im[d + i] = dIm;
      re[first + i] = lRe;
      im[first + i] = lIm;
      re[second + i] = mRe;
      im[second + i] = mIm;
      re[own + i]! -= lRe * yRe - lIm * yIm;
      im[own + i]! -= lRe * yIm + lIm * yRe;
      re[mutual + i]! -= mRe * yRe - mIm * yIm;
      im[mutual + i]! -= mRe * yIm + mIm * yRe;
      re[other + i]! -= mRe * wRe - mIm * wIm;
      im[other + i]! -= mRe * wIm + mIm * wRe;
      if (!(lRe * lRe + lIm * lIm + mRe * mRe + mIm * mIm <= MOST_MULTIPLIER * MOST_MULTIPLIER)) this.#doubtful[i] = 1;
    }
  }

  // z_ij = −Σ l_kj·z_ik, z_jj = 1/d_j − Σ l_kj·z_kj, and towards the bank alike; i and k are j's neighbours.
  #invertStep({ node, pivot, neighbours, links, among }: EliminationStep): void {
    const count = links.length;
    for (let row = 0; row < count; row++) {
      this.#clear(this.#spare + row);
      for (let k = 0; k < count; k++) {
        const [low, high] = k < row ? [k, row] : [row, k];
        this.#subtractProduct(this.#spare + row, links[k]!, among[(high * (high + 1)) / 2 + low]!);
      }
    }
    this.#clear(this.#toBank + node);
    for (let k = 0; k < count; k++) {
      const towards = this.#toBank + this.#plan.steps[neighbours[k]!]!.node;
      this.#subtractProduct(this.#toBank + node, links[k]!, towards);
      this.#subtractProduct(pivot, links[k]!, this.#spare + k);
    }
    for (let k = 0; k < count; k++) this.#copy(links[k]!, this.#spare + k);
  }

  #reciprocal(entry: number): void {
    const [re, im] = [this.#re, this.#im];
    const at = entry * BLOCK_ORDERS;
    for (let i = at; i < at + this.#ordersH.length; i++) {
      const inverse = 1 / (re[i]! * re[i]! + im[i]! * im[i]!);
      re[i] = re[i]! * inverse;
      im[i] = -im[i]! * inverse;
    }
  }

  // The link times the pivot's inverse; the link itself is kept. Written so that what is no number counts as too great.
  #multiplier(link: number, pivot: number, kept: number): void {
    const [re, im] = [this.#re, this.#im];
    const [at, by, to] = [link * BLOCK_ORDERS, pivot * BLOCK_ORDERS, kept * BLOCK_ORDERS];
    for (let i = 0; i < this.#ordersH.length; i++) {
      const yRe = re[at + i]!;
      const yIm = im[at + i]!;
      const dRe = re[by + i]!;
      const dIm = im[by + i]!;
      const lRe = yRe * dRe - yIm * dIm;
      const lIm = yRe * dIm + yIm * dRe;
      re[to + i] = yRe;
      im[to + i] = yIm;
      re[at + i] = lRe;
      im[at + i] = lIm;
      if (!(lRe * lRe + lIm * lIm <= MOST_MULTIPLIER * MOST_MULTIPLIER)) this.#doubtful[i] = 1;
    }
  }

  #subtractProduct(entry: number, first: number, second: number): void {
    const [re, im] = [this.#re, this.#im];
    const [to, a, b] = [entry * BLOCK_ORDERS, first * BLOCK_ORDERS, second * BLOCK_ORDERS];
    const n = this.#ordersH.length;
    for (let i = 0; i < n; i++) {
      re[to + i]! -= re[a + i]! * re[b + i]! - im[a + i]! * im[b + i]!;
      im[to + i]! -= re[a + i]! * im[b + i]! + im[a + i]! * re[b + i]!;
    }
  }

  #clear(entry: number): void {
    const at = entry * BLOCK_ORDERS;
    this.#re.fill(0, at, at + this.#ordersH.length);
    this.#im.fill(0, at, at + this.#ordersH.length);
  }

  #copy(to: number, from: number): void {
    const at = from * BLOCK_ORDERS;
    this.#re.copyWithin(to * BLOCK_ORDERS, at, at + this.#ordersH.length);
    this.#im.copyWithin(to * BLOCK_ORDERS, at, at + this.#ordersH.length);
  }
}
