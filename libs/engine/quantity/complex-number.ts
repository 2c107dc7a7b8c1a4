/** A complex number; used where clearness counts, not in tabled kernels. */
export interface ComplexNumber {
  re: number;
  im: number;
}

/**
 * Sum of complex numbers.
 * @param a first number
 * @param b second number
 * @returns a + b
 */
export const cAdd = (a: ComplexNumber, b: ComplexNumber): ComplexNumber => ({ re: a.re + b.re, im: a.im + b.im });

/**
 * Difference of complex numbers.
 * @param a first number
 * @param b second number
 * @returns a − b
 */
export const cSubtract = (a: ComplexNumber, b: ComplexNumber): ComplexNumber => ({ re: a.re - b.re, im: a.im - b.im });

/**
 * Product of complex numbers.
 * @param a first number
 * @param b second number
 * @returns a · b
 */
export const cMultiply = (a: ComplexNumber, b: ComplexNumber): ComplexNumber => ({
  re: a.re * b.re - a.im * b.im,
  im: a.re * b.im + a.im * b.re,
});

/**
 * Quotient of complex numbers.
 * @param a first number
 * @param b second number
 * @returns a / b
 */
export function cDivide(a: ComplexNumber, b: ComplexNumber): ComplexNumber {
  const square = b.re * b.re + b.im * b.im;
  return { re: (a.re * b.re + a.im * b.im) / square, im: (a.im * b.re - a.re * b.im) / square };
}

/**
 * Multiple of a complex number.
 * @param a the number
 * @param k real factor
 * @returns k · a, k real
 */
export const cScale = (a: ComplexNumber, k: number): ComplexNumber => ({ re: k * a.re, im: k * a.im });

/**
 * Magnitude of a complex number.
 * @param a the number
 * @returns |a|
 */
export const cAbs = (a: ComplexNumber): number => Math.sqrt(a.re * a.re + a.im * a.im);
