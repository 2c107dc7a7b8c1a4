// Round trip over HTTP: what is exported and imported again has the same hash. Tables are read back by csv-parse.
import { deflateSync } from 'node:zlib';
import { parse } from 'csv-parse/sync';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { canonicalJson } from '#libs/contract/canonical-json.js';
import { readWorkbookRows } from '#libs/meter-files/xlsx/read-workbook-rows.js';
import { dataSourceFor, readAddress } from '#libs/store/data-source.js';
import { databases, type TestDatabase } from '../support/databases.js';
import { pngFile } from '../support/made-picture.js';
import { type Answer, startServer, type TestServer } from '../support/test-server.js';
import { meterFile, siteFile } from './site-builder.js';

const { create } = databases[0]!;
const FORMS = ['json', 'csv', 'xlsx'];
const NAME = '=HYPERLINK("http://x","y") & Söhne';

describe('exports over HTTP', () => {
  let database: TestDatabase;
  let server: TestServer;
  let id: string;
  let recordId: string;
  let recordHash: string;
  let contentHash: string;

  beforeAll(async () => {
    database = await create();
    server = await startServer(database.url);
    id = (await server.ask('POST', '/api/sites', siteFile({ name: NAME }))).body.id;
    await server.upload(id, meterFile(9));
    const plan = (await judged(id)).body;
    ({ recordId, recordHash, contentHash } = plan);
  }, 180_000);

  afterAll(async () => {
    await server.close();
    await database.drop();
  });

  /** The revision of a judgement, however long it takes. */
  const judged = async (siteId: string, body: object = {}): Promise<Answer> => {
    const answer = await server.ask('POST', `/api/sites/${siteId}/assessments?wait=60`, body);
    return answer.status === 202 ? judged(siteId, body) : answer;
  };
  const file = async (path: string) => {
    const response = await fetch(`${server.base}/api/sites/${id}${path}`);
    return { status: response.status, bytes: Buffer.from(await response.arrayBuffer()), headers: response.headers };
  };
  const imported = (path: string, body: Buffer, type: string) =>
    fetch(server.base + path, { method: 'POST', headers: { 'content-type': type }, body: new Uint8Array(body) });

  it.each(FORMS)('give a site as %s that is taken back as the same site', async (form) => {
    const { status, bytes, headers } = await file(`/export?form=${form}`);
    expect(status).toBe(200);
    expect(headers.get('content-disposition')).toBe(`attachment; filename="site.${form}"`);
    const path = form === 'json' ? '/api/sites' : '/api/site-imports';
    const type = { json: 'application/json', csv: 'text/csv', xlsx: headers.get('content-type')! }[form]!;
    const answer = await imported(path, bytes, type);
    expect(answer.status).toBe(201);
    const { site } = (await answer.json()) as { site: unknown };
    expect(canonicalJson(site)).toBe(canonicalJson(siteFile({ name: NAME })));
  });

  it.each(FORMS)('give a record as %s that is uploaded again with the same hash, and plans the same', async (form) => {
    const { bytes } = await file(`/records/${recordId}/export?form=${form}`);
    const other = (await server.ask('POST', '/api/sites', siteFile({ name: NAME }))).body.id;
    const uploaded = await server.upload(other, bytes);
    expect(uploaded.status).toBe(201);
    const again = (await judged(other)).body;
    expect([again.recordHash, again.contentHash]).toEqual([recordHash, contentHash]);
  });

  it('give plan and calculation sheet with the result’s own numbers', async () => {
    const { result } = (await server.ask('GET', `/api/sites/${id}/revisions/1`)).body;
    expect(JSON.parse((await file('/revisions/1/plan')).bytes.toString())).toEqual(result);
    const rows = parse((await file('/revisions/1/plan?form=csv')).bytes, { columns: true }) as Record<string, string>[];
    const value = (path: string) => Number(rows.find((row) => row.path === path)!.value);
    expect(value('requirement.p99Kvar')).toBe(result.requirement.p99Kvar);
    expect(value('duties[0].value')).toBe(result.duties[0].value);
    const sheet = parse((await file('/revisions/1/calculation?form=csv')).bytes, { columns: true }) as {
      id: string;
      value: string;
    }[];
    expect(sheet.map((row) => [row.id, Number(row.value)])).toEqual(
      result.figures.map((figure: { id: string; value: number }) => [figure.id, figure.value]),
    );
    const { bytes } = await file('/revisions/1/calculation?form=xlsx');
    const cells = await readWorkbookRows(once(bytes));
    expect(cells[0]!.slice(0, 3)).toEqual(['id', 'label', 'value']);
    expect(cells.slice(1).map(([, , cell]) => Number(cell))).toEqual(
      result.figures.map((figure: { value: number }) => figure.value),
    );
  });

  it('give the figures as drawings of the revision, the same at every time of asking', async () => {
    const { status, body } = await server.ask('GET', `/api/sites/${id}/revisions/1/figures`);
    expect(status).toBe(200);
    const figures = body.figures as { name: string; svg: string }[];
    expect(figures.map(({ name }) => name)).toEqual(
      expect.arrayContaining(['single-line', 'duration-curve', 'impedance']),
    );
    for (const { svg } of figures)
      expect([svg.startsWith('<svg '), svg.includes('<title'), svg.trim().endsWith('</svg>')]).toEqual([
        true,
        true,
        true,
      ]);
    expect(figures[0]!.svg).toContain('&amp; Söhne');
    expect((await server.ask('GET', `/api/sites/${id}/revisions/1/figures`)).body).toEqual(body);
  });

  it('draw no figures of a result that this engine would not give', async () => {
    const { id: other } = (await server.ask('POST', '/api/sites', siteFile({ name: 'Another engine’s works' }))).body;
    await server.upload(other, meterFile(9));
    await judged(other);
    const raw = await dataSourceFor(readAddress(database.url)).initialize();
    await raw.query(
      `UPDATE revision SET result = REPLACE(result, '"control":{', '"control":{"old":1,') WHERE "siteId" = ?`,
      [other],
    );
    await raw.destroy();
    const { status, body } = await server.ask('GET', `/api/sites/${other}/revisions/1/figures`);
    expect([status, body.code]).toEqual([409, 'conflict']);
    expect(body.detail).toContain('compute the revision again');
  });

  it('let no spreadsheet run a name', async () => {
    const text = (await file('/export?form=csv')).bytes.toString();
    expect(text).toContain(`"'=HYPERLINK(`);
    expect(text).not.toMatch(/(^|,)"?=/m);
  });

  it('print the proposal on the sheet and with the logo that were asked for, and refuse a bomb', async () => {
    const size = { width: 4, height: 2, bits: 8, colour: 2, samples: Array.from({ length: 24 }, (_, n) => n) };
    const logo = pngFile(size).toString('base64');
    const asked = { paper: 'Letter', logo, reason: 'on letter paper' };
    const { id: other } = (await server.ask('POST', '/api/sites', siteFile({ name: 'Letter works' }))).body;
    await server.upload(other, meterFile(9));
    const ask = (body: object) => judged(other, body);
    const bomb = pngFile({ ...size, data: deflateSync(Buffer.alloc(20_000_000)) }).toString('base64');
    expect((await ask({ ...asked, logo: bomb })).body).toMatchObject({ code: 'too-large', path: 'logo' });
    expect((await ask(asked)).status).toBeLessThan(202);
    const { body } = await server.ask('GET', `/api/sites/${other}/revisions/1/proposal.pdf`);
    const text = (body as Buffer).toString('latin1');
    expect(text).toContain('/MediaBox [0 0 612 792]');
    expect(text).toContain('/Subtype /Image');
  });

  it.each([
    ['/export?form=pdf', 422],
    ['/export?kind=csv', 422],
    ['/revisions/9/plan?form=csv', 404],
    ['/records/00000000-0000-0000-0000-000000000000/export', 404],
  ])('know no %s', async (path, status) => {
    expect((await file(path)).status).toBe(status);
  });

  it('refuse a site file that is none, naming the row', async () => {
    const answer = await imported('/api/site-imports', Buffer.from('path,kind,value\nname,number,x\n'), 'text/csv');
    expect(answer.status).toBe(400);
    expect(await answer.json()).toMatchObject({ code: 'unreadable', row: 2, column: 3 });
    const other = await imported('/api/site-imports', Buffer.from('time,kW\n'), 'text/csv');
    expect(await other.json()).toMatchObject({ code: 'unknown-format' });
  });
});

async function* once(bytes: Uint8Array): AsyncGenerator<Uint8Array> {
  yield bytes;
}
