/** Seed of every generated case; a failing property prints it again with the path to its smallest counterexample. */
export const SEED = 20_260_131;

/** Is this the long run, with every count in full. */
export const SOAKED = process.env.VARWRIGHT_SOAK === '1';

/**
 * How often a generated case is tried.
 * @param usual in every run of the tests
 * @param soaked in the long run (VARWRIGHT_SOAK=1)
 * @returns the count of this run
 */
export function runs(usual: number, soaked: number): number {
  return SOAKED ? soaked : usual;
}

/**
 * Writes what the long run came to; nothing in any other.
 * @param name of what was tried
 * @param totals counts and sizes by name
 */
export function tellTotals(name: string, totals: object): void {
  if (SOAKED) process.stdout.write(`${name}: ${JSON.stringify(totals)}\n`);
}
