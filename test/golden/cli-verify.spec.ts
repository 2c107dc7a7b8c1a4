import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { readAddress } from '#libs/store/data-source.js';
import { openConnections, openStore } from '#libs/store/open-store.js';
import { migrations } from '#migrations/migrations.js';
import { databases, type TestDatabase } from '../support/databases.js';
import { approve, madePaper, storedRevision } from '../support/reviewed-revision.js';
import { buildProgram, type Run, Workplace } from './cli-program.js';

const work = new Workplace();

describe('varwright verify', () => {
  let database: TestDatabase;
  let paper: Buffer;
  let contentHash: string;

  beforeAll(async () => {
    buildProgram();
    database = await databases[0]!.create();
    const store = await openStore(database.url);
    const revision = await storedRevision(store, 'mill');
    contentHash = revision.contentHash;
    paper = await approve(store, revision);
    await store.close();
  }, 240_000);

  afterAll(async () => {
    work.remove();
    await database.drop();
  });

  const verify = (operand: string, ...options: string[]): Run =>
    work.run(['verify', operand, '--database', database.url, ...options]);
  const fileOf = (bytes: Buffer | string) => work.file(`${bytes}`, 'pdf');

  it('says of the approved paper that it is approved as it stands, and ends with 0', () => {
    const { code, stdout, stderr } = verify(fileOf(paper));
    expect([code, stdout, stderr]).toEqual([0, 'Approved as it stands: P-0001, revision 1.\n', '']);
  });

  it('says of a draft, and of a paper with one character changed, what it is, and ends with 6', () => {
    const draft = verify(
      fileOf(madePaper({ number: 'P-0001', revision: 1, contentHash }, 'draft, not reviewed')),
      '--json',
    );
    expect([draft.code, JSON.parse(draft.stdout).standing]).toEqual([6, 'draft']);
    const altered = verify(fileOf(`${paper}`.replace('300 kvar', '800 kvar')));
    expect([altered.code, altered.stdout]).toEqual([6, expect.stringMatching(/^Altered: it names P-0001, revision 1/)]);
  });

  it('says of another file that it is not ours, and ends with 3', () => {
    expect(verify(fileOf('%PDF-1.7\n%%EOF\n')).code).toBe(3);
  });

  it('takes the content number typed from a scan', () => {
    const { code, stdout } = verify((contentHash.slice(0, 16).match(/.{4}/g) ?? []).join(' '));
    expect([code, stdout]).toEqual([0, expect.stringMatching(/^P-0001, revision 1 is approved\./)]);
    expect(verify('0123 4567 89ab cdef').code).toBe(3);
  });

  it('changes nothing where there is no database, or one of an earlier version', async () => {
    const none = work.run(['verify', fileOf(paper), '--database', `sqlite:${work.dir}/none.sqlite`, '--json']);
    expect([none.code, JSON.parse(none.stdout).error.code]).toEqual([3, 'not-found']);
    const old = `sqlite:${work.dir}/old.sqlite`;
    const { writer, reader } = await openConnections(readAddress(old), migrations.slice(0, 1));
    for (const source of [writer, reader]) await source.destroy();
    const earlier = work.run(['verify', fileOf(paper), '--database', old]);
    expect([earlier.code, earlier.stderr]).toEqual([3, expect.stringMatching(/one of an earlier version/)]);
    expect(work.run(['verify', fileOf(paper), '--database', 'mysql:x']).code).toBe(2);
  });
});
