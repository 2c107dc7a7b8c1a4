// Plans without a meter file, as a person or a program meets them: the built program, run on files made here.
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { buildProgram, meterCsv, site, Workplace } from './cli-program.js';

beforeAll(buildProgram, 120_000);

let work: Workplace;
beforeEach(() => {
  work = new Workplace();
});
afterEach(() => work.remove());

describe('a site with an estimate', () => {
  const bills = ['01', '02', '03'].map((month) => ({
    month: `2025-${month}`,
    activeKwh: 100_000,
    powerFactor: 0.78,
    maxKw: 320,
  }));
  const estimated = (changes: Record<string, unknown> = {}) => work.file(site({ estimate: { bills }, ...changes }));

  it('is planned without a meter file, the paper and the terminal calling it an estimate', () => {
    const pdf = join(work.dir, 'estimate.pdf');
    const { code, stdout, stderr } = work.run(['plan', estimated(), '--pdf', pdf, '--json']);
    expect(code).toBe(0);
    expect(stderr).toContain(`proposal written to ${pdf}`);
    const result = JSON.parse(stdout);
    expect(result).toMatchObject({ record: null, operation: null, verdict: 'watch' });
    expect(result.requirement).toMatchObject({
      p99Kvar: null,
      months: [{ month: '2025-01', neededKvar: null }, {}, {}],
    });
    // By the schoolbook: 100 000 kWh in 744 h and 320 kW, from 0.78 to 0.95.
    const perKw = Math.tan(Math.acos(0.78)) - Math.tan(Math.acos(0.95));
    expect(result.requirement.months[0].energyNeedKvar).toBeCloseTo((100_000 / 744) * perKw, 6);
    expect(result.requirement.upperKvar).toBeCloseTo(320 * perKw, 6);
    expect(result.bank.effectiveKvar).toBeGreaterThanOrEqual(320 * perKw);
    expect(readFileSync(pdf).subarray(0, 5).toString()).toBe('%PDF-');
    const told = work.run(['assess', estimated()]);
    expect(told.stdout).toMatch(/^[^\n]+\nESTIMATE, without a meter’s record\n/);
    expect(told.stdout).toContain('Switchings, hours at each level and the wear of the stages are not counted.');
  });

  it('gives way to a meter file, and says so', () => {
    const { stdout } = work.run(['assess', estimated(), '--load', work.file(meterCsv(31), 'csv'), '--json']);
    const { record, assumptions } = JSON.parse(stdout);
    expect(record.intervals).toBeGreaterThan(0);
    expect(assumptions.map((one: { code: string }) => one.code)).toContain('estimate.recordWins');
  });

  it('is a slip of the keyboard where neither stands, or where a reading is described that is not there', () => {
    for (const args of [
      ['plan', work.file(site())],
      ['plan', estimated(), '--time-zone', 'UTC'],
    ]) {
      const { code, stderr } = work.run(args);
      expect(code).toBe(2);
      expect(stderr).toContain('--load METER-FILE');
    }
  });

  it('is refused at the bill that contradicts itself, with the file named', () => {
    const file = estimated({ estimate: { bills: [{ ...bills[0], maxKw: 100 }] } });
    const { code, stdout, stderr } = work.run(['plan', file, '--json']);
    expect(code).toBe(3);
    expect(JSON.parse(stdout).error).toMatchObject({
      code: 'inconsistent',
      path: 'estimate.bills[0].maxKw',
      problems: [{ unit: 'kW' }],
    });
    expect(stderr).toContain(file);
  });
});
