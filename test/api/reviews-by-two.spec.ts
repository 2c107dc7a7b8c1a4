import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { databases, type TestDatabase } from '../support/databases.js';
import { type MadePerson, makePeople } from '../support/made-people.js';
import { startServer, type TestServer } from '../support/test-server.js';
import { meterFile, siteFile } from './site-builder.js';

type People = Awaited<ReturnType<typeof makePeople>>;

const SIGNED = { name: 'M. Okafor', licence: 'REC 10442', jurisdiction: 'Ireland' };
const site = siteFile({ tariff: undefined, prices: undefined, catalogue: undefined, finance: undefined });

describe('a revision that one prepares and another approves', () => {
  let database: TestDatabase;
  let server: TestServer;
  let ours: People;
  let theirs: People;
  let path: string;

  const ask = (who: MadePerson, method: string, rest: string, body?: object, headers = {}) =>
    server.ask(method, `${path}${rest}`, body, { ...who.headers, ...headers });
  const review = async () => (await ask(ours.viewer, 'GET', '/review')).body;
  const act = async (who: MadePerson, what: string, body: object) =>
    ask(who, 'POST', `/review/${what}`, body, { 'if-match': `"${(await review()).version}"` });

  beforeAll(async () => {
    database = await databases[0]!.create();
    ours = await makePeople(database.url, 'north');
    theirs = await makePeople(database.url, 'south', ['administrator', 'reviewer']);
    server = await startServer(database.url);
    const { headers } = ours.planner;
    const { id } = (await server.ask('POST', '/api/sites', site, headers)).body;
    const file = { method: 'POST', headers: { ...headers, 'content-type': 'text/csv' }, body: meterFile(14) };
    expect((await fetch(`${server.base}/api/sites/${id}/records`, file)).status).toBe(201);
    const asked = { author: 'R. Aldane' };
    const made = await server.ask('POST', `/api/sites/${id}/plans?wait=60`, asked, headers);
    expect(made.status).toBe(201);
    path = `/api/sites/${id}/revisions/${made.body.revision}`;
  }, 240_000);

  afterAll(async () => {
    await server.close();
    await database.drop();
  });

  it('is sent for review by who may plan, and looked at by who may look', async () => {
    expect((await act(ours.viewer, 'submit', {})).status).toBe(403);
    expect((await act(ours.planner, 'submit', {})).body).toMatchObject({
      state: 'forReview',
      preparers: [{ id: ours.planner.id, role: 'planner' }],
    });
    expect((await act(ours.viewer, 'comments', { text: 'may I' })).status).toBe(403);
  });

  it('is approved by a reviewer who types the password again, and the record names no leave', async () => {
    const { findings, figures } = await review();
    expect((await act(ours.planner, 'hand-checks', { figure: figures[0].id, value: 1 })).status).toBe(403);
    for (const { id } of findings) {
      expect((await act(ours.reviewer, 'findings', { finding: id, reason: 'seen on site' })).status).toBe(200);
    }
    await act(ours.reviewer, 'hand-checks', { figure: figures[0].id, value: figures[0].value });
    for (const password of [undefined, 'another']) {
      const refused = await act(ours.reviewer, 'approve', { ...SIGNED, password });
      expect([refused.status, refused.body.path]).toEqual([403, 'password']);
    }
    const approved = await act(ours.reviewer, 'approve', { ...SIGNED, password: ours.reviewer.password });
    expect([approved.status, approved.body.approval?.isOwn, approved.body.ownApproval]).toEqual([200, false, null]);
    expect(JSON.stringify(approved.body)).not.toContain(ours.reviewer.password);
  });

  it('does not exist for another organisation, nor does its paper', async () => {
    expect((await ask(theirs.reviewer, 'GET', '/review')).status).toBe(404);
    expect((await ask(theirs.reviewer, 'GET', '/approved.pdf')).status).toBe(404);
    const paper = (await ask(ours.viewer, 'GET', '/approved.pdf')).body as Buffer;
    const verify = async (who: MadePerson) => {
      const headers = { ...who.headers, 'content-type': 'application/pdf' };
      const sent = await fetch(`${server.base}/api/verify`, { method: 'POST', headers, body: new Uint8Array(paper) });
      return ((await sent.json()) as { standing: string }).standing;
    };
    expect([await verify(ours.viewer), await verify(theirs.reviewer)]).toEqual(['approved', 'unknown']);
  });
});
