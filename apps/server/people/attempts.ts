import { RefusedRequest } from '../refused-request.js';

const MOST_FAILURES = 10;
const WINDOW_MS = 15 * 60_000;
/** So many names are remembered; beyond, the one tried longest ago is forgotten. */
const MOST_NAMES = 10_000;

/** Counts tries of a password by name, so that guessing takes for ever; kept in memory alone. */
export class Attempts {
  readonly #tries = new Map<string, number[]>();

  /**
   * Counts a try before it is made, so that many at once do not pass together.
   * @param name whose password is tried
   * @param nowMs moment [ms]
   * @throws RefusedRequest 429 after ten in a quarter of an hour
   */
  count(name: string, nowMs: number): void {
    const recent = (this.#tries.get(name) ?? []).filter((triedMs) => triedMs > nowMs - WINDOW_MS);
    this.#tries.delete(name);
    this.#tries.set(name, recent);
    if (recent.length >= MOST_FAILURES) throw tooMany(recent[0]! + WINDOW_MS - nowMs);
    recent.push(nowMs);
    const [oldest] = this.#tries.keys();
    if (this.#tries.size > MOST_NAMES && oldest !== undefined) this.#tries.delete(oldest);
  }

  /** Forgets the tries of a name, once one was right. */
  forget(name: string): void {
    this.#tries.delete(name);
  }
}

function tooMany(waitMs: number): RefusedRequest {
  const minutes = Math.ceil(waitMs / 60_000);
  return new RefusedRequest(429, 'Too many tries', {
    code: 'usage',
    expected: `at most ${MOST_FAILURES} tries in a quarter of an hour; wait ${minutes} min`,
    found: 'one more',
  });
}
