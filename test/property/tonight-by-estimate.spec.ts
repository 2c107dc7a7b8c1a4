// What to keep out of a bank that stands there, where bills alone say what the load is: each answer is judged once more from
// the site file, with those stages gone, and beside the answer that a record gives.
import { describe, expect, it } from 'vitest';
import { estimateZone } from '#libs/contract/estimate-zone.js';
import {
  assessBank,
  assessEstimate,
  type BankInput,
  bankTonight,
  type EstimateInput,
  estimateTonight,
  installedTonight,
  planEstimate,
  type Site,
  type StageMeasurementInput,
  UTC_TABLE,
} from '#libs/engine/index.js';
import { putEstimateInWords } from '#libs/present/put-in-words.js';
import { estimateReport } from '#libs/present/terminal-report.js';
import { tonightSentences, withTonight } from '#libs/present/tonight-words.js';
import { chance } from '../support/chance.js';
import { driftingLoad, madeRecord } from '../support/made-record.js';
import { madeSite } from '../support/made-site.js';
import { runs, SEED } from '../support/soak.js';

const estimate: EstimateInput = {
  bills: [{ month: '2025-03', activeKwh: 90_000, laggingKvarh: 70_000, maxKw: 240 }],
};
const RECORD = madeRecord({ ...driftingLoad(chance(SEED), 28 * 24, 240, 0.8), intervalS: 3600 });
const PLAIN: BankInput = { stages: [{ count: 4, ratedKvar: 50, ratedV: 440 }], installed: true };
const drives = (fundamentalA: number): NonNullable<Site['loads']> => ({
  distorting: [{ name: 'drives', fundamentalA, spectrum: 'six-pulse-choke' }],
  backgroundPct: [{ orderH: 5, pct: 1 }],
});

const siteOf = (parts: Partial<Site>): Site => madeSite({ asOf: '2025-06-30', estimate, ...parts });
const judged = (site: Site) => assessEstimate(site, estimateZone(site));
const tonightFor = (site: Site) => estimateTonight(judged(site), site);

/** The same bank with some stages gone, or none of it left. */
function without(bank: BankInput, out: readonly number[]): BankInput {
  const stages = bank.stages.flatMap((stage, g) =>
    stage.count > out[g]! ? [{ ...stage, count: stage.count - out[g]! }] : [],
  );
  return { ...bank, stages };
}

describe('an installed bank over a limit, judged by an estimate', () => {
  const generated = Array.from({ length: runs(12, 200) }, (_, k) => {
    const random = chance(SEED + k);
    const group = () => ({
      count: random.whole(1, 3),
      ratedKvar: random.oneOf([12.5, 25, 50]),
      ratedV: random.oneOf([415, 440, 480, 525]),
      reactorPct: random.oneOf([0, 0, 5.67, 7, 14]),
    });
    const bank: BankInput = { installed: true, stages: Array.from({ length: random.whole(1, 3) }, group) };
    return siteOf({ bank, loads: drives(random.between(20, 260)) });
  });

  it('has the least stages out that leave nothing over a limit, judged once more without them', () => {
    let over = 0;
    for (const site of generated) {
      const { tonight } = tonightFor(site);
      expect(tonight === null).toBe(judged(site).result.verdict !== 'avoid');
      if (tonight === null) continue;
      over++;
      for (const { out, stagesOut } of [tonight.within, tonight.nearLimits ?? tonight.within]) {
        expect(stagesOut).toBeGreaterThan(0);
        const left = without(site.bank!, out);
        if (left.stages.length === 0) continue;
        expect(judged({ ...site, bank: left }).result.verdict).not.toBe('avoid');
      }
      expect(tonight.until.length).toBeGreaterThan(0);
      // the control: with any one of them in again something is over a limit
      const least = tonight.nearLimits ?? tonight.within;
      least.out.forEach((count, g) => {
        if (count === 0) return;
        const back = without(site.bank!, least.out.with(g, count - 1));
        expect(judged({ ...site, bank: back }).result.verdict).toBe('avoid');
      });
    }
    expect(over).toBeGreaterThan(generated.length / 4);
    expect(over).toBeLessThan(generated.length);
  });

  it('keeps at least as much out as a record of the same plant does: the estimate takes the severe ends', () => {
    for (const site of generated) {
      const { tonight } = tonightFor(site);
      const { estimate: _, ...recorded } = site;
      const byRecord = bankTonight(assessBank(recorded, RECORD, UTC_TABLE), recorded).tonight;
      expect(tonight?.within.outKvar ?? 0).toBeGreaterThanOrEqual((byRecord?.within.outKvar ?? 0) * (1 - 1e-9));
    }
  });

  it('says that it is an estimate, first of all and in every form', () => {
    const site = siteOf({ bank: PLAIN, loads: drives(160) });
    const outcome = judged(site);
    const tonight = installedTonight(outcome, site)!;
    const [first, ...rest] = tonightSentences(tonight);
    expect(first).toMatch(/^Tonight, by an estimate of the load: keep out the whole bank, all four stages: /);
    expect(rest.at(-1)).toMatch(/^No meter’s record stands behind this/);
    const result = withTonight(putEstimateInWords(outcome.result), tonight);
    expect(result.tonight).toMatchObject({ byEstimate: true, sentences: [first, ...rest] });
    const report = estimateReport({ ...outcome, result }, tonight).split('\n');
    expect(report.findIndex((line) => line.startsWith('! Tonight, by an estimate'))).toBe(2);
  });

  it('is judged as it measures, and the worn stage told', () => {
    const measurements: StageMeasurementInput[] = [
      { stage: 2, date: '2025-06-01', terminalUf: [250, 250, 250], connection: 'delta' },
    ];
    const stages = [{ ...PLAIN.stages[0]!, measurements }];
    const { stages: entries } = tonightFor(siteOf({ bank: { ...PLAIN, stages }, loads: drives(160) }));
    expect(entries.map(({ stage, count }) => [stage, count])).toEqual([
      [null, 3],
      [2, 1],
    ]);
  });

  it('is asked nothing where it does not stand there, is planned, or is over no limit', () => {
    const { installed: _, ...planned } = PLAIN;
    const asked = siteOf({ bank: planned, loads: drives(160) });
    expect(installedTonight(judged(asked), asked)).toBeNull();
    expect(installedTonight(planEstimate(asked, estimateZone(asked)), asked)).toBeNull();
    const detuned = siteOf({
      bank: { installed: true, stages: [{ count: 2, ratedKvar: 25, ratedV: 525, reactorPct: 7 }] },
      loads: drives(40),
    });
    expect(judged(detuned).result.verdict).not.toBe('avoid');
    expect(installedTonight(judged(detuned), detuned)!.tonight).toBeNull();
  });
});
