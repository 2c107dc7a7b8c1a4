import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { databases, type TestDatabase } from '../support/databases.js';
import { makePeople } from '../support/made-people.js';
import { startServer, type TestServer } from '../support/test-server.js';
import { meterFile, siteFile } from './site-builder.js';

type People = Awaited<ReturnType<typeof makePeople>>;

for (const { name, available, create } of databases) {
  describe.runIf(available)(`a request that names an idempotency key, on ${name}`, () => {
    let database: TestDatabase;
    let server: TestServer;
    let ours: People;
    const sites = async () =>
      (await server.ask('GET', '/api/sites', undefined, ours.planner.headers)).body.sites.length as number;
    const add = (key: string, body: object, who = ours.planner) =>
      server.ask('POST', '/api/sites', body, { ...who.headers, 'idempotency-key': key });

    beforeAll(async () => {
      database = await create();
      ours = await makePeople(database.url, 'north');
      server = await startServer(database.url);
    });

    afterAll(async () => {
      await server.close();
      await database.drop();
    });

    it('is done once, and answered with the first answer when it comes again', async () => {
      const before = await sites();
      const first = await add('a-1', siteFile());
      const second = await add('a-1', siteFile());
      expect([first.status, second.status]).toEqual([201, 201]);
      expect(second.body).toEqual(first.body);
      for (const header of ['location', 'etag', 'content-type']) {
        expect(second.headers.get(header)).toBe(first.headers.get(header));
      }
      expect([first, second].map(({ headers }) => headers.get('idempotent-replayed'))).toEqual([null, 'true']);
      expect(await sites()).toBe(before + 1);
      // Control: without a key it is done as often as it is asked for.
      for (let i = 0; i < 2; i++) await server.ask('POST', '/api/sites', siteFile(), ours.planner.headers);
      expect(await sites()).toBe(before + 3);
    });

    it('is refused with another body, at another address, and while the first is being done', async () => {
      await add('b-1', siteFile());
      const before = await sites();
      const other = await add('b-1', siteFile({ name: 'Another works' }));
      expect([other.status, other.body.path]).toEqual([422, 'Idempotency-Key']);
      const headers = { ...ours.planner.headers, 'idempotency-key': 'b-1' };
      expect((await server.ask('POST', '/api/kept-maps', { name: 'x', map: {} }, headers)).status).toBe(422);
      expect(await sites()).toBe(before);
      const together = await Promise.all(Array.from({ length: 8 }, () => add('b-2', siteFile())));
      expect(together.every(({ status }) => status === 201 || status === 409)).toBe(true);
      expect(new Set(together.flatMap(({ status, body }) => (status === 201 ? [body.id] : []))).size).toBe(1);
      expect(await sites()).toBe(before + 1);
    });

    it('may come again with the same key where it failed, since nothing was changed', async () => {
      expect((await add('c-1', siteFile({ rules: 'none' }))).status).toBe(422);
      expect((await add('c-1', siteFile())).status).toBe(201);
    });

    it('is its maker’s own: the same key of another person is another request', async () => {
      const [first, second] = [await add('d-1', siteFile()), await add('d-1', siteFile(), ours.administrator)];
      expect(second.status).toBe(201);
      expect(second.body.id).not.toBe(first.body.id);
    });

    it('for something that is shown once is done once, and not shown again', async () => {
      const make = () =>
        server.ask('POST', '/api/keys', { name: 'once' }, { ...ours.planner.headers, 'idempotency-key': 'e-1' });
      expect((await make()).status).toBe(201);
      const again = await make();
      expect([again.status, again.body.key]).toEqual([409, undefined]);
      const { keys } = (await server.ask('GET', '/api/keys', undefined, ours.planner.headers)).body;
      expect(keys.filter(({ name: kept }: { name: string }) => kept === 'once')).toHaveLength(1);
    });

    it('with a meter file is known by the file, however it is wrapped', async () => {
      const { id } = (await add('f-0', siteFile())).body;
      const headers = { ...ours.planner.headers, 'idempotency-key': 'f-1' };
      const send = async (content: string) => {
        const form = new FormData();
        form.append('file', new Blob([content]), 'load.csv');
        const response = await fetch(`${server.base}/api/sites/${id}/records`, { method: 'POST', body: form, headers });
        return { status: response.status, body: (await response.json()) as { id: string } };
      };
      const first = await send(meterFile(1));
      const second = await send(meterFile(1));
      expect([first.status, second.status]).toEqual([201, 201]);
      expect(second.body).toEqual(first.body);
      expect((await send(meterFile(2))).status).toBe(422);
      const listed = await server.ask('GET', `/api/sites/${id}/records`, undefined, ours.planner.headers);
      expect(listed.body.records).toHaveLength(1);
    });

    it.each(['', 'two words', 'x'.repeat(201)])('is refused where the key is %j', async (key) => {
      expect((await add(key, siteFile())).status).toBe(400);
    });
  });
}
