/** So often a page that is looked at asks whether the server still answers [ms]. */
const EVERY_MS = 10_000;
/** The wait before a lost connection is tried again [ms]. */
const MEND_MS = 4000;

/** What is done about a connection. */
export interface ConnectionWork {
  /** nothing answers */
  lost(): void;
  /** tries again; where that fails, the loss is said and mended anew */
  mend(): void;
}

/** Notices that the server is gone while nobody asks anything of it, and tries again until it is back. */
export class Connection {
  readonly #work: ConnectionWork;
  readonly #pulse = setInterval(() => void this.#ask(), EVERY_MS);
  readonly #heard = new AbortController();
  #retry: ReturnType<typeof setTimeout> | null = null;

  constructor(work: ConnectionWork) {
    this.#work = work;
    const { signal } = this.#heard;
    addEventListener('offline', () => work.lost(), { signal });
    addEventListener('online', () => this.#retry !== null && this.#mend(), { signal });
  }

  /** Tries again after a while; said anew, the wait begins anew. */
  mendLater(): void {
    clearTimeout(this.#retry ?? undefined);
    this.#retry = this.#heard.signal.aborted ? null : setTimeout(() => this.#mend(), MEND_MS);
  }

  close(): void {
    clearInterval(this.#pulse);
    clearTimeout(this.#retry ?? undefined);
    this.#heard.abort();
  }

  #mend(): void {
    clearTimeout(this.#retry ?? undefined);
    this.#retry = null;
    this.#work.mend();
  }

  async #ask(): Promise<void> {
    if (document.visibilityState !== 'visible') return;
    const { signal } = this.#heard;
    const isAnswered = await fetch('/healthz', { cache: 'no-store', signal }).then(
      () => true,
      () => signal.aborted,
    );
    if (!isAnswered) this.#work.lost();
  }
}
