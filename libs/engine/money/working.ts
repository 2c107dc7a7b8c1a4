/** Digits a value is put in with: what lies beyond is the last bits of a sum. */
const DIGITS = 12;

/**
 * A value as it stands in a working: a decimal point, at most 12 digits, negative values in brackets.
 * @param value a number
 * @returns for example "0.33" or "(−4)"
 */
export function put(value: number): string {
  const text = String(Number(value.toPrecision(DIGITS)));
  return value < 0 ? `(${text.replace('-', '−')})` : text;
}

/**
 * Factors as a product; a factor that is a sum already is in brackets.
 * @param factors values, or parts of a working
 * @returns for example "500 · 9"
 */
export function product(...factors: (number | string)[]): string {
  return factors.map((factor) => (typeof factor === 'number' ? put(factor) : factor)).join(' · ');
}

/**
 * Terms as a sum.
 * @param terms parts of a working
 * @returns for example "3 · 2 + 4 · 1", "0" where there is none
 */
export function sum(terms: readonly string[]): string {
  return terms.length === 0 ? '0' : terms.join(' + ');
}

/**
 * A part of a working in brackets, unless it is a single value.
 * @param terms parts of a working, added
 * @returns for example "(3 + 4)"
 */
export function bracketed(terms: readonly string[]): string {
  return terms.length === 1 ? terms[0]! : `(${sum(terms)})`;
}
