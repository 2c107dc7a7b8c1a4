import { InputProblem } from '#libs/engine/index.js';

/**
 * A number out of a path.
 * @param text digits
 * @param what it counts, for the message
 * @throws InputProblem `not-found` where it can be no number of ours
 */
export function pathNumber(text: string, what: string): number {
  if (/^[1-9]\d{0,8}$/.test(text)) return Number(text);
  throw new InputProblem([
    { code: 'not-found', expected: `the number of a ${what}`, found: JSON.stringify(text.slice(0, 60)) },
  ]);
}
