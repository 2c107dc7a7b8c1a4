/**
 * How far a value must move at the least to stay between two columns: it waits until an end pushes it. From where it was
 * pushed down last to where it is pushed up next any path between the columns rises by as much, and the other way round.
 * Where it begins is its own choice.
 * @param low lower end, length n
 * @param high upper end, length n, high ≥ low
 * @param from first interval
 * @param end the interval to stop before
 * @returns its rises and falls in turn, each over 0, in the columns' unit
 * @source derived: of the values at both ends of a rise the first is at most `high`, the last at least `low`
 */
export function leastMoves(low: Float64Array, high: Float64Array, from: number, end: number): number[] {
  const moves: number[] = [];
  let i = from;
  let floor = Number.NEGATIVE_INFINITY;
  let ceiling = Number.POSITIVE_INFINITY;
  // as long as one value suits all it need not have moved
  while (i < end && low[i]! <= ceiling && high[i]! >= floor) {
    if (low[i]! > floor) floor = low[i]!;
    if (high[i]! < ceiling) ceiling = high[i]!;
    i++;
  }
  if (i === end) return moves;
  const rises = low[i]! > ceiling;
  movesInto(moves, { low, high, end }, { i, rises, at: rises ? ceiling : floor });
  return moves;
}

interface Pushed {
  /** interval it is pushed in first */
  i: number;
  rises: boolean;
  at: number;
}

function movesInto(
  moves: number[],
  { low, high, end }: { low: Float64Array; high: Float64Array; end: number },
  first: Pushed,
): void {
  let { rises, at } = first;
  let moved = 0;
  for (let i = first.i; i < end; i++) {
    if (low[i]! <= at && high[i]! >= at) continue;
    const isRise = low[i]! > at;
    const to = isRise ? low[i]! : high[i]!;
    if (isRise !== rises) {
      moves.push(moved);
      moved = 0;
      rises = isRise;
    }
    moved += Math.abs(to - at);
    at = to;
  }
  moves.push(moved);
}

/** A stage moves the bank by no more than its own kvar: its comparison carries this share. */
const STEP_SHARE = 1e-9;

/** Switchings that the moves of each month ask for at the least, from each month to the last. */
export class LeastSwitchings {
  readonly #movesKvar: readonly (readonly number[])[];
  /** by the largest stage: one entry more than there are months */
  readonly #after = new Map<number, Float64Array>();

  /** @param movesKvar of each month [kvar] */
  constructor(movesKvar: readonly (readonly number[])[]) {
    this.#movesKvar = movesKvar;
  }

  /**
   * A rise or fall takes at least as many switchings as the largest stage goes into it.
   * @param monthsDone months that are left out
   * @param largestKvar largest stage [kvar]
   * @returns switchings of all stages together
   * @source derived
   */
  after(monthsDone: number, largestKvar: number): number {
    const known = this.#after.get(largestKvar);
    if (known !== undefined) return known[monthsDone]!;
    const months = this.#movesKvar.length;
    const made = new Float64Array(months + 1);
    for (let m = months - 1; m >= 0; m--) {
      let switchings = 0;
      for (const kvar of this.#movesKvar[m]!) switchings += Math.ceil((kvar / largestKvar) * (1 - STEP_SHARE));
      made[m] = made[m + 1]! + switchings;
    }
    this.#after.set(largestKvar, made);
    return made[monthsDone]!;
  }
}
