/** Numbers that look like chance and are the same on every run. */
export interface Chance {
  /** @returns a number in [0, 1) */
  next(): number;
  /** @returns a number in [low, high) */
  between(low: number, high: number): number;
  /** @returns a whole number from low to high, both included */
  whole(low: number, high: number): number;
  /** @returns one of the entries */
  oneOf<T>(entries: readonly T[]): T;
}

/**
 * A stream of numbers from a seed (a 32-bit counter, mixed).
 * @param seed any whole number
 * @returns the stream
 */
export function chance(seed: number): Chance {
  let state = seed >>> 0;
  const next = (): number => {
    state = (state + 0x6d2b79f5) >>> 0;
    let mixed = Math.imul(state ^ (state >>> 15), state | 1);
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61);
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4_294_967_296;
  };
  return {
    next,
    between: (low, high) => low + (high - low) * next(),
    whole: (low, high) => low + Math.floor((high - low + 1) * next()),
    oneOf: (entries) => entries[Math.floor(entries.length * next())]!,
  };
}
