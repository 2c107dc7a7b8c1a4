// long: one review from its draft to its end, each step resting on the one before
import { createHash } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { dataSourceFor, readAddress } from '#libs/store/data-source.js';
import { type TestDatabase, usualDatabases } from '../support/databases.js';
import { COMMISSIONED } from '../support/made-review.js';
import { textOf } from '../support/pdf-text.js';
import { savedAfterwards } from '../support/sign-afterwards.js';
import { startServer, type TestServer } from '../support/test-server.js';
import { meterFile, siteFile } from './site-builder.js';

/** A site whose plan takes the engine little: a bank to reach the target, no tariff. */
const site = (name: string) =>
  siteFile({ name, tariff: undefined, prices: undefined, catalogue: undefined, finance: undefined });
const SIGNED = { name: 'M. Okafor', licence: 'REC 10442', jurisdiction: 'Ireland' };
const REASON = { reason: 'seen on site' };

for (const { name, available, create } of usualDatabases) {
  describe.runIf(available)(`the review of a revision over HTTP, on ${name}`, () => {
    let database: TestDatabase;
    let server: TestServer;
    let siteId: string;

    const at = (revision: number, rest = '') => `/api/sites/${siteId}/revisions/${revision}${rest}`;
    const review = async (revision: number) => (await server.ask('GET', at(revision, '/review'))).body;
    /** Does an act under the version that stands now, or under another. */
    const act = async (revision: number, what: string, body: object, seen?: string) => {
      const version = seen ?? `"${(await review(revision)).version}"`;
      return server.ask('POST', at(revision, `/review/${what}`), body, { 'if-match': version });
    };
    const verify = async (bytes: Uint8Array) => {
      const headers = { 'content-type': 'application/pdf' };
      const sent = await fetch(`${server.base}/api/verify`, { method: 'POST', body: Buffer.from(bytes), headers });
      return (await sent.json()) as { standing: string; signedAfterwards: boolean; text: string };
    };
    const listed = async () =>
      (await server.ask('GET', '/api/sites')).body.sites.find(({ id }: { id: string }) => id === siteId);
    const plan = () =>
      server.ask('POST', `/api/sites/${siteId}/plans?wait=60`, { author: 'R. Aldane', reason: 'first' });
    const paperOf = async (revision: number) => (await server.ask('GET', at(revision, '/approved.pdf'))).body as Buffer;
    /** Everything a reviewer has to do before an approval. */
    const settle = async (revision: number) => {
      await act(revision, 'submit', {});
      await act(revision, 'own-approval', { reason: 'one person on this machine' });
      const { findings, figures } = await review(revision);
      for (const { id, level } of findings) {
        expect(level).toBe('to be accepted');
        expect((await act(revision, 'findings', { finding: id, ...REASON })).status).toBe(200);
      }
      expect((await act(revision, 'hand-checks', { figure: figures[0].id, value: figures[0].value })).status).toBe(200);
    };

    beforeAll(async () => {
      database = await create();
      server = await startServer(database.url);
      siteId = (await server.ask('POST', '/api/sites', site('Alder Works'))).body.id;
      expect((await server.upload(siteId, meterFile(14))).status).toBe(201);
      expect((await plan()).status).toBe(201);
    }, 240_000);

    afterAll(async () => {
      await server.close();
      await database.drop();
    });

    it('begins as a draft whose first line says who prepared it and what was made', async () => {
      const shown = await review(1);
      expect(shown).toMatchObject({ state: 'draft', version: 1, preparers: [{ name: 'local user' }], stale: null });
      expect(shown.log).toMatchObject([{ sequence: 1, act: 'prepare', previousHash: '0'.repeat(64) }]);
      const draft = (await server.ask('GET', at(1, '/proposal.pdf'))).body;
      expect(await verify(draft)).toMatchObject({ standing: 'draft' });
      expect((await server.ask('GET', at(1, '/approved.pdf'))).status).toBe(404);
      expect((await listed()).latest).toMatchObject({ revision: 1, state: 'draft', stateText: 'draft, not reviewed' });
    });

    it('wants the version in If-Match, and refuses another with both', async () => {
      expect((await server.ask('POST', at(1, '/review/submit'), {})).status).toBe(428);
      const { status, body } = await act(1, 'submit', {}, '"7"');
      expect([status, body.code, body.detail]).toEqual([412, 'stale', 'expected version 1, found version 7']);
      expect(body.versions).toEqual({ seen: 7, current: 1 });
    });

    it('is refused to whoever prepared the plan, then allowed by the administrator, and says so', async () => {
      const sent = await act(1, 'submit', { note: 'the reactors', signature: SIGNED });
      expect([sent.status, sent.body.state]).toEqual([200, 'forReview']);
      const { figures, findings } = sent.body;
      const own = await act(1, 'hand-checks', { figure: figures[0].id, value: 1 });
      expect([own.status, own.body.detail]).toEqual([409, expect.stringMatching(/who prepared it/)]);
      expect((await act(1, 'own-approval', REASON)).status).toBe(200);
      expect((await act(1, 'findings', { finding: 'none', ...REASON })).status).toBe(404);
      const off = await act(1, 'hand-checks', { figure: figures[0].id, value: figures[0].value * 1.05 });
      expect(off.body.handChecks[0]).toMatchObject({ isBeyond: true, text: expect.stringMatching(/more than 2/) });
      const early = await act(1, 'approve', SIGNED);
      expect(early.status).toBe(409);
      expect(early.body.problems.map(({ path }: { path: string }) => path)).toEqual([
        ...findings.map(({ id }: { id: string }) => `findings.${id}`),
        `handChecks.${figures[0].id}`,
      ]);
    });

    it.each(['name', 'licence', 'jurisdiction'])('is not signed with an empty %s', async (part) => {
      for (const empty of ['', '  ']) {
        const { status, body } = await act(1, 'approve', { ...SIGNED, [part]: empty });
        expect([409, 422]).toContain(status);
        expect(body.problems[0].path).toMatch(part);
      }
    });

    it('ends in an approval that freezes plan and paper', async () => {
      const { figures, findings } = await review(1);
      for (const { id } of findings) await act(1, 'findings', { finding: id, ...REASON });
      expect((await act(1, 'comments', { figure: 'none', text: 'x' })).status).toBe(404);
      await act(1, 'comments', { figure: figures[0].id, text: 'the record has one day more than I used' });
      const approved = await act(1, 'approve', SIGNED);
      expect([approved.status, approved.body.state, approved.body.approval?.isOwn]).toEqual([200, 'approved', true]);
      expect((await listed()).latest).toMatchObject({ revision: 1, state: 'approved', stateText: 'approved' });
      const paper = await paperOf(1);
      expect(createHash('sha256').update(paper).digest('hex')).toBe(approved.body.approval.paper.sha256);
      expect(await verify(paper)).toMatchObject({ standing: 'approved', signedAfterwards: false });
      expect(await verify(savedAfterwards(paper))).toMatchObject({ standing: 'approved', signedAfterwards: true });
      const changed = Buffer.from(paper);
      changed[changed.length >> 1]! ^= 1;
      expect(await verify(changed)).toMatchObject({ standing: 'altered' });
      expect(await verify(Buffer.from('%PDF-1.7\n%%EOF\n'))).toMatchObject({ standing: 'unknown' });
      expect((await server.ask('DELETE', `/api/sites/${siteId}`)).status).toBe(409);
    });

    it('shows by a link to the revision where it stands, and gives what was approved', async () => {
      const { path } = (await server.ask('POST', at(1, '/links'), { days: 7 })).body;
      expect((await server.ask('GET', `/api${path}`)).body).toMatchObject({ revision: 1, state: 'approved' });
      expect(await (await fetch(`${server.base}${path}`)).text()).toContain('Review: approved.');
      const given = (await server.ask('GET', `/api${path}/proposal.pdf`)).body as Buffer;
      expect(given.equals(await paperOf(1))).toBe(true);
      // the draft is another paper
      expect(given.equals((await server.ask('GET', at(1, '/proposal.pdf'))).body)).toBe(false);
    });

    it('is found by the number typed from a scan', async () => {
      const { contentHash } = (await server.ask('GET', at(1))).body;
      const typed = contentHash.slice(0, 16).match(/.{4}/g).join(' ');
      const { body } = await server.ask('GET', `/api/verify?number=${encodeURIComponent(typed)}`);
      expect(body.papers).toMatchObject([{ revision: 1, state: 'approved', faults: [] }]);
      expect((await server.ask('GET', '/api/verify?number=12')).status).toBe(422);
      expect((await server.ask('GET', `/api/verify?number=${'0'.repeat(16)}`)).body.papers).toEqual([]);
    });

    it('goes on with the record as installed, signed for the installation', async () => {
      const bad = await act(1, 'commissioning', { ...SIGNED, record: { ...COMMISSIONED, doneOn: '2026-02-30' } });
      expect([bad.status, bad.body.path]).toEqual([422, 'record.doneOn']);
      const { status, body } = await act(1, 'commissioning', { ...SIGNED, record: COMMISSIONED });
      expect(status).toBe(200);
      expect(body.commissioning[0].record).toEqual(COMMISSIONED);
      expect(body.signatures.at(-1)).toMatchObject({ capacity: 'installation', licence: SIGNED.licence });
    });

    it('refuses a revision the site has moved on from, naming what changed', async () => {
      const put = await server.ask('PUT', `/api/sites/${siteId}`, site('Renamed'), { 'if-match': '"1"' });
      expect(put.status).toBe(200);
      expect((await plan()).body.revision).toBe(2);
      await settle(2);
      await server.ask('PUT', `/api/sites/${siteId}`, site('Renamed again'), { 'if-match': '"2"' });
      const changed = await act(2, 'approve', SIGNED);
      expect([changed.status, changed.body.path]).toEqual([412, 'siteChanged']);
      expect((await plan()).body.revision).toBe(3);
      const later = await act(2, 'approve', SIGNED);
      expect([later.status, later.body.path, later.body.problems[0].found]).toEqual([
        412,
        'laterRevision',
        'revision 3',
      ]);
      expect((await act(2, 'withdraw', REASON)).body.state).toBe('withdrawn');
    });

    it('of a later revision supersedes the earlier, whose paper stays as it was', async () => {
      const before = await paperOf(1);
      await settle(3);
      expect((await act(3, 'approve', SIGNED)).body.state).toBe('approved');
      expect(await review(1)).toMatchObject({ state: 'superseded', supersededBy: 3 });
      const { revisions } = (await server.ask('GET', `/api/sites/${siteId}/revisions`)).body;
      expect(revisions.map(({ state }: { state: string }) => state)).toEqual(['approved', 'withdrawn', 'superseded']);
      expect(Buffer.compare(await paperOf(1), before)).toBe(0);
      expect(await verify(before)).toMatchObject({ standing: 'superseded', text: expect.stringMatching(/revision 3/) });
      expect((await act(1, 'comments', { text: 'too late' })).status).toBe(409);
      expect((await act(3, 'supersede', { by: 2, ...REASON })).status).toBe(409);
    });

    it('is told apart from another field by field, results included', async () => {
      const { body } = await server.ask('GET', at(1, '/differences/3'));
      expect(body.inputs).toMatchObject({ count: 1, lines: ['site.name: Alder Works → Renamed again'] });
      expect(body.about.fields.map(({ path }: { path: string }) => path)).toContain('createdAt');
      const page = await server.ask('GET', `/sites/${siteId}/revisions/1/differences/3`);
      expect(page.body).toMatch(/site, name.*Renamed again/s);
    });

    it('of the same inputs and engine gives the same plan to the bit, and nothing is stored', async () => {
      const { body } = await server.ask('POST', at(3, '/again'), {});
      expect(body).toMatchObject({ isSame: true, results: { count: 0 }, inputs: { count: 0 } });
      const kept = await server.ask('POST', at(3, '/again'), { keep: true });
      expect([kept.status, kept.body.revision]).toEqual([200, 3]);
      expect((await server.ask('GET', `/api/sites/${siteId}/revisions`)).body.revisions).toHaveLength(3);
    });

    it('shows its page with what is open, and the log', async () => {
      const { body } = await server.ask('GET', `/sites/${siteId}/revisions/3/review`);
      for (const part of ['revision 3 is approved', 'REC 10442', 'Record the bank as installed', 'allowed whoever']) {
        expect(body).toContain(part);
      }
      expect((await server.ask('GET', '/verify')).body).toContain('Is this paper what was approved?');
    });

    it('of a plan by an earlier engine is refused, compared, and kept only as a further revision', async () => {
      await server.ask('PUT', `/api/sites/${siteId}`, site('Older'), { 'if-match': '"3"' });
      const { body: made } = await plan();
      const raw = await dataSourceFor(readAddress(database.url)).initialize();
      const inputs = JSON.stringify(made.inputs).replace(/"engineVersion":"[^"]+"/, '"engineVersion":"0.0.9"');
      const result = JSON.stringify(made.result).replace(/"maxKvar":([\d.]+)/, '"maxKvar":1$1');
      const hash = createHash('sha256').update(inputs).digest('hex');
      const values = [inputs, result, '0.0.9', hash].map((text) => `'${text.replaceAll("'", "''")}'`);
      const columns = ['inputs', 'result', '"engineVersion"', '"contentHash"'];
      const set = columns.map((column, i) => `${column} = ${values[i]}`).join(', ');
      await raw.query(`UPDATE revision SET ${set} WHERE "siteId" = '${siteId}' AND revision = ${made.revision}`);
      await raw.destroy();
      const before = (await server.ask('GET', at(made.revision))).body;
      expect((await review(made.revision)).stale).toMatchObject({ why: 'engineChanged' });
      const { body } = await server.ask('POST', at(made.revision, '/again'), {});
      expect(body).toMatchObject({ isSame: false, engineVersion: { before: '0.0.9' } });
      expect(body.results.lines.join()).toMatch(/requirement\.maxKvar: 1.* → /);
      expect((await server.ask('GET', at(made.revision))).body).toEqual(before);
      const kept = await server.ask('POST', at(made.revision, '/again?wait=60'), { keep: true });
      expect([kept.status, kept.body.revision]).toEqual([201, made.revision + 1]);
      expect((await server.ask('GET', at(made.revision))).body).toEqual(before);
    });

    it('goes back with a reason; what is planned again is the same revision until an input changes, then the next', async () => {
      const made = await server.ask('POST', '/api/sites', site('Birch Works'));
      siteId = made.body.id;
      await server.upload(siteId, meterFile(14));
      expect((await plan()).status).toBe(201);
      await act(1, 'submit', {});
      const back = await act(1, 'return', { reason: 'the target is the old tariff’s' });
      expect([back.status, back.body.state]).toEqual([200, 'draft']);
      expect(back.body.returned).toMatchObject({ reason: 'the target is the old tariff’s' });
      const same = await plan();
      expect([same.status, same.body.revision]).toEqual([200, 1]);
      const changed = { ...site('Birch Works'), target: { powerFactor: 0.9 } };
      await server.ask('PUT', `/api/sites/${siteId}`, changed, { 'if-match': made.headers.get('etag')! });
      const next = await plan();
      expect([next.status, next.body.revision]).toEqual([201, 2]);
      expect([(await review(2)).state, (await review(1)).returned.reason]).toEqual([
        'draft',
        back.body.returned.reason,
      ]);
      // a revision that has ended stands in the way of nothing: the same inputs make the next
      expect((await act(2, 'withdraw', REASON)).body.state).toBe('withdrawn');
      const issuedAnew = await plan();
      expect([issuedAnew.status, issuedAnew.body.revision]).toEqual([201, 3]);
      const { contentHash } = next.body;
      expect(issuedAnew.body).toMatchObject({ contentHash, result: next.body.result });
      const { body } = await server.ask('GET', `/api/verify?number=${contentHash.slice(0, 16)}`);
      expect(body.papers.map((one: { state: string }) => one.state)).toEqual(['withdrawn', 'draft']);
    });

    it('is approved in the language it was planned in, found by its name where it was altered', async () => {
      siteId = (await server.ask('POST', '/api/sites', site('Birkenwerk'))).body.id;
      await server.upload(siteId, meterFile(14));
      const asked = { author: 'R. Aldane', language: 'de' };
      expect((await server.ask('POST', `/api/sites/${siteId}/plans?wait=60`, asked)).status).toBe(201);
      expect(textOf((await server.ask('GET', at(1, '/proposal.pdf'))).body)).toContain('Entwurf, nicht geprüft');
      // the same in English is a draft of its own, in whose way and out of whose date it does not stand
      const english = await plan();
      expect([english.status, english.body.revision]).toEqual([201, 2]);
      expect(textOf((await server.ask('GET', at(2, '/proposal.pdf'))).body)).toContain('draft, not reviewed');
      const german = await server.ask('POST', `/api/sites/${siteId}/plans?wait=60`, asked);
      expect([german.status, german.body.revision, german.body.contentHash]).toEqual([
        200,
        1,
        english.body.contentHash,
      ]);
      expect((await review(1)).stale).toBeNull();
      const again = await server.ask('POST', at(1, '/again'), { keep: true });
      expect([again.status, again.body.revision]).toEqual([200, 1]);
      await settle(1);
      const { findings } = await review(1);
      expect((await act(1, 'approve', SIGNED)).status).toBe(200);
      const paper = await paperOf(1);
      const text = textOf(paper).replace(/\s+/g, ' ');
      for (const said of [
        'freigegeben',
        'In der Funktion Prüfung und Freigabe',
        'Ich stehe für die Prüfung ein.',
        'von Hand',
      ]) {
        expect(text).toContain(said);
      }
      expect(text.match(/Angenommen von/g)).toHaveLength(findings.length);
      for (const { what } of findings) expect(text).not.toContain(what);
      expect(await verify(paper)).toMatchObject({ standing: 'approved' });
      const changed = Buffer.from(paper);
      changed[changed.length >> 1]! ^= 1;
      expect(await verify(changed)).toMatchObject({
        standing: 'altered',
        text: expect.stringMatching(/P-\d+, revision 1/),
      });
      const unknown = await server.ask('POST', `/api/sites/${siteId}/plans`, { language: 'fr' });
      expect([unknown.status, unknown.body.problems[0].path]).toEqual([422, 'language']);
    });
  });
}
