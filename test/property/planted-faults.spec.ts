// Twenty jobs with one slip each, of the kinds practitioners meet; a slip counts as told only by a refusal, a question or
// a finding above information that names the matter and that the sound job does not have.
import { beforeAll, describe, expect, it } from 'vitest';
import { Question } from '#libs/contract/question.js';
import { readSiteWithMathjs } from '#libs/contract/read-site-with-mathjs.js';
import { zoneTableOf } from '#libs/contract/time-zone.js';
import { assessBank, InputProblem, type LoadRecord } from '#libs/engine/index.js';
import { readMeterFile } from '#libs/meter-files/read-meter-file.js';
import { findings } from '#libs/present/findings.js';
import { DEMO_ROWS, HEADER, PLANTED, type PlantedFault, soundSite } from '../support/planted-faults.js';

const LEAST_NAMED = 16;

async function readRows({ rows, header }: Partial<PlantedFault>, timeZone: string): Promise<LoadRecord> {
  const lines = (rows?.([...DEMO_ROWS]) ?? DEMO_ROWS).map(
    ({ stamp, kw, kvar }) => `${stamp},${kw.toFixed(1)},${kvar.toFixed(1)}`,
  );
  const file = [header ?? HEADER, ...lines];
  async function* chunks(): AsyncGenerator<Uint8Array> {
    for (let at = 0; at < file.length; at += 1000) yield Buffer.from(`${file.slice(at, at + 1000).join('\n')}\n`);
  }
  return (await readMeterFile(chunks(), { siteTimeZone: timeZone })).record;
}

describe('a slip in an otherwise sound job', () => {
  let sound: string[];
  const told = new Map<string, string[]>();
  let soundRecord: LoadRecord;

  /** Codes of the findings above information, or of the refusal with its path. */
  async function saidOf(fault: Partial<PlantedFault>): Promise<string[]> {
    const typed = soundSite();
    fault.site?.(typed);
    try {
      const site = await readSiteWithMathjs(typed);
      const isSound = fault.rows === undefined && fault.header === undefined;
      const record = isSound ? soundRecord : await readRows(fault, site.timeZone);
      const { result } = assessBank(site, record, zoneTableOf(site.timeZone, record));
      return findings({ result }).flatMap(({ level, code }) => (level === 'information' ? [] : [code]));
    } catch (error) {
      if (error instanceof Question) return ['question'];
      if (error instanceof InputProblem) return error.problems.map(({ code, path }) => `${code} ${path}`);
      throw error;
    }
  }

  beforeAll(async () => {
    soundRecord = await readRows({}, soundSite().timeZone);
    sound = await saidOf({});
    for (const fault of PLANTED) told.set(fault.what, await saidOf(fault));
  }, 120_000);

  it.each(PLANTED)('is told and named: $what', ({ what, code }) => {
    expect(told.get(what)).toContain(code);
  });

  it('is told in twenty of twenty, and sixteen are the least', () => {
    const named = PLANTED.filter(({ what, code }) => told.get(what)!.includes(code) && !sound.includes(code));
    expect(PLANTED).toHaveLength(20);
    expect(named.length).toBeGreaterThanOrEqual(LEAST_NAMED);
  });

  it('is not told where the job is sound: the control', () => {
    expect(sound.filter((code) => PLANTED.some((fault) => fault.code === code))).toEqual([]);
    expect(sound.filter((code) => /unusual|unlike|above|below|sign\.|limit\.|outOfDate/i.test(code))).toEqual([]);
  });

  // A larger load and a lower target are as sound as those they replace: what tells them is the bill, and the tariff itself.
  it('stays unseen where nothing else in the job tells it: a ratio without bills, a target without a tariff', async () => {
    const ratio = PLANTED.find(({ code }) => code === 'record.unlikeBills')!;
    const target = PLANTED.find(({ code }) => code === 'target.belowTariff')!;
    const alone = async (fault: Partial<PlantedFault>, key: string): Promise<string[]> =>
      saidOf({
        ...fault,
        site: (site) => {
          fault.site?.(site);
          delete site[key];
        },
      });
    const unsaid = (codes: string[]): string[] =>
      codes.filter((code) => !sound.includes(code) && !code.startsWith('target.missed'));
    expect(unsaid(await alone(ratio, 'estimate'))).toEqual([]);
    expect(unsaid(await alone(target, 'tariff'))).toEqual([]);
  });
});
