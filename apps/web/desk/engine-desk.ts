import type { RecordSummary } from '#libs/engine/index.js';
import { DeskLink } from './desk-link.js';
import type { Firmness, Look, LookAsked, Trace } from './look.js';

/** The hand has rested when nothing was asked for so long [ms]. */
const REST_MS = 250;

/** What hears of the answers. */
export interface DeskEars {
  looked(look: Look, asked: LookAsked, tookMs: number): void;
  firm(firm: Firmness, asked: LookAsked): void;
  failed(error: Error): void;
  /** the record or the engine's own script did not come: this desk answers nothing, another is to be opened */
  unopened(error: Error): void;
}

/**
 * Workers with the engine: one follows the hand and answers only the newest question, the other judges in full
 * once the hand rests. A third, started when it is first needed, says how
 * firm the verdict is.
 */
export class EngineDesk {
  readonly #near = new DeskLink();
  readonly #far = new DeskLink();
  readonly #ears: DeskEars;
  #pending: LookAsked | null = null;
  #isLooking = false;
  #isWarm = false;
  #third: DeskLink | null = null;
  #traced: Promise<Trace> | null = null;
  #firmAsked: LookAsked | null = null;
  #isFirming = false;
  readonly #open: { ask: 'open'; columnsUrl: string; summary: RecordSummary; timeZone: string };
  #rest: ReturnType<typeof setTimeout> | undefined;
  #opening: Promise<unknown>;

  constructor(record: { columnsUrl: string; summary: RecordSummary; timeZone: string }, ears: DeskEars) {
    this.#ears = ears;
    const open = { ask: 'open' as const, ...record };
    this.#open = open;
    this.#opening = Promise.all([this.#near.ask(open, 'opened'), this.#far.ask(open, 'opened')]);
    this.#opening.catch((error: Error) => ears.unopened(error));
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

  /** Asks how firm the verdict is; of several questions only the newest is answered. */
  async firm(asked: LookAsked): Promise<void> {
    this.#firmAsked = asked;
    if (this.#isFirming) return;
    this.#isFirming = true;
    try {
      this.#third ??= await this.#openThird();
      while (this.#firmAsked !== null) {
        const now: LookAsked = this.#firmAsked;
        this.#firmAsked = null;
        const firm = await this.#third.ask({ ask: 'firm', look: now }, 'firm');
        if (this.#firmAsked === null) this.#ears.firm(firm, now);
      }
    } catch {
      // The full look has said what is wrong with the inputs.
    }
    this.#isFirming = false;
  }

  async #openThird(): Promise<DeskLink> {
    await this.#opening;
    const link = new DeskLink();
    try {
      await link.ask(this.#open, 'opened');
    } catch (error) {
      link.close();
      throw error;
    }
    return link;
  }

  /**
   * @returns the record's own columns
   * @throws Error where they did not come
   */
  trace(): Promise<Trace> {
    this.#traced ??= this.#opening.then(() => this.#far.ask({ ask: 'trace' }, 'trace'));
    return this.#traced;
  }

  close(): void {
    clearTimeout(this.#rest);
    this.#near.close();
    this.#far.close();
    this.#third?.close();
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
    if (!(await this.#isOpen())) return;
    try {
      const fromMs = performance.now();
      const look = await link.ask({ ask: 'look', look: asked }, 'look');
      this.#ears.looked(look, asked, performance.now() - fromMs);
    } catch (error) {
      this.#ears.failed(error as Error);
    }
  }

  #isOpen(): Promise<boolean> {
    return this.#opening.then(
      () => true,
      () => false,
    );
  }
}
