// Round trip over HTTP: what is exported and imported again has the same hash. Tables are read back by csv-parse.
import { deflateSync } from 'node:zlib';
import { parse } from 'csv-parse/sync';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { canonicalJson } from '#libs/contract/canonical-json.js';
import { calculationDocument, planDocument } from '#libs/contract/plan-document.js';
import { readWorkbookRows } from '#libs/meter-files/xlsx/read-workbook-rows.js';
import { sha256 } from '#libs/store/audit-log.js';
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
    const { frozen, ...exported } = JSON.parse((await file('/revisions/1/plan')).bytes.toString());
    expect(exported).toEqual(result);
    expect([frozen.form, frozen.contentHash]).toEqual(['plan 1', contentHash]);
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

  const TYPES: Record<string, string> = {
    json: 'application/json',
    csv: 'text/csv',
    xlsx: 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet',
  };

  it.each(FORMS)(
    'take a plan back as %s: its site, with its record, comes to the same content and numbers',
    async (form) => {
      const { bytes } = await file(`/revisions/1/plan?form=${form}`);
      const answer = await imported('/api/plan-imports', bytes, TYPES[form]!);
      const taken = (await answer.json()) as Taken;
      expect([answer.status, taken.text]).toEqual([201, expect.stringContaining('as it was exported')]);
      expect(taken.plan).toMatchObject({
        kind: 'assess',
        contentHash,
        recordHash,
        resultHash: expect.stringMatching(/^[0-9a-f]{64}$/),
      });
      expect(taken.revisions[0]).toEqual({ siteId: id, number: 'P-0001', revision: 1, hasItsNumbers: true });
      await server.upload(taken.id, (await file(`/records/${recordId}/export`)).bytes);
      const again = (await judged(taken.id)).body;
      expect(again.contentHash).toBe(contentHash);
      const { body } = await server.ask('GET', `/api/sites/${taken.id}/revisions/1/plan`);
      expect(body.frozen).toMatchObject({ contentHash, resultHash: taken.plan.resultHash });
    },
  );

  it.each(FORMS)('say of a plan and a calculation sheet as %s of which revision they are', async (form) => {
    for (const kind of ['plan', 'calculation']) {
      const { bytes } = await file(`/revisions/1/${kind}?form=${form}`);
      const body = await (await imported('/api/verify', bytes, TYPES[form]!)).json();
      expect(body).toMatchObject({
        standing: 'draft',
        paper: { siteId: id, revision: 1 },
        exported: { kind, contentHash },
      });
      expect(body).toMatchObject({
        text: 'The numbers of P-0001, revision 1, which is draft, not reviewed. Not for construction.',
      });
    }
  });

  it('say that a value was changed, and take no such file back (control)', async () => {
    const { bytes } = await file('/revisions/1/plan');
    const [from, to] = ['"verdict":"avoid"', '"verdict":"clear"'];
    const text = bytes.toString();
    const altered = Buffer.from(text.includes(from!) ? text.replaceAll(from!, to!) : text.replaceAll(to!, from!));
    const refused = await imported('/api/plan-imports', altered, 'application/json');
    expect(refused.status).toBe(422);
    expect(await refused.json()).toMatchObject({
      code: 'inconsistent',
      detail: expect.stringContaining('was changed after'),
    });
    const verified = await (await imported('/api/verify', altered, 'application/json')).json();
    expect(verified).toMatchObject({ standing: 'altered', paper: { revision: 1 }, exported: { kind: 'plan' } });
  });

  it('say of a plan with a hash of its own where it is not the revision’s', async () => {
    const { frozen, ...result } = JSON.parse((await file('/revisions/1/plan')).bytes.toString());
    const forged = planDocument({ ...result, conductorMinA: result.conductorMinA + 1 }, frozen.inputs, sha256);
    const body = await (await imported('/api/verify', Buffer.from(JSON.stringify(forged)), 'application/json')).json();
    expect(body).toMatchObject({ standing: 'altered', paper: { revision: 1 } });
    expect((body as { exported: object }).exported).toMatchObject({
      differences: [{ path: 'conductorMinA', before: result.conductorMinA, after: result.conductorMinA + 1 }],
    });
    const sheet = calculationDocument({ figures: [{ ...result.figures[0], value: 1 }] }, contentHash, sha256);
    const other = await (await imported('/api/verify', Buffer.from(JSON.stringify(sheet)), 'application/json')).json();
    expect(other).toMatchObject({ standing: 'altered', exported: { kind: 'calculation' } });
  });

  it('know no plan of other inputs', async () => {
    const { frozen, ...result } = JSON.parse((await file('/revisions/1/plan')).bytes.toString());
    const elsewhere = planDocument(result, { ...frozen.inputs, engineVersion: '9.9.9' }, sha256);
    const body = await (
      await imported('/api/verify', Buffer.from(JSON.stringify(elsewhere)), 'application/json')
    ).json();
    expect(body).toMatchObject({ standing: 'unknown', paper: null, text: expect.stringMatching(/^Unknown: no plan/) });
  });

  it.each([
    ['a calculation sheet', async () => (await file('/revisions/1/calculation')).bytes, 422, 'unknown-format'],
    ['a site file', async () => (await file('/export')).bytes, 422, 'unknown-format'],
    ['a meter file', async () => Buffer.from('time,kW\n'), 422, 'unknown-format'],
    ['a later form', async () => Buffer.from('{"frozen":{"form":"plan 2"}}'), 422, 'not-supported-yet'],
    ['nothing', async () => Buffer.alloc(0), 422, 'empty-file'],
    ['too much', async () => Buffer.alloc(20_000_001, 0x7b), 413, 'too-large'],
  ])('take no plan from %s, in words', async (_, bytes, status, code) => {
    const answer = await imported('/api/plan-imports', await bytes(), 'application/octet-stream');
    expect([answer.status, ((await answer.json()) as { code: string }).code]).toEqual([status, code]);
  });

  it('take a plan back once where it comes twice under one key', async () => {
    const { bytes } = await file('/revisions/1/plan');
    const send = () =>
      fetch(`${server.base}/api/plan-imports`, {
        method: 'POST',
        headers: { 'content-type': 'application/json', 'idempotency-key': 'plan-once' },
        body: new Uint8Array(bytes),
      });
    const [first, second] = [await send(), await send()];
    expect(second.headers.get('idempotent-replayed')).toBe('true');
    expect(((await first.json()) as Taken).id).toBe(((await second.json()) as Taken).id);
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

interface Taken {
  id: string;
  text: string;
  plan: { resultHash: string };
  revisions: object[];
}

async function* once(bytes: Uint8Array): AsyncGenerator<Uint8Array> {
  yield bytes;
}
