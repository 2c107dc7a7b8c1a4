import type { Bank, StageGroup } from '../layout/bank.js';
import { stageOhm } from '../layout/stage.js';

/** Groups sorted into kinds: stages of one kind have one reactor ratio and quality and differ in size alone. */
export interface StageKinds {
  /** the first group of each kind */
  first: StageGroup[];
  /** kind of each group */
  kindOf: number[];
  /** admittance of a group's stage in stages of the first group of its kind */
  weight: number[];
}

/** An electrical state of the bank: every count vector with it makes the same flows. */
export interface BankState {
  /** the first of them */
  vector: Int32Array;
  /** stages of the first group of each kind that would do the same */
  shares: Float64Array;
  /** per group, 1 where one of them has a stage of it in */
  connected: Uint8Array;
}

/** Sums of the same stages in another order differ by rounding alone. */
const SAME_SHARE = 1e-12;

/**
 * Sorts a bank's groups into kinds.
 * @param bank the bank
 * @returns kinds in the order of their first groups
 * @source derived: X_L = p·X_C and R_L = X_L/quality, so stages of one p and quality are multiples of each other in every corner
 */
export function stageKinds(bank: Bank): StageKinds {
  const kinds: StageKinds = { first: [], kindOf: [], weight: [] };
  for (const group of bank.groups) {
    const found = kinds.first.findIndex((first) => sameKind(first, group));
    const kind = found < 0 ? kinds.first.push(group) - 1 : found;
    kinds.kindOf.push(kind);
    kinds.weight.push(stageOhm(kinds.first[kind]!).capacitiveOhm / stageOhm(group).capacitiveOhm);
  }
  return kinds;
}

// A plain stage has no reactor to have a quality.
function sameKind(a: StageGroup, b: StageGroup): boolean {
  return a.reactorPct === b.reactorPct && (a.reactorPct === 0 || a.reactorQuality === b.reactorQuality);
}

/**
 * A count vector in stages of the first group of each kind.
 * @param kinds kinds of the bank
 * @param vector connected stages per group
 * @returns one share a kind
 */
export function kindShares(kinds: StageKinds, vector: Int32Array): Float64Array {
  const shares = new Float64Array(kinds.first.length);
  for (let g = 0; g < vector.length; g++) shares[kinds.kindOf[g]!]! += vector[g]! * kinds.weight[g]!;
  return shares;
}

/**
 * The electrical states among some count vectors.
 * @param kinds kinds of the bank
 * @param vectors count vectors
 * @returns one entry a state, in the order of their first vectors
 * @source derived: the network sees the sum of admittances alone
 */
export function bankStates(kinds: StageKinds, vectors: readonly Int32Array[]): BankState[] {
  const states: BankState[] = [];
  for (const vector of vectors) {
    const shares = kindShares(kinds, vector);
    const same = states.find((state) => state.shares.every((share, k) => isSame(share, shares[k]!)));
    const state = same ?? { vector, shares, connected: new Uint8Array(vector.length) };
    if (same === undefined) states.push(state);
    for (let g = 0; g < vector.length; g++) if (vector[g]! > 0) state.connected[g] = 1;
  }
  return states;
}

function isSame(a: number, b: number): boolean {
  return Math.abs(a - b) <= SAME_SHARE * Math.max(a, b);
}
