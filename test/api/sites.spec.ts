import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { databases, type TestDatabase } from '../support/databases.js';
import { startServer, type TestServer } from '../support/test-server.js';
import { siteFile } from './site-builder.js';

for (const { name, available, create } of databases) {
  describe.runIf(available)(`sites over HTTP, on ${name}`, () => {
    let database: TestDatabase;
    let server: TestServer;
    const create1 = async (changes = {}) => (await server.ask('POST', '/api/sites', siteFile(changes))).body;

    beforeAll(async () => {
      database = await create();
      server = await startServer(database.url);
    });

    afterAll(async () => {
      await server.close();
      await database.drop();
    });

    it('come back as the file that was given, quantities with their units', async () => {
      const given = siteFile({ bus: { nominalV: '0.4 kV', highestV: 424 } });
      const created = await server.ask('POST', '/api/sites', given);
      expect(created.status).toBe(201);
      expect(created.headers.get('location')).toBe(`/api/sites/${created.body.id}`);
      const got = await server.ask('GET', `/api/sites/${created.body.id}`);
      expect(JSON.stringify(got.body.site)).toBe(JSON.stringify(given));
      expect(got.headers.get('etag')).toBe('"1"');
    });

    it('are numbered as they come, and listed', async () => {
      const [a, b] = [await create1({ name: 'A' }), await create1({ name: 'B' })];
      expect(b.number).toBe(a.number + 1);
      const { sites } = (await server.ask('GET', '/api/sites')).body;
      expect(sites.map((site: { id: string }) => site.id)).toEqual(expect.arrayContaining([a.id, b.id]));
      expect(sites.at(-1)).toMatchObject({ name: 'B', latest: null });
    });

    it('asked for by fifty at once all stand, each under a number of its own; the refused ones do not', async () => {
      const before = (await server.ask('GET', '/api/sites')).body.sites.length;
      const asked = await Promise.all(
        Array.from({ length: 50 }, (_, i) =>
          server.ask('POST', '/api/sites', siteFile(i % 2 === 0 ? { name: `Site ${i}` } : { rules: 'none' })),
        ),
      );
      const taken = asked.filter(({ status }) => status === 201).map(({ body }) => body.id as string);
      expect(asked.map(({ status }) => status).sort()).toEqual([...Array(25).fill(201), ...Array(25).fill(422)]);
      const { sites } = (await server.ask('GET', '/api/sites')).body as { sites: { id: string; number: number }[] };
      expect(sites).toHaveLength(before + 25);
      expect(sites.map(({ id }) => id)).toEqual(expect.arrayContaining(taken));
      expect(new Set(sites.map(({ number }) => number)).size).toBe(sites.length);
    });

    it('are replaced by whoever saw the present version, and by nobody else', async () => {
      const { id } = await create1();
      const put = (tag: string | undefined, to: string) =>
        server.ask('PUT', `/api/sites/${id}`, siteFile({ name: to }), tag === undefined ? {} : { 'if-match': tag });
      expect((await put(undefined, 'unseen')).status).toBe(428);
      expect((await put('W/"1"', 'weak')).status).toBe(400);
      expect((await put('*', 'any')).status).toBe(400);
      const first = await put('"1"', 'first');
      expect([first.status, first.headers.get('etag'), first.body.version]).toEqual([200, '"2"', 2]);
      const second = await put('"1"', 'second');
      expect([second.status, second.body.code]).toEqual([412, 'stale']);
      expect((await server.ask('GET', `/api/sites/${id}`)).body.name).toBe('first');
    });

    it('are replaced once by ten who saw the same version', async () => {
      const { id } = await create1();
      const answers = await Promise.all(
        Array.from({ length: 10 }, (_, i) =>
          server.ask('PUT', `/api/sites/${id}`, siteFile({ name: `writer ${i}` }), { 'if-match': '"1"' }),
        ),
      );
      expect(answers.map(({ status }) => status).sort()).toEqual([200, ...Array(9).fill(412)]);
      const winner = answers.find(({ status }) => status === 200)!;
      expect((await server.ask('GET', `/api/sites/${id}`)).body.name).toBe(winner.body.name);
    });

    it('are removed, with heed to the version where one is said', async () => {
      const { id } = await create1();
      const remove = (headers = {}) => server.ask('DELETE', `/api/sites/${id}`, undefined, headers);
      expect((await remove({ 'if-match': '"7"' })).status).toBe(412);
      expect((await remove({ 'if-match': '"1"' })).status).toBe(204);
      expect((await remove()).status).toBe(404);
      expect((await server.ask('GET', `/api/sites/${id}`)).status).toBe(404);
    });

    const refused: [string, Record<string, unknown>, string, string][] = [
      ['an unknown key', { colour: 'red' }, 'unknown-key', 'colour'],
      ['an unknown key deep inside', { bus: { nominalV: 400, phases: 3 } }, 'unknown-key', 'bus.phases'],
      ['a missing key', { rules: undefined }, 'missing', 'rules'],
      ['a wrong unit', { bus: { nominalV: '400 A' } }, 'wrong-unit', 'bus.nominalV'],
      ['a quantity without a unit', { bus: { nominalV: '400' } }, 'wrong-unit', 'bus.nominalV'],
      [
        'a negative rating',
        { bank: { stages: [{ count: 1, ratedKvar: -50, ratedV: 480 }] } },
        'out-of-range',
        'bank.stages[0].ratedKvar',
      ],
      [
        'a reactor as large as its capacitor',
        { bank: { stages: [{ count: 1, ratedKvar: 50, ratedV: 480, reactorPct: 100 }] } },
        'out-of-range',
        'bank.stages[0].reactorPct',
      ],
      [
        'a least fault level above the most',
        { supply: { faultLevelMva: { max: 100, min: 200 } } },
        'inconsistent',
        'supply.faultLevelMva.min',
      ],
      ['metering left open', { meteredAt: undefined }, 'missing', 'meteredAt'],
      [
        'two transformers without an arrangement',
        {
          supply: {
            faultLevelMva: { max: 250, min: 180 },
            transformers: [
              { ratedKva: 1000, impedancePct: 6 },
              { ratedKva: 1000, impedancePct: 6 },
            ],
          },
        },
        'missing',
        'supply.arrangement',
      ],
      ['text where a number belongs', { frequencyHz: 'fifty' }, 'wrong-type', 'frequencyHz'],
    ];

    it.each(refused)('with %s are refused at its path, and nothing is stored', async (_what, changes, code, path) => {
      const count = async () => (await server.ask('GET', '/api/sites')).body.sites.length;
      const before = await count();
      const { status, headers, body } = await server.ask('POST', '/api/sites', siteFile(changes));
      expect(status).toBe(422);
      expect(headers.get('content-type')).toMatch(/^application\/problem\+json/);
      expect(body.problems).toContainEqual(expect.objectContaining({ code, path }));
      expect(body).toMatchObject({ status: 422, type: 'about:blank' });
      expect(await count()).toBe(before);
    });

    it('are not changed by a replacement that is refused', async () => {
      const { id } = await create1();
      const answer = await server.ask('PUT', `/api/sites/${id}`, siteFile({ colour: 1 }), { 'if-match': '"1"' });
      expect([answer.status, answer.body.code]).toEqual([422, 'unknown-key']);
      expect((await server.ask('GET', `/api/sites/${id}`)).body.version).toBe(1);
    });

    it.each(['none', '00000000-0000-0000-0000-000000000000', '%00', `${'a'.repeat(300)}`, "1' OR '1'='1"])(
      'of the id %s are not found, whatever the database makes of it',
      async (id) => {
        const { status, body } = await server.ask('GET', `/api/sites/${encodeURIComponent(id)}`);
        expect([404, 414]).toContain(status);
        expect(body.status).toBe(status);
      },
    );
  });
}
