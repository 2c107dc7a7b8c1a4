/** Between what and what a quantity lies; either end may be infinite. */
export interface Range {
  lo: number;
  hi: number;
}

/** Nothing is known. */
export const UNKNOWN: Range = { lo: Number.NEGATIVE_INFINITY, hi: Number.POSITIVE_INFINITY };

/**
 * The range of a single value.
 * @param value the value
 * @returns from it to it
 */
export function exactly(value: number): Range {
  return { lo: value, hi: value };
}

/**
 * The smallest range around values; a value that is not a number makes it unknown.
 * @param values at least one
 * @returns from the least to the greatest
 */
export function around(...values: number[]): Range {
  let lo = Number.POSITIVE_INFINITY;
  let hi = Number.NEGATIVE_INFINITY;
  for (const value of values) {
    if (Number.isNaN(value)) return UNKNOWN;
    lo = Math.min(lo, value);
    hi = Math.max(hi, value);
  }
  return { lo, hi };
}

/**
 * Sum of two ranges.
 * @param a one
 * @param b the other
 * @returns where the sum lies
 */
export function plus(a: Range, b: Range): Range {
  return { lo: a.lo + b.lo, hi: a.hi + b.hi };
}

/**
 * Product of two ranges; 0 times anything, however large, is 0.
 * @param a one
 * @param b the other
 * @returns where the product lies
 */
export function times(a: Range, b: Range): Range {
  return around(product(a.lo, b.lo), product(a.lo, b.hi), product(a.hi, b.lo), product(a.hi, b.hi));
}

function product(a: number, b: number): number {
  return a === 0 || b === 0 ? 0 : a * b;
}

/**
 * A range taken by a factor.
 * @param a the range
 * @param factor any number
 * @returns where the product lies
 */
export function scaled(a: Range, factor: number): Range {
  return factor >= 0
    ? { lo: product(a.lo, factor), hi: product(a.hi, factor) }
    : { lo: product(a.hi, factor), hi: product(a.lo, factor) };
}

/**
 * A range through a function that never falls.
 * @param a the range
 * @param rising the function
 * @returns where its value lies
 */
export function through(a: Range, rising: (value: number) => number): Range {
  return { lo: rising(a.lo), hi: rising(a.hi) };
}
