import { spawn } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { setTimeout as sleep } from 'node:timers/promises';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { buildProgram, meterCsv, PROGRAM, site, Workplace } from './cli-program.js';

const work = new Workplace();
beforeAll(buildProgram, 120_000);
afterAll(() => work.remove());

/** Some days of the invented record, counted from 0; `change` as in `meterCsv`. */
function days(from: number, to: number, change: (cells: string[], row: number) => string[] = (cells) => cells): string {
  const rows = (row: number) => row === 0 || (row > from * 96 && row <= to * 96);
  return work.file(
    meterCsv(to, (cells, row) => (rows(row) ? change(cells, row) : null)),
    'csv',
  );
}

/** Row 800 is 13 January 07:45; an hour from there reads 500 kW. */
const corrected = (cells: string[], row: number) => (row >= 800 && row < 804 ? cells.with(1, '500.0') : cells);

describe('a meter file with further ones', () => {
  it('is one record, the same as from one file', () => {
    const args = ['--extend', days(6, 12), '--extend', days(12, 14), '--json', '--intervals'];
    const { code, stdout, stderr } = work.run(['read', days(0, 7), ...args]);
    expect([code, stderr]).toEqual([0, '']);
    const whole = JSON.parse(work.run(['read', days(0, 14), '--json', '--intervals']).stdout);
    const extended = JSON.parse(stdout);
    expect(extended.columns).toEqual(whole.columns);
    expect(extended.record).toMatchObject({ intervals: 1344, missing: 0, duplicates: 96 });
  });

  it('that disagree is a question with both answers, and each answer gives what it said', () => {
    const files = [days(0, 14), '--extend', days(7, 21, corrected)];
    const asked = work.run(['read', ...files, '--json']);
    expect(asked.code).toBe(3);
    const [question] = JSON.parse(asked.stdout).error.questions;
    expect(question.overlap).toMatchObject({ added: 672, agreed: 668, disagreed: 4, spanCount: 1 });
    expect(asked.stderr).toContain(`${files[2]}: whether the record or the further file counts in 4 intervals`);
    expect(asked.stderr).toContain('{"overlap":"later"}   would give');
    expect(asked.stderr).toContain(`; begins ${question.readings[1].firstRows[0][0]}: `);
    for (const { map, maxKw, activeKwh } of question.readings) {
      const settled = work.run(['read', ...files, '--json', '--map', work.file(map)]);
      expect(JSON.parse(settled.stdout).record).toMatchObject({ maxKw, activeKwh, intervals: 2016 });
    }
    expect(question.readings[1].maxKw).toBe(500);
  });

  it('settles each by its own answer where the map holds a list, and asks about one beyond its end', () => {
    const changed = (from: number, kw: string) => (cells: string[], row: number) =>
      row >= from && row < from + 4 ? cells.with(1, kw) : cells;
    const first = days(7, 14, changed(800, '500.0'));
    const second = days(7, 14, changed(900, '600.0'));
    const files = ['read', days(0, 14), '--extend', first, '--extend', second, '--json'];
    const settled = (overlap: string[]) => work.run([...files, '--map', work.file({ overlap })]);
    const maxKw = (overlap: string[]) => JSON.parse(settled(overlap).stdout).record.maxKw;
    expect(maxKw(['later', 'earlier'])).toBe(500);
    expect(maxKw(['earlier', 'later'])).toBe(600);
    const half = settled(['later']);
    expect(half.code).toBe(3);
    expect(half.stderr).toContain(`${second}: whether the record or the further file counts in 8 intervals`);
    const refused = settled(['later', 'earlier', 'first']);
    expect([refused.code, JSON.parse(refused.stdout).error.problems]).toMatchObject([
      3,
      [
        { path: 'overlap.2', found: '"first"' },
        { path: 'overlap', found: '3' },
      ],
    ]);
  });

  it('says so where one adds nothing', () => {
    const further = days(2, 4);
    const { code, stderr } = work.run(['read', days(0, 7), '--extend', further, '--json']);
    expect([code, stderr]).toEqual([0, `${further} adds nothing to the record\n`]);
  });

  it('is what a bank is judged on', () => {
    const args = ['assess', work.file(site()), '--load', days(0, 14), '--extend', days(14, 21), '--json'];
    const { code, stdout } = work.run(args);
    expect(code).toBe(0);
    expect(JSON.parse(stdout).record.intervals).toBe(2016);
  });

  it('of another interval is refused by the name of the file', () => {
    const hourly = work.file(
      meterCsv(14, (cells, row) => (row === 0 || row % 4 === 1 ? cells : null)),
      'csv',
    );
    const { code, stdout, stderr } = work.run(['read', days(0, 7), '--extend', hourly, '--json']);
    expect(code).toBe(3);
    expect(JSON.parse(stdout).error).toMatchObject({ code: 'mixed-intervals', path: 'intervalS' });
    expect(stderr).toContain(`${hourly}: intervalS: expected intervals of 900 s`);
  });

  it('and gaps that would be filled beyond the longest record is refused, naming the limit', () => {
    const rows = ['2000-01-01 00:00,1,1', '2000-01-01 00:01,1,1', '2000-01-01 00:02,1,1', '2025-01-01 00:00,1,1'];
    const file = work.file(`time,kW,kvar\n${rows.join('\n')}\n`, 'csv');
    const map = work.file({ dateOrder: 'ymd', repair: 'hold', upToS: 1e12 });
    const { code, stderr } = work.run(['read', file, '--map', map]);
    expect(code).toBe(3);
    expect(stderr).toContain('a record of at most 5300000 intervals');
  });
});

describe('a reading of more than a second', () => {
  it('says on stderr how far it is, and leaves stdout to the answer', async () => {
    const text = readFileSync(days(0, 14), 'utf8');
    const program = spawn(process.execPath, [PROGRAM, 'read', '-', '--json'], { stdio: ['pipe', 'pipe', 'pipe'] });
    const said = { stdout: '', stderr: '' };
    program.stdout.on('data', (chunk) => (said.stdout += chunk));
    program.stderr.on('data', (chunk) => (said.stderr += chunk));
    const ended = new Promise((resolve) => program.once('exit', resolve));
    // A row every half second until it has said something: how long a program takes to start is another matter.
    const rows = text.match(/.*\n/g)!;
    while (said.stderr === '' && rows.length > 1200) {
      program.stdin.write(rows.shift());
      await sleep(500);
    }
    program.stdin.end(rows.join(''));
    expect(await ended).toBe(0);
    expect(said.stderr).toMatch(/^(-: \d+\.\d MB read, \d+\.\d MB\/s\n)+$/);
    expect(JSON.parse(said.stdout).record.intervals).toBe(1344);
  });
});
