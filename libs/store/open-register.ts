import { existsSync } from 'node:fs';
import type { EntityManager } from 'typeorm';
import { InputProblem } from '#libs/engine/index.js';
import { type Address, dataSourceFor, readAddress } from './data-source.js';

/** The register of an installation, to be read and nothing else. */
export interface Register {
  manager: EntityManager;
  close(): Promise<void>;
}

/**
 * Opens the register beside a server that may be running: nothing is created, migrated or written.
 * @param url as for `openStore`
 * @throws InputProblem where there is no database, or its schema is another than this program's
 */
export async function openRegister(url: string): Promise<Register> {
  const address = addressOf(url);
  if (address.type === 'better-sqlite3' && !existsSync(address.database)) {
    throw new InputProblem([{ code: 'not-found', expected: 'the database of an installation', found: 'no such file' }]);
  }
  const source = await dataSourceFor(address, 'read').initialize();
  try {
    const runner = source.createQueryRunner();
    const isKept = await runner.hasTable('audit_entry');
    await runner.release();
    if (!isKept) {
      const expected = 'a database that keeps reviews: start the server of this version once';
      throw new InputProblem([{ code: 'unreadable', expected, found: 'one of an earlier version' }]);
    }
  } catch (error) {
    await source.destroy();
    throw error;
  }
  return { manager: source.manager, close: () => source.destroy() };
}

function addressOf(url: string): Address {
  try {
    return readAddress(url);
  } catch {
    const expected = 'an address that begins with sqlite: (and a file) or postgres://';
    throw new InputProblem([{ code: 'usage', path: 'database', expected, found: 'another' }]);
  }
}
