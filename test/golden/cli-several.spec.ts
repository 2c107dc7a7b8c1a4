// Several sites in one call, how far a plan is, and an interruption while the bank that pays is searched for.
import { spawn } from 'node:child_process';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { minuteFile } from '../support/minute-file.js';
import { buildProgram, meterCsv, PROGRAM, site, Workplace } from './cli-program.js';

const MONEY = {
  currency: 'EUR',
  tariff: { clauses: [{ name: 'reactive', kind: 'kvarhBeyondRatio', freeRatio: 0.33, pricePerUnit: 0.05 }] },
  prices: { invented: true, currency: 'EUR', perKvar: 9, perStage: 55, fixed: 850 },
};
const SMALL = { stageKvar: [25], ratedV: [480], reactorPct: [7], maxStages: 4, setPoints: [0.97] };
/** Some hundred thousand candidates, so that the search takes its time. */
const LARGE = {
  stageKvar: [2.5, 5, 7.5, 10, 12.5, 15, 20, 25],
  ratedV: [480, 525],
  reactorPct: [5.67, 7],
  maxStages: 8,
  setPoints: [0.96, 0.98],
};

describe('plan', () => {
  let work: Workplace;
  beforeAll(() => {
    buildProgram();
    work = new Workplace();
  });
  afterAll(() => work.remove());

  it('of several sites gives one table with their sum, and every result as JSON', () => {
    const files = ['Alder Works', 'Birch Works'].map((name) => work.file(site({ ...MONEY, name, catalogue: SMALL })));
    const loads = [14, 21].map((days) => work.file(meterCsv(days), 'csv'));
    const args = ['plan', files[0]!, '--load', loads[0]!, files[1]!, '--load', loads[1]!];
    const { code, stdout } = work.run(args);
    expect(code).toBe(0);
    const [head, first, second, sum] = stdout.split('\n');
    expect(head).toMatch(/^site .*verdict .*kvar .*capital .*saving a year .*net present value .*payback$/);
    expect([first, second, sum].map((line) => line!.split('  ')[0])).toEqual([
      'Alder Works',
      'Birch Works',
      'together, EUR',
    ]);
    const asJson = work.run([...args, '--json']);
    const { sites } = JSON.parse(asJson.stdout);
    expect(sites.map(({ file, name }: { file: string; name: string }) => [file, name])).toEqual([
      [files[0], 'Alder Works'],
      [files[1], 'Birch Works'],
    ]);
    const alone = work.run(['plan', files[1]!, '--load', loads[1]!, '--json']);
    expect(sites[1].result).toEqual(JSON.parse(alone.stdout));
  });

  it('says how far it is once a second has gone by, and ends at an interruption with its JSON', async () => {
    const file = work.file(site({ ...MONEY, catalogue: LARGE }));
    // nearly a year of minutes: no machine is through within the second
    const load = work.file(minuteFile(520_000), 'csv');
    const program = spawn(process.execPath, [PROGRAM, 'plan', file, '--load', load, '--json']);
    let stdout = '';
    let stderr = '';
    program.stdout.on('data', (chunk) => {
      stdout += chunk;
    });
    program.stderr.on('data', (chunk) => {
      stderr += chunk;
      // what is said of the reading comes before
      if (stderr.includes('% done')) program.kill('SIGINT');
    });
    const code = await new Promise((resolve) => program.once('exit', resolve));
    expect(stderr).toMatch(/^\S+\.json: \d+ % done, [\d.]+ % a second, about \d+ (s|min) left\n/m);
    expect(code).toBe(130);
    expect(JSON.parse(stdout).error.code).toBe('stopped');
  });
});
