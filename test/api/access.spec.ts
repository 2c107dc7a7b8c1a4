import { Controller, Get, Param } from '@nestjs/common';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Needs } from '#apps/server/people/needs.js';
import type { Role } from '#apps/server/people/actor.js';
import { dataSourceFor, readAddress } from '#libs/store/data-source.js';
import { RevisionLink } from '#libs/store/revision-link.js';
import { Store } from '#libs/store/store.js';
import { StoredSite } from '#libs/store/stored-site.js';
import { accessCells, type Asking, type Cell, faultsOf, type Ids, type World } from '../support/access-cells.js';
import { databases, type TestDatabase } from '../support/databases.js';
import { makePeople } from '../support/made-people.js';
import { type Answer, startServer, type TestServer } from '../support/test-server.js';
import { meterFile, siteFile } from './site-builder.js';

const SITE = '/api/sites/:siteId';
const REVISION = `${SITE}/revisions/:revision`;
const REVIEW = `${REVISION}/review`;
const signature = { name: 'Jo Field', licence: 'none, made up', jurisdiction: 'nowhere' };
const reason = { reason: 'a reason' };
const check = { passed: true };
const csv = { body: 'x', type: 'text/csv' };

const FORM = 'application/x-www-form-urlencoded';

const BODIES: Asking['bodies'] = {
  'POST /people': { body: 'name=x', type: FORM },
  'POST /people/:personId': { body: 'act=change&version=999&name=x', type: FORM },
  'POST /account/password': { body: 'present=x', type: FORM },
  'POST /account/keys': { body: 'name=', type: FORM },
  'POST /account/keys/:keyId/revoke': { body: '', type: FORM },
  [`PUT ${SITE}`]: { body: siteFile() },
  [`POST ${SITE}/records`]: csv,
  [`POST ${SITE}/records/:recordId/revisions`]: csv,
  'POST /api/site-imports': csv,
  'POST /api/plan-imports': csv,
  'POST /api/verify': { body: 'x', type: 'application/pdf' },
  'PUT /api/kept-maps/:keptMapId': { body: { name: 'x', map: {} } },
  // Asked to wait for ever, it is refused once the revision was found, before it computes.
  [`POST ${REVISION}/again`]: { body: { keep: true }, query: '?wait=for-ever' },
  [`POST ${REVIEW}/findings`]: { body: { finding: 'x', ...reason } },
  [`POST ${REVIEW}/hand-checks`]: { body: { figure: 'x', value: 1 } },
  [`POST ${REVIEW}/comments`]: { body: { text: 'x' } },
  [`POST ${REVIEW}/return`]: { body: reason },
  [`POST ${REVIEW}/own-approval`]: { body: reason },
  [`POST ${REVIEW}/approve`]: { body: { ...signature, password: 'north knows it well' } },
  [`POST ${REVIEW}/supersede`]: { body: { by: 2, ...reason } },
  [`POST ${REVIEW}/withdraw`]: { body: reason },
  [`POST ${REVIEW}/commissioning`]: {
    body: {
      ...signature,
      record: {
        ...{ doneOn: '2026-01-31', instrument: 'a meter', isolation: check, insulation: check, torque: check },
        ...{ phaseRotation: check, currentTransformer: { ...check, ratio: '1500/5', phase: 'L1' } },
        ...{ stages: [], distortionBefore: { voltagePct: 1 }, distortionAfter: { voltagePct: 1 }, trips: [] },
        settings: [],
      },
    },
  },
};

/** Nothing is approved in this world. */
const ABSENT = [`${REVISION}/approved.pdf`];

/** One object of every kind, made over the API in the name of an organisation's administrator. */
async function furnish(server: TestServer, headers: Record<string, string>, name: string): Promise<Ids> {
  const ask = async (method: string, path: string, body?: unknown) => {
    const answer = await server.ask(method, path, body, headers);
    if (answer.status >= 300) throw new Error(`${method} ${path}: ${JSON.stringify(answer.body)}`);
    return answer;
  };
  const siteId = (await ask('POST', '/api/sites', siteFile({ name, bank: undefined }))).body.id as string;
  const sent = await fetch(`${server.base}/api/sites/${siteId}/records?name=${encodeURIComponent(name)}.csv`, {
    method: 'POST',
    headers: { ...headers, 'content-type': 'text/csv' },
    body: meterFile(2),
  });
  const { id: recordId } = (await sent.json()) as { id: string };
  const jobId = `${(await ask('POST', `/api/sites/${siteId}/plans`, { reason: `for ${name}` })).body.id}`;
  let status = 202;
  while (status === 202) status = (await ask('POST', `/api/sites/${siteId}/plans?wait=60`, {})).status;
  const keptMapId = (await ask('POST', '/api/kept-maps', { name: `${name} meter`, map: {} })).body.id;
  const tariff = { kind: 'tariff', name: `${name} tariff`, date: '2026-01-01', document: {} };
  const paperId = (await ask('POST', '/api/papers', tariff)).body.id;
  const link = (await ask('POST', `/api/sites/${siteId}/revisions/1/links`, {})).body;
  return { siteId, recordId, revision: '1', other: '1', jobId, keptMapId, paperId, linkId: link.id };
}

describe('who may do what', () => {
  let database: TestDatabase;
  let server: TestServer;
  let world: World;
  const answers: Asking['answers'] = new Map();
  const asking = (): Asking => ({ world, bodies: BODIES, absent: ABSENT, answers });

  beforeAll(async () => {
    database = await databases[0]!.create();
    const ours = await makePeople(database.url, 'north');
    const theirs = await makePeople(database.url, 'south', ['administrator']);
    server = await startServer(database.url);
    const [own, foreign] = await Promise.all([
      furnish(server, ours.administrator.headers, 'Northgate works'),
      furnish(server, theirs.administrator.headers, 'Southgate secret works'),
    ]);
    const beside = await server.ask('POST', '/api/sites', siteFile({ name: 'Northgate depot' }), ours.planner.headers);
    const spare = async (headers: Record<string, string>) =>
      (await server.ask('POST', '/api/keys', { name: 'spare', role: 'viewer' }, headers)).body.id as string;
    const keys = {} as Record<Role, string>;
    for (const role of Object.keys(ours) as Role[]) keys[role] = await spare(ours[role].headers);
    const theirKey = await spare(theirs.administrator.headers);
    world = {
      ours: (role) => ({ ...own, personId: ours.planner.id, keyId: keys[role] }),
      otherSiteId: beside.body.id,
      theirs: { ...foreign, personId: theirs.administrator.id, keyId: theirKey },
      headers: Object.fromEntries(
        Object.entries(ours).map(([role, { headers }]) => [role, headers]),
      ) as World['headers'],
      secrets: [
        ...['Southgate', 'of south', theirs.administrator.id, theirKey],
        ...[foreign.siteId!, foreign.recordId!, foreign.keptMapId!, foreign.paperId!, foreign.linkId!],
      ],
    };
  }, 180_000);

  afterAll(async () => {
    await server.close();
    await database.drop();
  });

  async function walk(from: TestServer, cells: readonly Cell[]): Promise<string[]> {
    const faults: string[] = [];
    const left = [...cells];
    const work = async () => {
      for (let cell = left.shift(); cell !== undefined; cell = left.shift()) {
        faults.push(...(await faultsOf(from, cell, asking())));
      }
    };
    await Promise.all(Array.from({ length: 4 }, work));
    return faults;
  }

  it('is open to nobody known at these routes alone', () => {
    const open = server.routes.filter(({ declared }) => declared?.role === null);
    expect(open.map(({ method, path }) => `${method} ${path}`).sort()).toMatchInlineSnapshot(`
      [
        "ALL /api/*",
        "DELETE /api/session",
        "GET /api/demo/load.csv",
        "GET /api/demo/site.json",
        "GET /api/links/:token",
        "GET /api/links/:token/proposal.pdf",
        "GET /api/openapi.json",
        "GET /healthz",
        "GET /links/:token",
        "GET /page.css",
        "GET /page/*",
        "GET /readyz",
        "GET /sign-in",
        "POST /api/session",
        "POST /sign-in",
        "POST /sign-out",
      ]
    `);
  });

  it('is decided in every cell of role × route × object, and to others an object does not exist', async () => {
    const cells = accessCells(server.routes, world);
    const guarded = server.routes.filter(({ declared }) => declared?.role !== null);
    expect(new Set(cells.map(({ route }) => route)).size).toBe(guarded.length);
    expect(cells.length).toBeGreaterThan(guarded.length * 5);
    expect(await walk(server, cells)).toEqual([]);
  }, 300_000);

  it('shows in no list and no count what another organisation has', async () => {
    const get = async (path: string) => (await server.ask('GET', path, undefined, world.headers.administrator)).body;
    expect((await get('/api/sites')).sites.map(({ number }: { number: number }) => number)).toEqual([1, 2]);
    expect((await get('/api/kept-maps')).keptMaps).toHaveLength(1);
    expect((await get('/api/people')).people).toHaveLength(4);
    expect((await get('/api/keys')).keys).toHaveLength(8);
  });

  it('shows by a link one revision and its paper, until it is revoked', async () => {
    const path = `/api/sites/${world.ours('planner').siteId}/revisions/1/links`;
    const asPlanner = world.headers.planner;
    const { id: linkId, path: linkPath } = (await server.ask('POST', path, { days: 1 }, asPlanner)).body;
    const visit = async (path: string) => {
      const { status, body, headers } = await server.ask('GET', path);
      return { status, text: String(body?.number ?? body), cache: headers.get('cache-control') };
    };
    const paths = [linkPath, `/api${linkPath}`, `/api${linkPath}/proposal.pdf`];
    const shown = await Promise.all(paths.map(visit));
    expect(shown.map(({ status, cache }) => [status, cache])).toEqual(Array(3).fill([200, 'private, no-store']));
    expect(shown.map(({ text }) => text)).toEqual([
      expect.stringContaining('P-0001, revision 1'),
      'P-0001',
      expect.stringMatching(/^%PDF/),
    ]);
    const bearer = { authorization: `Bearer ${linkPath.split('/').at(-1)}` };
    expect((await server.ask('GET', '/api/sites', undefined, bearer)).status).toBe(401);
    const { links } = (await server.ask('GET', path, undefined, asPlanner)).body;
    expect(JSON.stringify(links)).not.toContain(linkPath.split('/').at(-1));
    expect((await server.ask('DELETE', `${path}/${linkId}`, undefined, asPlanner)).status).toBe(204);
    const gone = await server.ask('GET', `/api${linkPath}`);
    const never = await server.ask('GET', `/api/links/${'a'.repeat(43)}`);
    expect([gone.status, gone.body]).toEqual([404, never.body]);
  });

  it('shows nothing by a link that has expired: it answers as one that never was', async () => {
    const path = `/api/sites/${world.ours('planner').siteId}/revisions/1/links`;
    const { id: linkId, path: linkPath } = (await server.ask('POST', path, { days: 1 }, world.headers.planner)).body;
    const answers = (link: string) =>
      Promise.all([link, `/api${link}`, `/api${link}/proposal.pdf`].map((one) => server.ask('GET', one)));
    const shown = ({ status, body }: Answer) => [status, body];
    const never = (await answers(`/links/${'a'.repeat(43)}`)).map(shown);
    expect((await answers(linkPath)).map(({ status }) => status)).toEqual([200, 200, 200]);
    const raw = await dataSourceFor(readAddress(database.url)).initialize();
    // the control: a minute before its end it holds, a minute after it does not
    for (const [from, status] of [
      [1000, 200],
      [-1000, 404],
    ] as const) {
      await raw.manager.update(RevisionLink, { id: linkId }, { expiresAt: new Date(Date.now() + 60 * from) });
      expect((await answers(linkPath)).map((one) => one.status)).toEqual([status, status, status]);
    }
    await raw.destroy();
    expect((await answers(linkPath)).map(shown)).toEqual(never);
  });

  @Controller('api/leaky')
  class LeakyController {
    constructor(private readonly store: Store) {}

    @Get()
    @Needs('viewer', 'Lists every site there is.')
    list() {
      return this.store.read((manager) => manager.find(StoredSite));
    }

    @Get(':siteId')
    @Needs('viewer', 'Gives a site to whoever knows its id.')
    async get(@Param('siteId') id: string) {
      return { is: await this.store.read((manager) => manager.existsBy(StoredSite, { id })) };
    }
  }

  it('would show in the cells, were a route to look past the organisation', async () => {
    const leaky = await startServer(database.url, {}, { controllers: [LeakyController] });
    const faults = await walk(leaky, accessCells(leaky.routes, world));
    expect(faults).toContainEqual(expect.stringMatching(/GET \/api\/leaky as viewer for none: tells Southgate/));
    expect(faults).toContainEqual(expect.stringMatching(/as viewer for other organisation: differs from nothing/));
    expect(faults).toContainEqual(expect.stringMatching(/as viewer for other organisation: 200 where not found/));
    await leaky.close();
  });
});
