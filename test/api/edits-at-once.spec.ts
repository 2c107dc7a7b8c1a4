import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { databases, type TestDatabase } from '../support/databases.js';
import { runs } from '../support/soak.js';
import { type Answer, startServer, type TestServer } from '../support/test-server.js';
import { siteFile } from './site-builder.js';

const EDITS = runs(100, 2000);
/** Blind clients try again and again: fewer edits show what is lost. */
const BLIND_EDITS = 40;
const CLIENTS = 8;

/** What became of every edit. */
interface Tally {
  done: number;
  refused: Answer[];
}

for (const { name, available, create } of databases) {
  describe.runIf(available)(`${EDITS} edits of one site by ${CLIENTS} clients, on ${name}`, () => {
    let database: TestDatabase;
    let server: TestServer;
    const read = (id: string) => server.ask('GET', `/api/sites/${id}`);
    const put = (id: string, count: number, tag: string) =>
      server.ask('PUT', `/api/sites/${id}`, siteFile({ name: `${count} edits` }), { 'if-match': tag });
    const countOf = ({ body }: Answer) => Number.parseInt(body.site.name, 10);

    beforeAll(async () => {
      database = await create();
      server = await startServer(database.url);
    });

    afterAll(async () => {
      await server.close();
      await database.drop();
    });

    /** Each edit adds 1 to the number in the site's name, so that one that is lost is missing from it. */
    async function editTogether(id: string, isBlind: boolean): Promise<Tally> {
      const tally: Tally = { done: 0, refused: [] };
      let left = isBlind ? BLIND_EDITS : EDITS;
      const work = async () => {
        while (left-- > 0) {
          const seen = await read(id);
          let answer = await put(id, countOf(seen) + 1, seen.headers.get('etag')!);
          while (isBlind && answer.status === 412) {
            answer = await put(id, countOf(seen) + 1, answer.headers.get('etag')!);
          }
          if (answer.status === 200) tally.done += 1;
          else tally.refused.push(answer);
        }
      };
      await Promise.all(Array.from({ length: CLIENTS }, work));
      return tally;
    }

    async function fresh(): Promise<string> {
      return (await server.ask('POST', '/api/sites', siteFile({ name: '0 edits' }))).body.id;
    }

    it('lose none; a stale one is refused with the version it saw and the one that stands', async () => {
      const id = await fresh();
      const { done, refused } = await editTogether(id, false);
      const end = await read(id);
      expect([countOf(end), end.body.version, done + refused.length]).toEqual([done, done + 1, EDITS]);
      expect(refused.length).toBeGreaterThan(0);
      for (const { status, body, headers } of refused) {
        const { seen, current } = body.versions;
        expect([status, body.code, current > seen]).toEqual([412, 'stale', true]);
        expect([headers.get('etag'), body.detail]).toEqual([
          `"${current}"`,
          expect.stringContaining(`version ${seen}`),
        ]);
      }
    });

    it('lose some where clients write over what they did not look at, which shows that the count can tell', async () => {
      const id = await fresh();
      const { done } = await editTogether(id, true);
      expect(done).toBe(BLIND_EDITS);
      expect(countOf(await read(id))).toBeLessThan(done);
    });
  });
}
