// Meter files that are damaged or made to harm, sent as a planner's browser would: each is refused within a second of work
// with the place and the reason, nothing of it is stored or left in the spool, and the next request works. Beside each
// stands the same file without the harm, which is taken. What each format refuses besides is tested in test/faults.
import { mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { databases, type TestDatabase } from '../support/databases.js';
import { type MadeCell, STYLES, serialOf, workbookParts } from '../support/made-workbook.js';
import { madeZip, type ZipPart } from '../support/made-zip.js';
import { startServer, type TestServer } from '../support/test-server.js';
import { siteFile } from './site-builder.js';

const LONGEST_MS = 1000;
const SHEET = 'xl/worksheets/sheet1.xml';
const clock = (row: number) =>
  `2025-03-01 ${String(row >> 2).padStart(2, '0')}:${String((row & 3) * 15).padStart(2, '0')}`;

/** A day of quarter hours as text; `cells` are those of its third row. */
function text(cells = `${clock(2)},3,1`): string {
  const rows = Array.from({ length: 96 }, (_, row) => (row === 2 ? cells : `${clock(row)},${row + 1},1`));
  return `begin,kW,kvar\n${rows.join('\n')}\n`;
}

/** The same as a workbook; `cell` is the kW of its third row. */
function parts(cell: MadeCell = 3): ZipPart[] {
  const rows = Array.from({ length: 96 }, (_, row) => [clock(row), row === 2 ? cell : row + 1, 1]);
  return workbookParts({ sheets: [{ name: 'Load', rows: [['begin', 'kW', 'kvar'], ...rows] }] });
}

const workbook = (cell?: MadeCell) => madeZip(parts(cell));
const altered = (change: (part: ZipPart) => Partial<ZipPart>, name = SHEET) =>
  madeZip(parts().map((part) => (part.name === name ? { ...part, ...change(part) } : part)));
const entities = Array.from({ length: 40 }, (_, i) => `<!ENTITY e${i + 1} "&e${i};&e${i};">`).join('');
const bomb = `<!DOCTYPE x [<!ENTITY e0 "ha">${entities}]>`;
const feed = readFileSync(new URL('../golden/meter-files/espi-plain.xml', import.meta.url), 'utf8');
const zeros = `<worksheet><sheetData>${' '.repeat(32 << 20)}</sheetData></worksheet>`;

/** The container of an encrypted workbook (MS-OFFCRYPTO 2.3.4) as far as it is looked at. */
function encrypted(): Uint8Array {
  const bytes = Buffer.alloc(4096);
  bytes.set([0xd0, 0xcf, 0x11, 0xe0, 0xa1, 0xb1, 0x1a, 0xe1]);
  bytes.write('EncryptedPackage', 1024, 'utf16le');
  return bytes;
}

type Content = string | Uint8Array;

const BAD: [name: string, harmful: () => Content, sound: () => Content, problem: object][] = [
  [
    'an entity bomb in a feed',
    () => feed.replace('<feed', `${bomb}<feed`),
    () => feed,
    { code: 'unreadable', row: expect.any(Number), column: expect.any(Number) },
  ],
  [
    'an entity bomb in a workbook',
    () => altered(({ content }) => ({ content: String(content).replace('<worksheet', `${bomb}<worksheet`) })),
    workbook,
    { code: 'unreadable', path: SHEET, found: '<!DOCTYPE or <!ENTITY' },
  ],
  [
    'a bomb of zeros',
    () => altered(() => ({ content: zeros })),
    () =>
      altered(({ content }) => ({ content: String(content).replace('<sheetData>', `<sheetData>${' '.repeat(1000)}`) })),
    { code: 'too-large', path: SHEET },
  ],
  [
    'a declared size that lies',
    () => altered(() => ({ content: zeros, statedBytes: 5000 })),
    workbook,
    { code: 'unreadable', path: SHEET, found: 'more than 5000 bytes' },
  ],
  [
    'an archive within the archive',
    () => madeZip([...parts(), { name: 'xl/media/picture.zip', content: workbook() }]),
    () => madeZip([...parts(), { name: 'xl/media/picture.zip', content: 'no archive' }]),
    { code: 'unreadable', path: 'xl/media/picture.zip', found: 'a nested archive' },
  ],
  [
    'an archive of a meter file',
    () => madeZip([{ name: 'load.csv', content: text() }]),
    text,
    { code: 'unknown-format', found: 'a ZIP archive of other files, such as "load.csv"' },
  ],
  ['a password', encrypted, workbook, { code: 'unknown-format', found: 'a workbook with a password' }],
  [
    'a formula without its value',
    () => workbook({ formula: 'A1+1' }),
    () => workbook({ formula: 'A1+1', value: 3 }),
    { row: 4, column: 2 },
  ],
  [
    'a date in a column of values of a workbook',
    () => workbook({ serial: serialOf('2025-03-01 00:00'), style: STYLES.date }),
    () => workbook({ serial: 45_717, style: STYLES.number }),
    { code: 'bad-number', row: 4, column: 2 },
  ],
  [
    'a date in a column of values',
    () => text(`${clock(2)},2025-03-01,1`),
    text,
    { code: 'bad-number', row: 4, column: 2, found: '"2025-03-01"' },
  ],
  ['a row that is too short', () => text(`${clock(2)},3`), text, { code: 'wrong-length', row: 4, column: 3 }],
  ['a row that is too long', () => text(`${clock(2)},3,1,7`), text, { code: 'wrong-length', row: 4, column: 4 }],
];

describe('a meter file over HTTP with', () => {
  const spoolDir = mkdtempSync(join(tmpdir(), 'varwright-bad-'));
  let database: TestDatabase;
  let server: TestServer;
  let siteId: string;
  const kept = async () => (await server.ask('GET', `/api/sites/${siteId}/records`)).body.records.length;

  beforeAll(async () => {
    database = await databases[0]!.create();
    server = await startServer(database.url, { spoolDir });
    siteId = (await server.ask('POST', '/api/sites', siteFile())).body.id;
    await server.upload(siteId, text());
  });

  afterAll(async () => {
    await server.close();
    await database.drop();
    rmSync(spoolDir, { recursive: true });
  });

  /** What sending takes, leaving out the time in which other programs had the processor [ms]. */
  async function timed(content: Content, query: Record<string, string> = {}) {
    const startMs = performance.now();
    const start = process.cpuUsage();
    const answer = await server.upload(siteId, content, query);
    const { user, system } = process.cpuUsage(start);
    return { ...answer, ms: Math.min(performance.now() - startMs, (user + system) / 1000) };
  }

  it.each(BAD)('%s is refused with its place and reason, and leaves nothing', async (_, harmful, sound, problem) => {
    const content = harmful();
    const before = await kept();
    const { status, headers, body, ms } = await timed(content);
    expect([400, 413, 415, 422]).toContain(status);
    expect(headers.get('content-type')).toMatch('application/problem+json');
    expect(body.problems).toEqual([expect.objectContaining(problem)]);
    expect(body).toMatchObject({
      code: body.problems[0].code,
      detail: expect.stringContaining(body.problems[0].found),
    });
    expect(ms).toBeLessThan(LONGEST_MS);
    expect([await kept(), readdirSync(spoolDir)]).toEqual([before, []]);
    const next = await server.upload(siteId, sound());
    expect(next.body.problems ?? [next.status]).toEqual([201]);
    expect(await kept()).toBe(before + 1);
  });

  it.each(BAD)('%s is refused the same where it is read as a job', async (_, harmful, _sound, problem) => {
    const before = await kept();
    const { status, body } = await timed(harmful(), { wait: '60' });
    expect([400, 413, 415, 422]).toContain(status);
    expect(body.problems).toEqual([expect.objectContaining(problem)]);
    expect([await kept(), readdirSync(spoolDir)]).toEqual([before, []]);
  });
});
