import { afterEach, describe, expect, it } from 'vitest';
import { migrations } from '#migrations/migrations.js';
import { databases, type TestDatabase } from '../../test/support/databases.js';
import { readAddress } from './data-source.js';
import { openConnections } from './open-store.js';
import { ProposalFile } from './proposal-file.js';
import { Revision } from './revision.js';
import { insertRevision } from './revisions.js';
import { Store } from './store.js';

const NOW = new Date('2026-01-31T10:20:30.456Z');
const HASH = 'a1'.repeat(32);
const dropping: TestDatabase[] = [];

afterEach(async () => {
  for (const database of dropping.splice(0)) await database.drop();
});

const revision = (parts: Partial<Revision>): Revision => ({
  id: 'r1',
  siteId: 's',
  number: 'P-0001',
  revision: 1,
  kind: 'plan',
  recordId: null,
  recordHash: null,
  inputs: '{}',
  engineVersion: '0.1.0',
  contentHash: HASH,
  result: '{"record":null}',
  proposed: 'estimate: no bank.',
  rival: null,
  verdict: 'watch',
  createdAt: NOW,
  author: null,
  reason: null,
  paperForm: null,
  ...parts,
});

for (const { name, available, create } of databases) {
  describe.runIf(available)(`revisions without a record, on ${name}`, () => {
    it('revisions, papers and records that stood before the change stand after it, to the letter', async () => {
      const database = await create();
      dropping.push(database);
      const before = new Store({
        ...(await openConnections(readAddress(database.url), migrations.slice(0, 1))),
        queue: null,
      });
      await before.write(async (manager) => {
        // by hand: the table had no organisations yet
        await manager.query(
          `INSERT INTO site ("id", "number", "name", "document", "version", "lastRevision", "createdAt", "updatedAt")
           VALUES ('s', 1, 'Alder Works', '{"name":"Alder Works"}', 1, 0, '2026-01-31', '2026-01-31')`,
        );
        await manager.query(
          `INSERT INTO load_record ("id", "siteId", "hash", "intervalS", "firstS", "endS", "intervalCount", "repaired", "duplicates", "notes", "summary", "quality", "fileHash", "fileBytes", "createdAt")
           VALUES ('c', 's', '${HASH}', 900, 0, 900, 1, 0, 0, '[]', '{}', '{}', '${HASH}', 1, '2026-01-31')`,
        );
        await manager.query(
          `INSERT INTO revision ("id", "siteId", "number", "revision", "kind", "recordId", "recordHash", "inputs", "engineVersion", "contentHash", "result", "proposed", "verdict", "createdAt")
           VALUES ('r1', 's', 'P-0001', 1, 'plan', 'c', '${HASH}', '{}', '0.1.0', '${HASH}', '{"record":null}', 'estimate: no bank.', 'watch', '2026-01-31')`,
        );
        await manager.insert(ProposalFile, { revisionId: 'r1', bytes: Buffer.from('paper'), sha256: HASH });
        await manager.query(`UPDATE site SET "lastRevision" = 1`);
      });
      await before.close();
      const after = new Store({ ...(await openConnections(readAddress(database.url))), queue: null });
      const [kept] = await after.read((manager) => manager.find(Revision));
      expect(kept).toMatchObject({
        id: 'r1',
        recordId: 'c',
        recordHash: HASH,
        result: '{"record":null}',
        verdict: 'watch',
      });
      const [paper] = await after.read((manager) => manager.find(ProposalFile));
      expect(paper?.bytes.toString()).toBe('paper');
      // still bound to its record, and now possible without one
      await expect(after.write((manager) => manager.query(`DELETE FROM load_record`))).rejects.toThrow();
      const added = revision({ id: 'r2', revision: 2, contentHash: 'b2'.repeat(32) });
      await after.write((manager) =>
        insertRevision(manager, { revision: added, proposal: { bytes: Buffer.from('estimate'), sha256: HASH } }),
      );
      expect(await after.read((manager) => manager.countBy(Revision, {}))).toBe(2);
      await after.close();
    });
  });
}
