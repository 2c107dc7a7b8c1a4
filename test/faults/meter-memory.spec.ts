// A meter file may be far larger than memory should be: a long preamble, rows of many columns of which two are
// wanted. The whole program reads one of 1 GB with two million intervals within 200 MB (in the long run; a twentieth of
// both otherwise), and asks within them where there are several readings to tell of; measured by the operating system as
// the most the process ever held.
import { spawn } from 'node:child_process';
import { createWriteStream, mkdtempSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { fileURLToPath } from 'node:url';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { runs, SOAKED, tellTotals } from '../support/soak.js';

const LIMIT_MB = 200;
const INTERVALS = runs(100_000, 2_000_000);
const PREAMBLE_ROWS = runs(50_000, 1_000_000);
const ROWS_A_CHUNK = 1000;
const COLUMNS_BESIDE = 70;

const program = fileURLToPath(new URL('../../dist/apps/cli/main.js', import.meta.url));
/**
 * Says at the end how much memory the process held at most. Linux counts what this test's own process held among it
 * (getrusage(2): kept over execve), unless its own high-water mark is asked for.
 */
const SAYS = `import { existsSync, readFileSync } from 'node:fs';
process.on('exit', () => {
  const own = existsSync('/proc/self/status') ? /VmHWM:\\s+(\\d+)/.exec(readFileSync('/proc/self/status', 'utf8')) : null;
  process.stderr.write('held ' + ((own === null ? process.resourceUsage().maxRSS : Number(own[1])) * 1024) / 1e6 + ' MB');
});`;
const HOOK = `data:text/javascript,${encodeURIComponent(SAYS)}`;

interface Wanted {
  header: string;
  cells: (row: number) => string;
  delimiter?: string;
  /** point that the file leaves open, and an answer to it */
  asks?: { id: string; answer: object };
}

const WANTED: Record<string, Wanted> = {
  'kW and kvar': {
    header: 'active power (kW),reactive power (kvar)',
    cells: (row: number) => `${row % 997}.125,${row % 331}.5`,
  },
  'energies and voltage': {
    header: 'import kWh,export kWh,lagging kvarh,leading kvarh,voltage V',
    cells: (row: number) => `${row % 97}.125,${row % 7}.5,${row % 31}.25,${row % 5}.5,${400 + (row % 7)}.5`,
  },
  'energies or registers': {
    header: 'import kWh,export kWh,lagging kvarh,leading kvarh,voltage V',
    cells: (row: number) => [1e6 + row * 2.5, 0, 1e6 + row, row >> 10, 400 + (row % 7)].join(','),
    asks: { id: 'energy', answer: { energy: 'register' } },
  },
  'numbers whose only mark may divide thousands': {
    header: 'active power (kW);reactive power (kvar)',
    cells: (row: number) => `${1 + (row % 997)}.${125 + (row % 700)};${1 + (row % 331)}.${500 + (row % 300)}`,
    delimiter: ';',
    asks: { id: 'decimal', answer: { decimal: '.' } },
  },
};

/** Free text, a header, then minutes with many columns nobody asks for. */
function* largeFile({ header, cells: cellsOf, delimiter = ',' }: Wanted): Generator<string> {
  for (let row = 0; row < PREAMBLE_ROWS; row += ROWS_A_CHUNK) {
    yield Array.from({ length: ROWS_A_CHUNK }, (_, i) => `remark ${row + i} on the installation\n`).join('');
  }
  const beside = Array.from({ length: COLUMNS_BESIDE }, (_, k) => `channel ${k}`).join(delimiter);
  yield `time UTC${delimiter}${beside}${delimiter}${header}\n`;
  const cells = Array.from({ length: COLUMNS_BESIDE }, (_, k) => `${100 + k}.${k}`).join(delimiter);
  const firstMs = Date.UTC(2020, 0, 1);
  for (let row = 0; row < INTERVALS; row += ROWS_A_CHUNK) {
    const rows = Array.from({ length: ROWS_A_CHUNK }, (_, i) => {
      const stamp = new Date(firstMs + (row + i) * 60_000).toISOString().slice(0, 19).replace('T', ' ');
      return `${stamp}${delimiter}${cells}${delimiter}${cellsOf(row + i)}\n`;
    });
    yield rows.join('');
  }
}

async function runNode(args: string[]): Promise<{ stdout: string; heldMb: number }> {
  const child = spawn(process.execPath, ['--import', HOOK, ...args]);
  const [stdout, stderr] = await Promise.all([textOf(child.stdout), textOf(child.stderr)]);
  const heldMb = Number(/held ([\d.]+) MB$/.exec(stderr)?.[1]);
  if (Number.isNaN(heldMb)) throw new Error(`the program did not say what it held: ${stderr}`);
  return { stdout, heldMb };
}

async function textOf(stream: Readable): Promise<string> {
  let text = '';
  for await (const chunk of stream) text += chunk;
  return text;
}

describe.each(Object.entries(WANTED))('a file of %s far larger than its record', (name, wanted) => {
  let dir: string;
  let file: string;
  let answered: string[] = [];

  beforeAll(async () => {
    dir = mkdtempSync(join(tmpdir(), 'varwright-large-'));
    file = join(dir, 'large.csv');
    await pipeline(Readable.from(largeFile(wanted)), createWriteStream(file));
    if (wanted.asks === undefined) return;
    const map = join(dir, 'map.json');
    writeFileSync(map, JSON.stringify(wanted.asks.answer));
    answered = ['--map', map];
  });

  afterAll(() => rmSync(dir, { recursive: true, force: true }));

  it(`is read within ${LIMIT_MB} MB, whatever its size`, async () => {
    expect(statSync(file).size).toBeGreaterThan(SOAKED ? 1e9 : 5e7);
    const { stdout, heldMb } = await runNode([program, 'read', file, '--json', ...answered]);
    tellTotals(`${name}, read`, { heldMb });
    // a register's last reading ends the last interval
    expect(JSON.parse(stdout).record.intervals).toBe(INTERVALS - (wanted.asks?.id === 'energy' ? 1 : 0));
    expect(heldMb).toBeLessThan(LIMIT_MB);
  });

  it.runIf(wanted.asks !== undefined)(`is asked about within ${LIMIT_MB} MB`, async () => {
    const { stdout, heldMb } = await runNode([program, 'read', file, '--json']);
    tellTotals(`${name}, asked about`, { heldMb });
    const [question] = JSON.parse(stdout).error.questions;
    expect([question.id, question.readings.length]).toEqual([wanted.asks!.id, 2]);
    expect(heldMb).toBeLessThan(LIMIT_MB);
  });
});

it('what is held would be found out, which shows that the tests above can fail', async () => {
  const holding = `globalThis.held = Buffer.alloc(${LIMIT_MB}e6, 1)`;
  const { heldMb } = await runNode(['-e', holding]);
  expect(heldMb).toBeGreaterThan(LIMIT_MB);
});
