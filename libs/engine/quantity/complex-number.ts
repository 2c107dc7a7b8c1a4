/** A complex number; used where clearness counts, not in tabled kernels. */
export interface ComplexNumber {
  re: number;
  im: number;
}

/**
 * a + b.
 * @param a first term
 * @param b second term
 * @returns the sum
 */
export function cAdd(a: ComplexNumber, b: ComplexNumber): ComplexNumber {
  return { re: a.re + b.re, im: a.im + b.im };
}

/**
 * a − b.
 * @param a first term
 * @param b what is taken away
 * @returns the difference
 */
export function cSubtract(a: ComplexNumber, b: ComplexNumber): ComplexNumber {
  return { re: a.re - b.re, im: a.im - b.im };
}

/**
 * a · b.
 * @param a first factor
 * @param b second factor
 * @returns the product
 */
export function cMultiply(a: ComplexNumber, b: ComplexNumber): ComplexNumber {
  return { re: a.re * b.re - a.im * b.im, im: a.re * b.im + a.im * b.re };
}

/**
 * a / b.
 * @param a dividend
 * @param b divisor, not 0
 * @returns the quotient
 */
export function cDivide(a: ComplexNumber, b: ComplexNumber): ComplexNumber {
  const square = b.re * b.re + b.im * b.im;
  return { re: (a.re * b.re + a.im * b.im) / square, im: (a.im * b.re - a.re * b.im) / square };
}

/**
 * k · a, k real.
 * @param a complex factor
 * @param k real factor
 * @returns the product
 */
export function cScale(a: ComplexNumber, k: number): ComplexNumber {
  return { re: k * a.re, im: k * a.im };
}

/**
 * |a|.
 * @param a complex number
 * @returns its magnitude
 */
export function cAbs(a: ComplexNumber): number {
  return Math.sqrt(a.re * a.re + a.im * a.im);
}
