/** Sizes this near to what even steps allow are allowed [share]. */
const EVEN_WIDTH = 1e-9;

/** What count vectors are made of. */
export interface StageChoice {
  /** rated kvar of the sizes, ascending [kvar] */
  stageKvar: readonly number[];
  maxStages: number;
  /** levels of rated kvar no further apart than the smallest stage */
  evenSteps: boolean;
}

/**
 * Every choice of 1 … maxStages stages from a list of sizes, as counts of each size. With even steps a stage is at most
 * the sum of all smaller ones and the smallest stage once more: else there is a gap below it that no other stage fills.
 * @param choice sizes, most stages, even steps
 * @param visit receives each choice, its counts in the order of the sizes; the array is used again
 * @source derived: sums of stages are without gaps where each stage in ascending order is within reach
 */
export function eachStageCount(choice: StageChoice, visit: (counts: Int32Array) => void): void {
  const { stageKvar, maxStages, evenSteps } = choice;
  const counts = new Int32Array(stageKvar.length);
  const walk = (size: number, left: number, smallestKvar: number, reachKvar: number): void => {
    if (size === stageKvar.length) {
      if (left < maxStages) visit(counts);
      return;
    }
    walk(size + 1, left, smallestKvar, reachKvar);
    const kvar = stageKvar[size]!;
    const smallest = smallestKvar === 0 ? kvar : smallestKvar;
    if (evenSteps && kvar > (reachKvar + smallest) * (1 + EVEN_WIDTH)) return;
    for (let count = 1; count <= left; count++) {
      counts[size] = count;
      walk(size + 1, left - count, smallest, reachKvar + count * kvar);
    }
    counts[size] = 0;
  };
  walk(0, maxStages, 0, 0);
}
