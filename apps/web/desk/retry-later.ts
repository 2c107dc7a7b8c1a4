/** Does something again after a while; asked for anew, the wait begins anew. */
export class RetryLater {
  readonly #waitMs: number;
  readonly #work: () => void;
  #timer: ReturnType<typeof setTimeout> | undefined;

  constructor(waitMs: number, work: () => void) {
    this.#waitMs = waitMs;
    this.#work = work;
  }

  begin(): void {
    this.stop();
    this.#timer = setTimeout(this.#work, this.#waitMs);
  }

  stop(): void {
    clearTimeout(this.#timer);
  }
}
