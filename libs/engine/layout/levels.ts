import { InputProblem } from '../problem.js';
import type { Bank } from './bank.js';
import { capacitorV, effectiveKvar, tunedOrderH } from './stage.js';

/** Levels closer than this are one [kvar]. */
export const LEVEL_WIDTH_KVAR = 1e-6;

/** Most count vectors a bank may have. */
export const MOST_VECTORS = 4096;

/** One level of the bank and the ways to reach it. */
export interface Level {
  levelKvar: number;
  /** count of connected stages per group; fewest stages first */
  vectors: Int32Array[];
}

/**
 * Every level the bank can stand at, 0 included, ascending: distinct sums of effective kvar within 1e-6 kvar.
 * A group that is never switched is in at every level but 0, the bank isolated.
 * @param bank the bank
 * @param nominalV bus voltage [V]
 * @returns levels with their count vectors
 * @throws InputProblem where there are more than 4 096 vectors
 * @source method-bank
 */
export function bankLevels(bank: Bank, nominalV: number): Level[] {
  const stageKvar = bank.groups.map((group) => effectiveKvar(group, nominalV));
  const sums = countVectors(bank)
    .map((vector) => ({ vector, kvar: vector.reduce((sum, count, g) => sum + count * stageKvar[g]!, 0) }))
    .sort((a, b) => a.kvar - b.kvar);
  const levels: Level[] = [];
  for (const { vector, kvar } of sums) {
    const last = levels[levels.length - 1];
    if (last !== undefined && kvar - last.levelKvar <= LEVEL_WIDTH_KVAR) last.vectors.push(vector);
    else levels.push({ levelKvar: kvar, vectors: [vector] });
  }
  for (const level of levels) level.vectors.sort((a, b) => stagesIn(a) - stagesIn(b) || lexicographic(a, b));
  return levels;
}

function countVectors(bank: Bank): Int32Array[] {
  const sizes = bank.groups.map((group) => (group.fixed ? 1 : group.count + 1));
  const total = sizes.reduce((product, size) => product * size, 1);
  if (total > MOST_VECTORS) {
    throw new InputProblem([
      {
        code: 'too-many-levels',
        path: 'bank.stages',
        expected: `at most ${MOST_VECTORS} combinations of stages; give equal stages as one group with a count`,
        found: `${total}`,
      },
    ]);
  }
  const anyFixed = bank.groups.some((group) => group.fixed);
  const vectors: Int32Array[] = anyFixed ? [new Int32Array(sizes.length)] : [];
  for (let index = 0; index < total; index++) {
    let rest = index;
    vectors.push(
      Int32Array.from(sizes, (size, g) => {
        const group = bank.groups[g]!;
        const digit = rest % size;
        rest = Math.floor(rest / size);
        return group.fixed ? group.count : digit;
      }),
    );
  }
  return vectors;
}

function stagesIn(vector: Int32Array): number {
  return vector.reduce((sum, count) => sum + count, 0);
}

function lexicographic(a: Int32Array, b: Int32Array): number {
  const at = a.findIndex((count, g) => count !== b[g]);
  return at < 0 ? 0 : a[at]! - b[at]!;
}

/** A physical stage as the result lists it. */
export interface BankStage {
  ratedKvar: number;
  ratedV: number;
  reactorPct: number;
  effectiveKvar: number;
  capacitorV: number;
  tunedOrderH: number | null;
}

/** The bank as the result lists it. */
export interface BankSummary {
  effectiveKvar: number;
  /** one entry a physical stage, groups expanded in order */
  stages: BankStage[];
  levelsKvar: number[];
}

/**
 * The bank in figures: stages expanded in order, total effective kvar, levels.
 * @param bank the bank
 * @param levels its levels
 * @param nominalV bus voltage [V]
 * @returns summary; "effective" is at nominal bus voltage, reactor included
 * @source method-bank
 */
export function summarizeBank(bank: Bank, levels: Level[], nominalV: number): BankSummary {
  const stages = bank.groups.flatMap((group) =>
    Array.from({ length: group.count }, () => ({
      ratedKvar: group.ratedKvar,
      ratedV: group.ratedV,
      reactorPct: group.reactorPct,
      effectiveKvar: effectiveKvar(group, nominalV),
      capacitorV: capacitorV(group.reactorPct, nominalV),
      tunedOrderH: tunedOrderH(group.reactorPct),
    })),
  );
  return {
    effectiveKvar: bank.groups.reduce((sum, group) => sum + group.count * effectiveKvar(group, nominalV), 0),
    stages,
    levelsKvar: levels.map((level) => level.levelKvar),
  };
}
