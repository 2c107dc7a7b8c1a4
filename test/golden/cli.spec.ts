// The command line as a person or a program meets it: the built program, run on files made here.
import { spawn } from 'node:child_process';
import { existsSync, openSync, readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { buildProgram, meterCsv, PROGRAM, site, Workplace } from './cli-program.js';

beforeAll(buildProgram, 120_000);

let work: Workplace;
beforeEach(() => {
  work = new Workplace();
});
afterEach(() => work.remove());

const transformer = { ratedKva: 630, impedancePct: 4 };
const stage = { count: 4, ratedKvar: 25, ratedV: 440 };
const fault = { max: 250, min: 180 };

const badSites: [what: string, changes: Record<string, unknown>, path: string][] = [
  ['a missing key', { bus: undefined }, 'bus'],
  ['an unknown key', { voltage: 400 }, 'voltage'],
  ['an unknown key in a list', { bank: { stages: [{ ...stage, kvar: 1 }] } }, 'bank.stages[0].kvar'],
  ['a wrong unit', { supply: { faultLevelMva: { max: '250 kW' } }, meteredAt: 'bus' }, 'supply.faultLevelMva.max'],
  ['a negative rating', { bank: { stages: [{ ...stage, ratedKvar: -25 }] } }, 'bank.stages[0].ratedKvar'],
  ['p of 100 %', { bank: { stages: [{ ...stage, reactorPct: 100 }] } }, 'bank.stages[0].reactorPct'],
  [
    'a least fault level above the greatest',
    { supply: { faultLevelMva: { max: 100, min: 180 } } },
    'supply.faultLevelMva.min',
  ],
  ['text where a number belongs', { bus: { nominalV: 'low' } }, 'bus.nominalV'],
  ['metering left open', { meteredAt: undefined }, 'meteredAt'],
  [
    'two transformers without an arrangement',
    { supply: { faultLevelMva: fault, transformers: [transformer, transformer] } },
    'supply.arrangement',
  ],
];

describe('a site with', () => {
  it.each(badSites)('%s is refused by its path, in words and as JSON', (_what, changes, path) => {
    const [siteFile, load] = [work.file(site(changes)), work.file(meterCsv(31), 'csv')];
    const pdf = join(work.dir, 'proposal.pdf');
    const { code, stdout, stderr } = work.run(['plan', siteFile, '--load', load, '--pdf', pdf, '--json']);
    expect(code).toBe(3);
    const { error } = JSON.parse(stdout);
    expect(error.path).toBe(path);
    expect(error.problems[0]).toMatchObject({ path, expected: expect.any(String), found: expect.any(String) });
    expect(stderr).toContain(`${siteFile}: ${path}: expected`);
    // nothing is left of what was asked for
    expect(readdirSync(work.dir).filter((name) => name.includes('proposal'))).toEqual([]);

    const inWords = work.run(['plan', siteFile, '--load', load]);
    expect(inWords.code).toBe(3);
    expect(inWords.stdout).toBe('');
    expect(inWords.stderr).toContain(path);
  });

  it('no bank to judge is refused by assess, at the path of the bank', () => {
    const siteFile = work.file(site({ bank: undefined }));
    const { code, stdout } = work.run(['assess', siteFile, '--load', work.file(meterCsv(31), 'csv'), '--json']);
    expect(code).toBe(3);
    expect(JSON.parse(stdout).error).toMatchObject({ code: 'missing', path: 'bank' });
  });
});

const changed = (at: number, column: number, text: string) =>
  meterCsv(14, (cells, row) => (row === at ? cells.with(column, text) : cells));

const badRecords: [what: string, csv: string, error: Record<string, unknown>][] = [
  ['nothing', '', { code: 'empty-file' }],
  ['no reactive column', meterCsv(14, (cells) => cells.slice(0, 2)), { code: 'no-reactive-column', row: 1 }],
  ['text where a number belongs', changed(100, 1, 'n/a?'), { code: 'bad-number', row: 101, column: 2 }],
  ['no time where one belongs', changed(100, 0, 'soon'), { code: 'bad-time', row: 101, column: 1 }],
  [
    'mixed intervals',
    meterCsv(14, (cells, row) =>
      row > 700 && row % 2 === 0 ? cells.with(0, cells[0]!.replace(/:[13][05]$/, ':07')) : cells,
    ),
    { code: 'mixed-intervals', row: expect.any(Number) },
  ],
  [
    'a repeat with other values',
    meterCsv(14, (cells, row) => (row === 50 ? ['2026-01-05 00:00', '1', '1'] : cells)),
    { row: expect.any(Number) },
  ],
];

describe('a meter file with', () => {
  it.each(badRecords)('%s is refused by row and column', (_what, csv, expected) => {
    const load = work.file(csv, 'csv');
    for (const args of [
      ['read', load, '--json'],
      ['plan', work.file(site()), '--load', load, '--json'],
    ]) {
      const { code, stdout, stderr } = work.run(args);
      expect(code).toBe(3);
      expect(JSON.parse(stdout).error).toMatchObject(expected);
      expect(stderr).toContain(load);
    }
  });

  it('three days is worked with, and the result says how little that is', () => {
    const { code, stdout } = work.run(['assess', work.file(site()), '--load', work.file(meterCsv(3), 'csv'), '--json']);
    expect(code).toBe(0);
    const { reasons, record } = JSON.parse(stdout);
    expect(record.intervals).toBe(288);
    expect(reasons).toContainEqual(expect.objectContaining({ code: 'record.short', values: { days: 3 } }));
  });

  it('dates that can be read in two ways is a question, and either answer settles it', () => {
    const load = work.file(
      meterCsv(1, (cells, row) =>
        row === 0 ? cells : cells.with(0, cells[0]!.replace(/^(\d+)-(\d+)-(\d+)/, '03/04/$1')),
      ),
      'csv',
    );
    const asked = work.run(['read', load, '--json']);
    expect(asked.code).toBe(3);
    const { error } = JSON.parse(asked.stdout);
    expect(error.code).toBe('question');
    const begins = error.questions[0].readings.map(({ map }: { map: unknown }) => {
      const { code, stdout } = work.run(['read', load, '--json', '--map', work.file(map)]);
      expect(code).toBe(0);
      return JSON.parse(stdout).record.beginS;
    });
    expect(begins.sort()).toEqual([Date.UTC(2026, 2, 4) / 1000, Date.UTC(2026, 3, 3) / 1000]);
  });
});

describe('an answer', () => {
  it('of read has the record, on request its intervals, and as CSV can be read again', () => {
    const load = work.file(meterCsv(14), 'csv');
    const plain = JSON.parse(work.run(['read', load, '--json']).stdout);
    expect(Object.keys(plain).sort()).toEqual(['quality', 'record']);
    expect(plain.record).toMatchObject({
      intervals: 1344,
      intervalS: 900,
      beginS: Date.UTC(2026, 0, 5) / 1000,
      missing: 0,
    });
    const { columns } = JSON.parse(work.run(['read', load, '--json', '--intervals']).stdout);
    expect(Object.keys(columns)).toEqual(['beginS', 'activeKw', 'laggingKvar', 'leadingKvar']);
    expect(columns.activeKw).toHaveLength(1344);
    const again = work.run(['read', '-', '--json'], work.run(['read', load, '--csv']).stdout);
    expect(again.code).toBe(0);
    const { notes: _notes, ...numbers } = plain.record;
    expect(JSON.parse(again.stdout).record).toMatchObject(numbers);
  });

  it('of plan proposes a bank within limits, and is written as a proposal', () => {
    const pdf = join(work.dir, 'proposal.pdf');
    const load = work.file(meterCsv(31), 'csv');
    const { code, stdout, stderr } = work.run(['plan', work.file(site()), '--load', load, '--pdf', pdf, '--json']);
    expect(code).toBe(0);
    expect(JSON.parse(stdout)).toMatchObject({ verdict: 'clear', requirement: { targetPowerFactor: 0.95 } });
    expect(readFileSync(pdf).subarray(0, 5).toString()).toBe('%PDF-');
    expect(stderr).toContain(pdf);
  });

  it('of assess without --json is for a person: verdict, figures, cautions', () => {
    const { code, stdout, stderr } = work.run(['assess', work.file(site()), '--load', work.file(meterCsv(31), 'csv')]);
    expect(code).toBe(0);
    expect(stdout).toMatch(/Invented Mill[\s\S]*within limits/);
    expect(stdout).toContain('not permission to energise');
    // nothing but how far it is, which a slow machine says too
    expect(stderr.replace(/^\S+: \d+ % done, .* left\n/gm, '')).toBe('');
  });

  it('of scan has nominal and every corner at the level asked for', () => {
    const args = ['scan', '-', '--level', '82.6', '--orders', '1:25:0.5', '--json'];
    const { code, stdout } = work.run(args, JSON.stringify(site()));
    expect(code).toBe(0);
    const { levels } = JSON.parse(stdout);
    // nominal, then fault level × capacitance × inductance × damping, which is 0 throughout without a record
    expect(levels).toHaveLength(1 + 2 * 2 * 2);
    expect(levels[0]).toMatchObject({ bus: 'main', levelKvar: expect.closeTo(4 * 25 * (400 / 440) ** 2, 9) });
    expect(levels[0].orders).toHaveLength(49);
    expect(levels[0].impedanceOhm).toHaveLength(49);
  });

  it('of scan at a level the bank does not have is refused with those it has', () => {
    const { code, stdout } = work.run(['scan', work.file(site()), '--level', '60', '--json']);
    expect(code).toBe(3);
    expect(JSON.parse(stdout).error).toMatchObject({
      code: 'unknown-level',
      problems: [{ expected: expect.stringContaining('61.98') }],
    });
  });

  it('does not depend on the day where the site names one, and names it where the site does not', () => {
    const load = work.file(meterCsv(14), 'csv');
    const [a, b] = [1, 2].map(
      () => work.run(['assess', work.file(site({ asOf: '2026-01-31' })), '--load', load, '--json']).stdout,
    );
    expect(a).toBe(b);
  });
});

describe('the program ends with', () => {
  it('0 and its help on stdout', () => {
    for (const args of [['--help'], ['plan', '--help']]) {
      const { code, stdout, stderr } = work.run(args);
      expect([code, stderr]).toEqual([0, '']);
      expect(stdout).toContain('plan SITE');
    }
  });

  it.skipIf(!existsSync('/dev/full'))('1 where its answer cannot be written', async () => {
    const program = spawn(process.execPath, [PROGRAM, 'read', work.file(meterCsv(3), 'csv'), '--json'], {
      stdio: ['ignore', openSync('/dev/full', 'w'), 'pipe'],
    });
    expect(await exitCode(program)).toBe(1);
  });

  it.each([
    ['no command', []],
    ['an unknown command', ['design', '--json']],
    ['no file', ['plan', '--json']],
    ['an unknown option', ['plan', 'site.json', '--loud', '--json']],
    ['stdin twice', ['plan', '-', '--load', '-', '--json']],
    ['orders that run backwards', ['scan', 'site.json', '--orders', '50:1:1', '--json']],
    ['a format nobody knows', ['read', 'load.csv', '--format', 'abacus', '--json']],
    ['a zone nobody lives in', ['read', 'load.csv', '--time-zone', 'Mars/Olympus', '--json']],
    ['a level in words', ['scan', 'site.json', '--level', 'all', '--json']],
  ])('2 for %s', (_what, args) => {
    const { code, stdout, stderr } = work.run(args);
    expect(code).toBe(2);
    expect(stderr).not.toBe('');
    if (args.includes('--json')) expect(JSON.parse(stdout).error.code).toBe('usage');
  });

  it('2 for neither a record nor an estimate in the site file', () => {
    const { code, stdout } = work.run(['plan', work.file(site()), '--json']);
    expect(code).toBe(2);
    expect(JSON.parse(stdout).error).toMatchObject({ code: 'usage', problems: [{ found: 'none' }] });
  });

  it('2 where the proposal cannot be written, before anything is computed', () => {
    const args = ['plan', work.file(site()), '--load', work.file('', 'csv'), '--pdf', join(work.dir, 'none', 'p.pdf')];
    const { code, stderr } = work.run(args);
    expect(code).toBe(2);
    expect(stderr).toContain('--pdf');
  });

  it('3 for a file that is not there', () => {
    const { code, stderr } = work.run(['scan', 'none.json']);
    expect(code).toBe(3);
    expect(stderr).toContain('none.json');
  });

  it('6 where the verdict is avoid: 400 V capacitors on a bus that reaches 460 V, 1.15 of their rating', () => {
    const overvolted = site({ bus: { nominalV: 400, highestV: 460 }, bank: { stages: [{ ...stage, ratedV: 400 }] } });
    const { code, stdout } = work.run([
      'assess',
      work.file(overvolted),
      '--load',
      work.file(meterCsv(14), 'csv'),
      '--json',
    ]);
    expect(code).toBe(6);
    expect(JSON.parse(stdout).verdict).toBe('avoid');
  });

  it('130 where it is interrupted, with its JSON', async () => {
    const program = spawn(process.execPath, [PROGRAM, 'read', '-', '--json'], { stdio: ['pipe', 'pipe', 'pipe'] });
    const said: Buffer[] = [];
    program.stdout.on('data', (chunk) => said.push(chunk));
    // It says how far it is once a second has gone by: from then on it can certainly be interrupted.
    program.stderr.once('data', () => program.kill('SIGINT'));
    program.stdin.write('time begin,active power (kW)\n');
    let minute = 0;
    const feed = () => program.stdin.write(`${new Date(minute++ * 60_000).toISOString()},1\n`);
    const feeding = setInterval(feed, 20);
    program.on('exit', () => clearInterval(feeding));
    program.stdin.on('error', () => clearInterval(feeding));
    expect(await exitCode(program)).toBe(130);
    expect(JSON.parse(Buffer.concat(said).toString()).error.code).toBe('stopped');
  });

  it('no complaint where its reader has read enough', async () => {
    const load = work.file(meterCsv(100), 'csv');
    const program = spawn(process.execPath, [PROGRAM, 'read', load, '--intervals'], {
      stdio: ['ignore', 'pipe', 'pipe'],
    });
    let stderr = '';
    program.stderr.on('data', (chunk) => {
      stderr += chunk;
    });
    program.stdout.once('data', () => program.stdout.destroy());
    expect(await exitCode(program)).toBe(0);
    expect(stderr).toBe('');
  });
});

function exitCode(program: ReturnType<typeof spawn>): Promise<number | null> {
  return new Promise((resolve) => program.once('exit', (code) => resolve(code)));
}
