import fc from 'fast-check';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type TestDatabase, usualDatabases } from '../support/databases.js';
import { startServer, type TestServer } from '../support/test-server.js';
import { meterFile, siteFile } from './site-builder.js';

const SEED = 20_260_131;
const RUNS = process.env.VARWRIGHT_SOAK === '1' ? 2000 : 150;

for (const { name, available, create } of usualDatabases) {
  describe.runIf(available)(`bodies altered at random, on ${name} (seed ${SEED})`, () => {
    let database: TestDatabase;
    let server: TestServer;
    let siteId: string;
    const sites = async () => (await server.ask('GET', '/api/sites')).body.sites.length as number;
    const records = async () => (await server.ask('GET', `/api/sites/${siteId}/records`)).body.records.length as number;

    beforeAll(async () => {
      database = await create();
      server = await startServer(database.url);
      siteId = (await server.ask('POST', '/api/sites', siteFile())).body.id;
    });

    afterAll(async () => {
      await server.close();
      await database.drop();
    });

    /** Characters put in, taken out or changed at a few places. */
    const altered = (text: string) =>
      fc
        .array(fc.tuple(fc.nat(text.length - 1), fc.nat(3), fc.string({ unit: 'binary', maxLength: 3 })), {
          minLength: 1,
          maxLength: 4,
        })
        .map((edits) => edits.reduce((now, [at, drop, put]) => now.slice(0, at) + put + now.slice(at + drop), text));

    it('as sites are taken whole or refused, and never a fault', async () => {
      const body = JSON.stringify(siteFile());
      await fc.assert(
        fc.asyncProperty(altered(body), async (text) => {
          const before = await sites();
          const headers = { 'content-type': 'application/json' };
          const response = await fetch(`${server.base}/api/sites`, { method: 'POST', headers, body: text });
          const answer = (await response.json()) as { status?: number; site?: unknown };
          expect([201, 400, 422]).toContain(response.status);
          expect(await sites()).toBe(before + (response.status === 201 ? 1 : 0));
          if (response.status === 201) expect(JSON.stringify(answer.site)).toBe(JSON.stringify(JSON.parse(text)));
        }),
        { seed: SEED, numRuns: RUNS },
      );
    });

    it('as meter files are taken whole or refused, and never a fault', async () => {
      const file = meterFile(1);
      await fc.assert(
        fc.asyncProperty(altered(file), async (text) => {
          const before = await records();
          const { status } = await server.upload(siteId, text);
          expect([201, 400, 422]).toContain(status);
          expect(await records()).toBe(before + (status === 201 ? 1 : 0));
        }),
        { seed: SEED, numRuns: RUNS },
      );
    });
  });
}
