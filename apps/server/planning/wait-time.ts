import { InputProblem } from '#libs/engine/index.js';

const LONGEST_S = 60;

/**
 * How long a request is willing to wait for its job.
 * @param query of the request; `wait` in whole seconds is all it may hold
 * @returns 0 where it says nothing [s]
 */
export function waitS(query: Record<string, unknown>): number {
  const { wait = '0', ...rest } = query;
  const [unknown] = Object.keys(rest);
  if (unknown !== undefined) {
    const path = JSON.stringify(unknown.slice(0, 60));
    throw new InputProblem([{ code: 'unknown-key', path, expected: 'wait', found: 'another parameter' }]);
  }
  const seconds = typeof wait === 'string' && /^\d{1,2}$/.test(wait) ? Number(wait) : Number.NaN;
  if (seconds <= LONGEST_S) return seconds;
  const expected = `whole seconds, at most ${LONGEST_S}`;
  const found = JSON.stringify(String(wait).slice(0, 60));
  throw new InputProblem([{ code: 'out-of-range', path: 'wait', expected, found, unit: 's' }]);
}
