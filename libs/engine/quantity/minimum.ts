const GOLDEN = (Math.sqrt(5) - 1) / 2;

/**
 * Place of the least value of a function with one valley, by golden section.
 * @param f function of one number
 * @param low left end
 * @param high right end
 * @param width the bracket is narrowed until it is no wider than this
 * @returns the middle of the last bracket
 * @source kiefer-1953
 */
export function goldenMinimum(f: (x: number) => number, low: number, high: number, width: number): number {
  let a = low;
  let b = high;
  let c = b - GOLDEN * (b - a);
  let d = a + GOLDEN * (b - a);
  let fc = f(c);
  let fd = f(d);
  while (b - a > width) {
    if (fc < fd) {
      b = d;
      d = c;
      fd = fc;
      c = b - GOLDEN * (b - a);
      fc = f(c);
    } else {
      a = c;
      c = d;
      fc = fd;
      d = a + GOLDEN * (b - a);
      fd = f(d);
    }
  }
  return (a + b) / 2;
}

/**
 * Zero of an increasing function by bisection to the last bit that helps.
 * @param f increasing on [low, high]
 * @param low f(low) ≤ 0
 * @param high f(high) ≥ 0
 * @param width the bracket is narrowed until it is no wider than this
 * @returns the zero, to `width`
 * @source derived: halving keeps the sign change inside the bracket
 */
export function increasingZero(f: (x: number) => number, low: number, high: number, width: number): number {
  let a = low;
  let b = high;
  while (b - a > width) {
    const middle = (a + b) / 2;
    if (middle <= a || middle >= b) break;
    if (f(middle) < 0) a = middle;
    else b = middle;
  }
  return (a + b) / 2;
}
