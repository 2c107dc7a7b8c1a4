const CURRENT =
  /\b(?:ct|cts|current transformers?|tc|ti|stromwandler|wandler)\b[^\d\n]{0,24}(\d{1,5})\s*(?:a\s*)?[/:]\s*([15])\s*a?\b/giu;
const VOLTAGE =
  /\b(?:vt|vts|pt|pts|voltage transformers?|potential transformers?|tt|tp|spannungswandler)\b[^\d\n]{0,24}(\d{3,6})\s*(?:v\s*)?[/:]\s*(\d{2,3})\s*v?\b/giu;
const FACTOR =
  /\b(?:multiplier|multiplying factor|wandlerfaktor|messwandlerfaktor|meter constant|meter factor|transformer ratio|ct ratio|coefficient|multiplicador|constante)\b[^\d\n]{0,12}(\d{1,6}(?:[.,]\d{1,4})?)(?![\d/:.,])(?!\s*[/:])/giu;

/**
 * Transformer ratios that a file states beside its data, such as “CT 400/5” or “multiplier 80”. Whether the numbers have
 * been multiplied already no statement says for sure.
 * @param texts rows above the data and names of columns
 * @returns every ratio they can mean, other than 1: each alone, and current with voltage transformers
 */
export function statedRatios(texts: readonly string[]): number[] {
  const text = texts.join('\n');
  const quotients = (pattern: RegExp) =>
    [...text.matchAll(pattern)].map(([, first, second]) => Number(first) / Number(second));
  const currents = quotients(CURRENT);
  const voltages = quotients(VOLTAGE);
  const both = currents.flatMap((current) => voltages.map((voltage) => current * voltage));
  const factors = [...text.matchAll(FACTOR)].map(([, factor]) => Number(factor!.replace(',', '.')));
  return [...new Set([...currents, ...voltages, ...both, ...factors])].filter((ratio) => ratio > 0 && ratio !== 1);
}
