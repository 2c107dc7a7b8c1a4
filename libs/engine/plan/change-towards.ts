/** How a change is looked for. */
export interface ChangeSearch {
  /** the factor to stop at; 0 is reached in even steps, any other end in even steps of the logarithm */
  end: number;
  /** steps before it is closed in on */
  steps: number;
  /** a change is closed in on to this share */
  closedIn: number;
}

/**
 * The factors that are looked at before a change is closed in on.
 * @param end the factor to stop at; 0 is reached in even steps, any other end in even steps of the logarithm
 * @param steps how many
 * @returns factors from 1 outwards, 1 left out
 */
export function evenFactors(end: number, steps: number): number[] {
  return Array.from({ length: steps }, (_, k) => (end > 0 ? end ** ((k + 1) / steps) : 1 - (k + 1) / steps));
}

/**
 * The change nearest to a factor of 1: looked for outwards step by step, and closed in on by bisection.
 * @param valueAt what holds at a factor
 * @param present what holds at 1
 * @param search how far and how finely
 * @returns the factor just beyond the change and what holds there, or null where nothing changes
 * @source method-robustness
 */
export function changeTowards<T>(
  valueAt: (factor: number) => T,
  present: T,
  { end, steps, closedIn }: ChangeSearch,
): { factor: number; value: T } | null {
  let same = 1;
  for (const next of evenFactors(end, steps)) {
    let value = valueAt(next);
    if (value === present) {
      same = next;
      continue;
    }
    let other = next;
    while (Math.abs(other - same) > closedIn * Math.max(same, other)) {
      const middle = (same + other) / 2;
      const found = valueAt(middle);
      if (found === present) same = middle;
      else [other, value] = [middle, found];
    }
    return { factor: other, value };
  }
  return null;
}
