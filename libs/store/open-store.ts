import { type Address, type Change, dataSourceFor, readAddress } from './data-source.js';
import { migrate } from './migrate.js';
import { checkSqliteConnection } from './sqlite-checks.js';
import { type Connections, Store } from './store.js';
import { WriteQueue } from './write-queue.js';

/**
 * Opens the database, brings its schema up to date and checks what it stands on.
 * @param url `sqlite:path/to/file`, or `postgres://user@host:port/name`
 * @returns the store; close it before the process ends
 * @throws Error where the database cannot be trusted or was made by a newer version
 */
export async function openStore(url: string): Promise<Store> {
  return new Store(await openConnections(readAddress(url)));
}

/**
 * The connections behind a store, migrated and checked.
 * @param address where the data is
 * @param changes the changes of schema the program knows; absent, all of them
 */
export async function openConnections(address: Address, changes?: readonly Change[]): Promise<Connections> {
  const writer = await dataSourceFor(address, 'write', changes).initialize();
  try {
    if (address.type === 'postgres') {
      await migrate(writer, null);
      return { writer, reader: writer, queue: null };
    }
    await checkSqliteConnection(writer);
    await migrate(writer, address.database);
    await checkSqliteConnection(writer);
    const reader = await dataSourceFor(address, 'read', changes).initialize();
    return { writer, reader, queue: new WriteQueue() };
  } catch (error) {
    if (writer.isInitialized) await writer.destroy();
    throw error;
  }
}
