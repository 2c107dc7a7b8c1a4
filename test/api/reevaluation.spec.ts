import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { databases, type TestDatabase } from '../support/databases.js';
import { squeezed, textOf } from '../support/pdf-text.js';
import { startServer, type TestServer } from '../support/test-server.js';
import { meterFile, siteFile } from './site-builder.js';

const STAGE = { count: 4, ratedKvar: 25, ratedV: 480, reactorPct: 7 };

describe('a bank judged again over HTTP', () => {
  let database: TestDatabase;
  let server: TestServer;

  beforeAll(async () => {
    database = await databases[0]!.create();
    server = await startServer(database.url);
  });

  afterAll(async () => {
    await server.close();
    await database.drop();
  });

  it('stands beside the revision it is held against, and leaves nothing behind', async () => {
    const made = await server.ask('POST', '/api/sites', siteFile({ bank: { stages: [STAGE] } }));
    const site = `/api/sites/${made.body.id}`;
    expect((await server.upload(made.body.id, meterFile())).status).toBe(201);
    expect((await server.ask('POST', `${site}/assessments?wait=60`, {})).status).toBe(201);
    const same = await server.ask('GET', `${site}/revisions/1/reevaluation`);
    expect(same.status).toBe(200);
    expect(same.body.reevaluation).toMatchObject({ inputs: [], changes: [], newRecord: false, since: null });

    const lost = siteFile({ bank: { stages: [{ ...STAGE, count: 2 }] } });
    const seen = { 'if-match': made.headers.get('etag') ?? '' };
    expect((await server.ask('PUT', site, lost, seen)).status).toBe(200);
    const { body } = await server.ask('GET', `${site}/revisions/1/reevaluation`);
    expect(body.revision).toMatchObject({ revision: 1 });
    expect(body.reevaluation.inputs).toEqual([{ path: 'bank.stages[0].count', before: 4, after: 2 }]);
    expect(body.result.verdict).toBe(body.reevaluation.verdict.after);
    const paper = () => server.ask('GET', `${site}/revisions/1/reevaluation/proposal.pdf`);
    const { status, body: pdf } = await paper();
    expect(status).toBe(200);
    const text = textOf(pdf);
    expect(text).toContain('draft, not reviewed');
    expect(text).toContain('Judged again');
    for (const sentence of [...body.tonight, ...body.since]) expect(squeezed(text)).toContain(squeezed(sentence));
    expect(squeezed(text)).toContain(squeezed(`Judged again beside ${body.revision.number}, revision 1.`));
    expect(Buffer.compare((await paper()).body, pdf)).toBe(0);
    const german = await server.ask('GET', `${site}/revisions/1/reevaluation/proposal.pdf?language=de`);
    expect(textOf(german.body).replace(/\s+/g, ' ')).toContain(
      `Neu beurteilt neben ${body.revision.number}, Revision 1.`,
    );
    const other = await server.ask('GET', `${site}/revisions/1/reevaluation/proposal.pdf?language=tlh`);
    expect([other.status, other.body.problems[0].path]).toEqual([422, 'language']);
    expect((await server.ask('GET', `${site}/revisions`)).body.revisions).toHaveLength(1);
  });

  it('says what to do at once in the result of a bank that is over a limit, and nothing of one that is planned', async () => {
    const bank = { stages: [{ ...STAGE, ratedV: 440, reactorPct: 0 }], installed: true };
    const loads = {
      distorting: [{ name: 'furnace', fundamentalA: 400, spectrum: 'six-pulse-no-choke' }],
      backgroundPct: [],
    };
    const results = [];
    for (const installed of [true, false]) {
      const made = await server.ask('POST', '/api/sites', siteFile({ loads, bank: { ...bank, installed } }));
      const site = `/api/sites/${made.body.id}`;
      await server.upload(made.body.id, meterFile());
      expect((await server.ask('POST', `${site}/assessments?wait=60`, {})).status).toBe(201);
      const { result } = (await server.ask('GET', `${site}/revisions/1`)).body;
      expect(result.verdict).toBe('avoid');
      if (installed) {
        const again = (await server.ask('GET', `${site}/revisions/1/reevaluation`)).body;
        expect(again.tonight).toEqual(result.tonight.sentences);
        expect(again.result.tonight).toEqual(result.tonight);
        const text = squeezed(textOf((await server.ask('GET', `${site}/revisions/1/proposal.pdf`)).body));
        for (const sentence of result.tonight.sentences) expect(text).toContain(squeezed(sentence));
      }
      results.push(result.tonight);
    }
    expect(results).toEqual([expect.objectContaining({ until: expect.any(Array) }), null]);
  });

  it('is refused for a site without a bank, and for a revision that is not there', async () => {
    const { id } = (await server.ask('POST', '/api/sites', siteFile({ bank: undefined }))).body;
    await server.upload(id, meterFile());
    expect((await server.ask('POST', `/api/sites/${id}/plans?wait=60`, {})).status).toBe(201);
    const refused = await server.ask('GET', `/api/sites/${id}/revisions/1/reevaluation`);
    expect(refused.status).toBe(422);
    expect(refused.body.problems[0]).toMatchObject({ code: 'missing', path: 'bank' });
    expect((await server.ask('GET', `/api/sites/${id}/revisions/9/reevaluation`)).status).toBe(404);
  });
});
