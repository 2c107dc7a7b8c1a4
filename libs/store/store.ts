import { AsyncLocalStorage } from 'node:async_hooks';
import type { DataSource, EntityManager } from 'typeorm';
import { WriteQueue } from './write-queue.js';

/** Work inside one transaction. */
export type Work<T> = (manager: EntityManager) => Promise<T>;

/** A transaction and the queue of those nested in it. */
interface Transaction {
  manager: EntityManager;
  queue: Pick<WriteQueue, 'run'>;
  open: boolean;
}

/** The connections of a store: on SQLite a second one that can only read; on PostgreSQL the pool twice. */
export interface Connections {
  writer: DataSource;
  reader: DataSource;
  /** null where the database itself keeps transactions apart */
  queue: Pick<WriteQueue, 'run'> | null;
}

/**
 * The only way to the database. Every write is a transaction and waits for its turn; a write begun inside another
 * becomes a part of it that can fail alone; reads see what is committed and nothing else.
 */
export class Store {
  readonly #connections: Connections;
  readonly #inside = new AsyncLocalStorage<Transaction>();

  constructor(connections: Connections) {
    this.#connections = connections;
  }

  /** Whether claims may skip rows that another connection holds. */
  get skipsLocked(): boolean {
    return this.#connections.writer.options.type === 'postgres';
  }

  /**
   * Runs work in a transaction: committed when it returns, undone when it throws.
   * @param work everything it writes goes through the manager it is given
   */
  write<T>(work: Work<T>): Promise<T> {
    const outer = this.#inside.getStore();
    if (outer?.open) return outer.queue.run(() => this.#begin(outer.manager, work));
    const begin = () => this.#begin(this.#connections.writer.manager, work);
    return this.#connections.queue === null ? begin() : this.#connections.queue.run(begin);
  }

  /** Reads what is committed; on SQLite over a connection that cannot write. */
  read<T>(work: Work<T>): Promise<T> {
    return work(this.#connections.reader.manager);
  }

  /** Waits for the writes that were asked for, then closes. */
  async close(): Promise<void> {
    const { writer, reader, queue } = this.#connections;
    await queue?.run(async () => undefined);
    if (reader !== writer && reader.isInitialized) await reader.destroy();
    if (writer.isInitialized) await writer.destroy();
  }

  #begin<T>(parent: EntityManager, work: Work<T>): Promise<T> {
    return parent.transaction(async (manager) => {
      const transaction: Transaction = { manager, queue: new WriteQueue(), open: true };
      try {
        return await this.#inside.run(transaction, () => work(manager));
      } finally {
        transaction.open = false;
      }
    });
  }
}
