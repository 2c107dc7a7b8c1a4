import type { RecordSummary } from '#libs/engine/index.js';
import { DeskLink } from './desk-link.js';
import type { Look, LookAsked, RatioRow, Trace } from './look.js';

/** The hand has rested when nothing was asked for so long [ms]. */
const REST_MS = 250;

/** What hears of the answers. */
export interface DeskEars {
  looked(look: Look, asked: LookAsked, tookMs: number): void;
  failed(error: Error): void;
}

/**
 * Two workers with the engine: one follows the hand and answers only the newest question, the other judges in full
 * once the hand rests.
 */
export class EngineDesk {
  readonly #near = new DeskLink();
  readonly #far = new DeskLink();
  readonly #ears: DeskEars;
  #pending: LookAsked | null = null;
  #isLooking = false;
  #isWarm = false;
  #rest: ReturnType<typeof setTimeout> | undefined;
  #opening: Promise<unknown>;

  constructor(record: { columnsUrl: string; summary: RecordSummary; timeZone: string }, ears: DeskEars) {
    this.#ears = ears;
    const open = { ask: 'open' as const, ...record };
    this.#opening = Promise.all([this.#near.ask(open, 'opened'), this.#far.ask(open, 'opened')]);
    this.#opening.catch((error: Error) => ears.failed(error));
  }

  /**
   * Asks for a look: a quick one at once, a full one when the hand rests.
   * @param asked what to look at
   * @param isFullOnly nothing moves under the hand: the quick look is left out
   */
  look(asked: LookAsked, isFullOnly = false): void {
    clearTimeout(this.#rest);
    if (!this.#isWarm) {
      this.#isWarm = true;
      void this.#warmUp(asked);
    }
    if (!isFullOnly) {
      this.#pending = { ...asked, depth: 'quick' };
      void this.#follow();
    }
    this.#rest = setTimeout(
      () => void this.#lookOnce(this.#far, { ...asked, depth: 'full' }),
      isFullOnly ? 0 : REST_MS,
    );
  }

  /** @returns the same stages at other reactor ratios */
  async ratios(asked: LookAsked): Promise<RatioRow[]> {
    await this.#opening;
    return this.#far.ask({ ask: 'ratios', look: { ...asked, depth: 'full' } }, 'ratios');
  }

  /** @returns the record's own columns */
  async trace(): Promise<Trace> {
    await this.#opening;
    return this.#far.ask({ ask: 'trace' }, 'trace');
  }

  close(): void {
    clearTimeout(this.#rest);
    this.#near.close();
    this.#far.close();
  }

  async #warmUp(asked: LookAsked): Promise<void> {
    await this.#opening.then(() => this.#near.ask({ ask: 'warm', look: asked }, 'warm')).catch(() => undefined);
  }

  async #follow(): Promise<void> {
    if (this.#isLooking) return;
    this.#isLooking = true;
    while (this.#pending !== null) {
      const asked = this.#pending;
      this.#pending = null;
      await this.#lookOnce(this.#near, asked);
    }
    this.#isLooking = false;
  }

  async #lookOnce(link: DeskLink, asked: LookAsked): Promise<void> {
    try {
      await this.#opening;
      const fromMs = performance.now();
      const look = await link.ask({ ask: 'look', look: asked }, 'look');
      this.#ears.looked(look, asked, performance.now() - fromMs);
    } catch (error) {
      this.#ears.failed(error as Error);
    }
  }
}
