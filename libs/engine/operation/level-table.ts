import type { SwitchedBank } from './switched-bank.js';

/** Every count vector of a bank by its level, ascending. */
export interface LevelTable {
  /** nominal kvar of each vector, never-switched stages included [kvar] */
  levelKvar: Float64Array;
  /** connected stages per class, one vector after the other */
  counts: Int32Array;
  /** place of each vector in lexicographic order, largest class first */
  rank: Int32Array;
}

/**
 * Lists a bank's count vectors by level, so that a decision looks beside what is wanted and not at all of them.
 * @param bank the controller's view of the bank
 * @returns vectors and their levels
 * @source method-controller
 */
export function levelTable(bank: SwitchedBank): LevelTable {
  const { classes } = bank;
  const vectors: { kvar: number; counts: number[]; rank: number }[] = [];
  const walk = (c: number, kvar: number, counts: number[]): void => {
    if (c === classes.length) {
      vectors.push({ kvar, counts, rank: vectors.length });
      return;
    }
    const { stages, kvar: stageKvar } = classes[c]!;
    for (let count = 0; count <= stages.length; count++) walk(c + 1, kvar + count * stageKvar, [...counts, count]);
  };
  walk(0, bank.fixedKvar, []);
  vectors.sort((a, b) => a.kvar - b.kvar);
  return {
    levelKvar: Float64Array.from(vectors, ({ kvar }) => kvar),
    counts: Int32Array.from(vectors.flatMap(({ counts }) => counts)),
    rank: Int32Array.from(vectors, ({ rank }) => rank),
  };
}

/**
 * First vector whose level is at least a given one.
 * @param table vectors by level
 * @param kvar nominal [kvar]
 * @returns index, the count of vectors where all are below
 */
export function firstAtLeast(table: LevelTable, kvar: number): number {
  const { levelKvar } = table;
  let low = 0;
  let high = levelKvar.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (levelKvar[middle]! < kvar) low = middle + 1;
    else high = middle;
  }
  return low;
}
