// A bank judged again beside what it was, as a person or a program meets it: the built program, run on files made here.
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { squeezed, textOf } from '../support/pdf-text.js';
import { buildProgram, meterCsv, site, Workplace } from './cli-program.js';

beforeAll(buildProgram, 120_000);

let work: Workplace;
beforeEach(() => {
  work = new Workplace();
});
afterEach(() => work.remove());

const stage = { count: 5, ratedKvar: 25, ratedV: 440 };
const control = { setPointPowerFactor: 0.98 };
const then = () => work.file(site({ control, bank: { stages: [stage], installed: true } }));
const now = (changes: Record<string, unknown> = {}) =>
  work.file(site({ control, bank: { stages: [{ ...stage, count: 2 }], installed: true }, ...changes }));
const load = () => work.file(meterCsv(31), 'csv');

describe('assess --before', () => {
  it('tells what changed in numbers, and what would mend it', () => {
    const { code, stdout } = work.run(['assess', now(), '--load', load(), '--before', then(), '--json']);
    expect(code).toBe(0);
    const { reevaluation, verdict } = JSON.parse(stdout);
    expect(reevaluation.verdict.after).toBe(verdict);
    expect(reevaluation.inputs).toEqual([{ path: 'bank.stages[0].count', before: 5, after: 2 }]);
    const kvar = reevaluation.changes.find(({ id }: { id: string }) => id === 'bank.effectiveKvar');
    expect(kvar.after / kvar.before).toBeCloseTo(2 / 5, 12);
    expect(reevaluation.remedies.map(({ kind }: { kind: string }) => kind)).toContain('restore');
    expect(reevaluation).toMatchObject({ newRecord: false, records: null, tonight: null });
  });

  it('says first what to keep out tonight, on the terminal and on paper', () => {
    const pdf = join(work.dir, 'again.pdf');
    const loads = {
      distorting: [{ name: 'furnace', fundamentalA: 400, spectrum: 'six-pulse-no-choke' }],
      backgroundPct: [],
    };
    const { code, stdout } = work.run(['assess', now({ loads }), '--load', load(), '--before', then(), '--pdf', pdf]);
    expect(code).toBe(6);
    expect(stdout).toMatch(/^Judged again: (from [a-z ]+ to|still) over a limit/);
    expect(stdout).toContain('! Tonight: keep out ');
    expect(stdout.indexOf('Tonight')).toBeLessThan(stdout.indexOf('what would mend it'));
    expect(readFileSync(pdf).subarray(0, 5).toString()).toBe('%PDF-');
  });

  it('says it first where an installed bank is judged by itself', () => {
    const loads = {
      distorting: [{ name: 'furnace', fundamentalA: 400, spectrum: 'six-pulse-no-choke' }],
      backgroundPct: [],
    };
    const pdf = join(work.dir, 'alone.pdf');
    const { code, stdout } = work.run(['assess', now({ loads }), '--load', load(), '--pdf', pdf]);
    expect(code).toBe(6);
    expect(stdout.split('\n')[1]).toMatch(/^! Tonight: keep out /);
    const text = textOf(readFileSync(pdf));
    const { tonight, verdict } = JSON.parse(work.run(['assess', now({ loads }), '--load', load(), '--json']).stdout);
    expect([verdict, tonight.within.out]).toEqual(['avoid', [tonight.within.stagesOut]]);
    for (const sentence of tonight.sentences) {
      expect(squeezed(text)).toContain(squeezed(sentence));
      expect(squeezed(stdout)).toContain(squeezed(sentence));
    }
    const places = ['Tonight: keep out', 'not to stay in service as it stands', 'page 2 of'].map((one) =>
      text.indexOf(one),
    );
    expect(places[0]).toBeGreaterThan(0);
    expect(places).toEqual([...places].sort((a, b) => a - b));
  });

  it('compares two records on like terms, and reports nothing where nothing changed', () => {
    const [one, two] = [load(), work.file(meterCsv(14), 'csv')];
    const again = work.run(['assess', then(), '--load', one, '--before', then(), '--json']);
    expect(JSON.parse(again.stdout).reevaluation).toMatchObject({ inputs: [], changes: [], since: null });
    const other = work.run(['assess', then(), '--load', one, '--before', then(), '--before-load', two, '--json']);
    const { records, newRecord } = JSON.parse(other.stdout).reevaluation;
    expect(newRecord).toBe(true);
    expect(records.records.map(({ days }: { days: number }) => days)).toEqual([14, 31]);
  });

  it.each([
    ['without a meter file', () => ['assess', now(), '--before', then()], 2, '--load METER-FILE beside --before'],
    [
      'with an earlier record alone',
      () => ['assess', now(), '--load', load(), '--before-load', load()],
      2,
      '--before SITE',
    ],
    [
      'with an earlier site without a bank',
      () => ['assess', now(), '--load', load(), '--before', work.file(site({ bank: undefined }))],
      3,
      'the bank that stands there',
    ],
  ])('%s is refused', (_, args, exit, words) => {
    const { code, stderr, stdout } = work.run(args());
    expect(code).toBe(exit);
    expect(stdout).toBe('');
    expect(stderr).toContain(words);
  });
});
