import type { DataSource } from 'typeorm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { chance } from '../../test/support/chance.js';
import { databases, type TestDatabase } from '../../test/support/databases.js';
import { approve, madePaper, NOW, PLANNER, REVIEWER, storedRevision } from '../../test/support/reviewed-revision.js';
import { runs, SEED } from '../../test/support/soak.js';
import { AuditEntry } from './audit-entry.js';
import { dataSourceFor, readAddress } from './data-source.js';
import { IssuedPaper } from './issued-paper.js';
import { openStore } from './open-store.js';
import { registerFaults } from './register.js';
import { carryOut, readReview } from './reviews.js';
import type { Revision } from './revision.js';
import { deleteSite } from './sites.js';
import type { Store } from './store.js';
import { everything, ofOrganisation, verifyNumber, verifyPaper } from './verify-paper.js';

for (const { name, available, create } of databases) {
  describe.runIf(available)(`reviews on ${name}`, () => {
    let database: TestDatabase;
    let store: Store;

    beforeAll(async () => {
      database = await create();
      store = await openStore(database.url);
    });

    afterAll(async () => {
      await store.close();
      await database.drop();
    });

    const comment = (revision: Revision, text: string, seen: number | null) =>
      store.write((manager) =>
        carryOut(manager, revision, { by: REVIEWER, act: { act: 'comment', figure: null, text }, now: NOW, seen }),
      );
    const faults = () => store.read((manager) => registerFaults(manager));

    it('are what their lines of the log say, and a revision nobody touched is a draft', async () => {
      const revision = await storedRevision(store, 'a');
      await approve(store, revision);
      const { review, version } = await store.read((manager) => readReview(manager, revision.id));
      expect([review.state, version, review.findings[0]!.acceptance?.reason]).toEqual(['approved', 5, 'seen on site']);
      expect(review.approval).toMatchObject({ by: REVIEWER, isOwn: false, at: NOW.toISOString() });
      const untouched = await store.read((manager) => readReview(manager, 'nobody'));
      expect([untouched.review.state, untouched.version]).toEqual(['draft', 0]);
      expect(await faults()).toEqual([]);
    });

    it('are carried on by one of ten who saw the same version, and by nobody who saw an earlier one', async () => {
      const revision = await storedRevision(store, 'b');
      const asked = await Promise.allSettled(Array.from({ length: 10 }, (_, i) => comment(revision, `by ${i}`, 1)));
      expect(asked.filter(({ status }) => status === 'fulfilled')).toHaveLength(1);
      for (const one of asked) if (one.status === 'rejected') expect(one.reason.code).toBe('stale');
      await expect(comment(revision, 'late', 1)).rejects.toThrow(/version 2.*version 1/);
    });

    it('of many revisions at once make one chain', async () => {
      const all: Revision[] = [];
      for (const id of ['c1', 'c2', 'c3', 'c4']) all.push(await storedRevision(store, id));
      await Promise.all(all.flatMap((one) => [1, 2, 3].map((i) => comment(one, `line ${i}`, null))));
      expect(await faults()).toEqual([]);
      for (const { id } of all) {
        const { review } = await store.read((manager) => readReview(manager, id));
        expect(review.comments).toHaveLength(3);
      }
    });

    it('that refuse an act leave neither a line nor a version behind', async () => {
      const revision = await storedRevision(store, 'd');
      const before = await store.read((manager) => manager.count(AuditEntry));
      const asked = { by: PLANNER, act: { act: 'withdraw', reason: ' ' }, now: NOW, seen: null } as const;
      await expect(store.write((manager) => carryOut(manager, revision, asked))).rejects.toThrow(/a reason/);
      expect(await store.read((manager) => manager.count(AuditEntry))).toBe(before);
      expect((await store.read((manager) => readReview(manager, revision.id))).version).toBe(1);
    });

    it('keep what was issued: its site is not removed, while that of a draft is, and the log stands', async () => {
      await approve(store, await storedRevision(store, 'e'));
      await expect(store.write((manager) => deleteSite(manager, 'e', null))).rejects.toThrow(/kept for ever/);
      await expect(store.write((manager) => manager.query(`DELETE FROM site WHERE id = 'e'`))).rejects.toThrow();
      await storedRevision(store, 'f');
      await store.write((manager) => deleteSite(manager, 'f', null));
      expect(await faults()).toEqual([]);
      expect(await store.read((manager) => manager.countBy(AuditEntry, { revisionId: 'f-1' }))).toBe(1);
    });

    it('say what a paper is: approved, signed afterwards, draft, superseded, withdrawn, altered or unknown', async () => {
      const revision = await storedRevision(store, 'g');
      const paper = await approve(store, revision);
      const standing = async (bytes: Uint8Array) =>
        (await store.read((manager) => verifyPaper(manager, bytes, everything))).standing;
      const act = (what: { act: 'supersede'; by: number; reason: string } | { act: 'withdraw'; reason: string }) =>
        store.write((manager) => carryOut(manager, revision, { by: REVIEWER, act: what, now: NOW, seen: null }));
      expect(await standing(paper)).toBe('approved');
      expect(await standing(madePaper(revision, 'draft, not reviewed'))).toBe('draft');
      expect(await standing(Buffer.from(`${paper}`.replace('298.4', '398.4')))).toBe('altered');
      expect(await standing(Buffer.from(`${paper}`.replaceAll(revision.contentHash, 'x').replace('298', '398')))).toBe(
        'altered',
      );
      expect(await standing(Buffer.from('%PDF-1.7\n%%EOF\n'))).toBe('unknown');
      expect((await store.read((manager) => verifyPaper(manager, paper, ofOrganisation('another')))).standing).toBe(
        'unknown',
      );
      const [byNumber] = await store.read((m) => verifyNumber(m, revision.contentHash.slice(0, 16), everything));
      expect(byNumber).toMatchObject({ state: 'approved', revision: 1, faults: [] });
      await act({ act: 'supersede', by: 2, reason: 'a new press' });
      expect(await standing(paper)).toBe('superseded');
      const other = await storedRevision(store, 'h');
      const withdrawn = await approve(store, other);
      await store.write((manager) =>
        carryOut(manager, other, {
          by: REVIEWER,
          act: { act: 'withdraw', reason: 'wrong site' },
          now: NOW,
          seen: null,
        }),
      );
      expect(await standing(withdrawn)).toBe('withdrawn');
      const kept = await store.read((manager) => manager.findOneByOrFail(IssuedPaper, { revisionId: other.id }));
      expect(Buffer.compare(kept.bytes, withdrawn)).toBe(0);
    });
  });
}

const TAMPERS = runs(120, 500);

describe(`a single byte altered, ${TAMPERS} times (seed ${SEED})`, () => {
  let database: TestDatabase;
  let store: Store;
  let raw: DataSource;
  let papers: Buffer[];

  beforeAll(async () => {
    database = await databases[0]!.create();
    store = await openStore(database.url);
    papers = [];
    for (const id of ['mill', 'forge', 'press']) papers.push(await approve(store, await storedRevision(store, id)));
    raw = await dataSourceFor(readAddress(database.url)).initialize();
    await raw.query('PRAGMA foreign_keys = OFF');
  });

  afterAll(async () => {
    await raw.destroy();
    await store.close();
    await database.drop();
  });

  /** Every value a review, its plan and its papers rest on. */
  const PLACES: [table: string, columns: string][] = [
    ['audit_entry', 'sequence revisionId content previousHash hash'],
    ['audit_entry', 'content content content previousHash hash'],
    ['review', 'revisionId state version lastSequence'],
    ['issued_paper', 'revisionId bytes bytes sha256'],
    ['proposal', 'revisionId bytes bytes sha256'],
    [
      'revision',
      'siteId number revision kind recordId recordHash inputs engineVersion contentHash result result proposed verdict createdAt author reason',
    ],
    ['record_column', 'bytes'],
  ];

  /** The value with one byte, or one digit, another. */
  function altered(value: string | number | Buffer, random: ReturnType<typeof chance>): string | number | Buffer {
    if (typeof value === 'number') return value + 1;
    const bytes = Buffer.from(value);
    let at = random.whole(0, bytes.length - 1);
    // A moment is the same moment whatever stands between its digits.
    const isMoment = typeof value === 'string' && /^\d{4}-\d\d-\d\d /.test(value);
    while (isMoment && !/\d/.test(value[at]!)) at = random.whole(0, bytes.length - 1);
    // the lowest bit keeps text a text
    bytes[at] = bytes[at]! ^ 1;
    return typeof value === 'string' ? bytes.toString() : bytes;
  }

  async function isFoundInDatabase(run: number, look: () => Promise<boolean>): Promise<boolean> {
    const random = chance(SEED + run);
    const [table, columns] = random.oneOf(PLACES);
    const column = random.oneOf(columns.split(' '));
    const rows = await raw.query(`SELECT rowid AS place, "${column}" AS value FROM "${table}"`);
    const { place, value } = random.oneOf(rows as { place: number; value: string }[]);
    const change = (to: unknown, at: number) =>
      raw.query(`UPDATE "${table}" SET "${column}" = ? WHERE rowid = ?`, [to, at]);
    const tampered = altered(value, random);
    const key = table === 'audit_entry' && column === 'sequence' ? Number(tampered) + 1000 : place;
    await change(key === place ? tampered : key, place);
    const isFound = await look();
    await change(value, key);
    return isFound;
  }

  const registerIsAltered = async () => (await store.read((manager) => registerFaults(manager))).length > 0;

  it('in the database, its log included, is found every time', async () => {
    const missed: number[] = [];
    for (let run = 0; run < TAMPERS / 2; run++)
      if (!(await isFoundInDatabase(run, registerIsAltered))) missed.push(run);
    expect(missed).toEqual([]);
    expect(await registerIsAltered()).toBe(false);
  });

  it('in a paper is found every time', async () => {
    const missed: number[] = [];
    for (let run = 0; run < TAMPERS / 2; run++) {
      const random = chance(SEED + 10_000 + run);
      const bytes = Buffer.from(random.oneOf(papers));
      const at = random.whole(0, bytes.length - 1);
      bytes[at] = bytes[at]! ^ (1 << random.whole(0, 7));
      const { standing } = await store.read((manager) => verifyPaper(manager, bytes, everything));
      if (standing !== 'altered') missed.push(at);
    }
    expect(missed).toEqual([]);
  });

  it('would be missed by who looks at the chain alone: the control', async () => {
    const chainAlone = async () =>
      (await store.read((manager) => registerFaults(manager))).some(({ fault }) => fault === 'log');
    let missed = 0;
    for (let run = 0; run < 60; run++) if (!(await isFoundInDatabase(run, chainAlone))) missed++;
    expect(missed).toBeGreaterThan(10);
  });
});
