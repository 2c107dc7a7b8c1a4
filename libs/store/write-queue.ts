/**
 * Lets one piece of work run at a time, in the order they were asked for.
 * The ORM shares one SQLite connection, so without it a write would fall into whatever transaction is open and go
 * down with it.
 */
export class WriteQueue {
  #last: Promise<unknown> = Promise.resolve();

  run<T>(work: () => Promise<T>): Promise<T> {
    const turn = this.#last.then(work);
    this.#last = turn.catch(() => undefined);
    return turn;
  }
}
