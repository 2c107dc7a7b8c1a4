// Round trip by the program as it is shipped: what it exports it takes back, and computes again to the same.
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { buildProgram, meterCsv, site, Workplace } from './cli-program.js';

const work = new Workplace();
const at = (name: string) => join(work.dir, name);
const FORMS = ['json', 'csv', 'xlsx'];

describe('varwright import', () => {
  let load: string;
  let siteFile: string;

  beforeAll(() => {
    buildProgram();
    load = work.file(meterCsv(20), 'csv');
    // plain stages on a plant with drives: over a limit, so that the judgement says what to keep out
    const loads = { distorting: [{ name: 'drives', fundamentalA: 300, spectrum: 'six-pulse' }], backgroundPct: [] };
    const stages = [{ count: 4, ratedKvar: 25, ratedV: 440 }];
    siteFile = work.file(site({ asOf: '2026-01-31', loads, bank: { installed: true, stages } }));
    for (const form of FORMS) {
      const wanted = ['--export', at(`plan.${form}`), '--calculation', at(`sheet.${form}`)];
      expect(work.run(['assess', siteFile, '--load', load, ...wanted]).code).toBe(6);
    }
  }, 240_000);
  afterAll(() => work.remove());

  it.each(FORMS)('takes a plan back from %s, and writes every form of it letter for letter', (form) => {
    for (const other of FORMS) {
      const { code, stdout } = work.run(['import', at(`plan.${form}`), '--export', at(`again.${other}`)]);
      expect([code, stdout]).toEqual([
        0,
        expect.stringMatching(/assessment, over a limit, as it was exported\ncontent [0-9a-f]{64}/),
      ]);
      expect(readFileSync(at(`again.${other}`)).equals(readFileSync(at(`plan.${other}`)))).toBe(true);
      expect(work.run(['import', at(`sheet.${form}`), '--calculation', at(`again.${other}`)]).code).toBe(0);
      expect(readFileSync(at(`again.${other}`)).equals(readFileSync(at(`sheet.${other}`)))).toBe(true);
    }
  });

  it('computes it again to the same, from the site that was written too', () => {
    const args = ['import', at('plan.xlsx'), '--again', '--load', load, '--site', at('site.csv'), '--json'];
    const { code, stdout } = work.run(args);
    const told = JSON.parse(stdout);
    expect([code, told.again]).toEqual([0, { engineVersion: told.engineVersion, isSame: true, differences: [] }]);
    const { stdout: result } = work.run(['assess', at('site.csv'), '--load', load, '--json']);
    const { frozen, ...exported } = JSON.parse(readFileSync(at('plan.json'), 'utf8'));
    expect(JSON.parse(result)).toEqual(exported);
    expect(frozen.contentHash).toBe(told.contentHash);
    expect(exported.tonight).toBeTruthy();
  });

  it('refuses a plan with one digit changed, and another record (control)', () => {
    const text = readFileSync(at('plan.csv'), 'utf8');
    const altered = work.file(text.replace(/(requirement\.maxKvar,number,)\d/, '$19'), 'csv');
    const refused = work.run(['import', altered, '--json']);
    expect([refused.code, JSON.parse(refused.stdout).error.code]).toEqual([3, 'inconsistent']);
    expect(refused.stderr).toContain('was changed after it was exported');
    const other = work.run(['import', at('plan.csv'), '--again', '--load', work.file(meterCsv(21), 'csv')]);
    expect([other.code, other.stderr]).toEqual([3, expect.stringContaining('the record the plan was made from')]);
  });

  it.each([
    ['a site file', () => [siteFile], 3],
    ['a meter file', () => [load], 3],
    ['no file', () => [at('nowhere.json')], 3],
    ['a sheet for --again', () => [at('sheet.csv'), '--again'], 2],
    ['a sheet for --site', () => [at('sheet.csv'), '--site', at('x.json')], 2],
    ['--again without its record', () => [at('plan.csv'), '--again'], 2],
    ['--load without --again', () => [at('plan.csv'), '--load', load], 2],
  ])('ends as it says with %s', (_, args, code) => {
    expect(work.run(['import', ...args()]).code).toBe(code);
  });
});
