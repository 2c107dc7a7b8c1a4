// What a record must hold before a bank can be recommended on it: eleven days, four fifths of them. Common practice; the
// same site with one more day is the control.
import { describe, expect, it } from 'vitest';
import { assessBank, type Outcome, planBank, type Site, UTC_TABLE } from '#libs/engine/index.js';
import { madeRecord } from '../support/made-record.js';
import { madeSite } from '../support/made-site.js';

const tuned = { count: 2, ratedKvar: 25, ratedV: 525, reactorPct: 7 };
const DAY_S = 86_400;

function assessed(parts: Partial<Site>, intervalS: number): Outcome['result'] {
  const record = madeRecord({ activeKw: [200, 220], reactiveKvar: [120, 130], intervalS });
  return assessBank(madeSite({ bank: { stages: [tuned], interStageUh: 20 }, ...parts }), record, UTC_TABLE).result;
}

const codes = (result: Outcome['result']): string[] => result.reasons.map(({ code }) => code);

describe('what a record supports', () => {
  it('a record under eleven days supports no bank that is clear, and says how long it is', () => {
    const short = assessed({}, 5 * DAY_S);
    expect(short.verdict).toBe('watch');
    expect(short.record).toMatchObject({ grade: 'insufficient', gradeRule: { code: 'grade.days' } });
    const reason = short.reasons.find(({ code }) => code === 'record.insufficient');
    expect(reason!.values).toMatchObject({ days: 10, leastDays: 11 });
    const enough = assessed({}, 5.5 * DAY_S);
    expect(enough.verdict).toBe('clear');
    expect(codes(enough)).not.toContain('record.insufficient');
  });

  it('a record of which more than a fifth is missing supports none either', () => {
    const withGap = (slots: number[]) =>
      assessBank(
        madeSite({ bank: { stages: [tuned], interStageUh: 20 } }),
        madeRecord({
          activeKw: slots.map(() => 200),
          reactiveKvar: slots.map(() => 120),
          slots,
          intervalS: 4 * DAY_S,
        }),
        UTC_TABLE,
      ).result;
    expect(withGap([0, 1, 2, 4]).verdict).toBe('clear');
    expect(withGap([0, 1, 3]).verdict).toBe('watch');
    expect(withGap([0, 1, 3]).reasons).toContainEqual(
      expect.objectContaining({ code: 'record.insufficient', values: expect.objectContaining({ missingPct: 25 }) }),
    );
  });

  it('a peak above the transformers is asked about and changes no verdict', () => {
    const small = assessed(
      { supply: { faultLevelMva: { max: 250 }, transformers: [{ ratedKva: 160, impedancePct: 4 }] } },
      6 * DAY_S,
    );
    expect(small.reasons).toContainEqual(
      expect.objectContaining({ code: 'record.aboveRating', values: expect.objectContaining({ factor: 2 }) }),
    );
    expect(codes(assessed({}, 6 * DAY_S))).not.toContain('record.aboveRating');
  });

  it('a plan designs the same bank on ten days as on eleven, and recommends only the second', () => {
    const planned = (days: number) => {
      const record = madeRecord({ activeKw: [200, 220], reactiveKvar: [160, 170], intervalS: (days / 2) * DAY_S });
      return planBank(madeSite({ loads: { distorting: [], backgroundPct: [] } }), record, UTC_TABLE).result;
    };
    expect(planned(11).verdict).toBe('clear');
    expect(planned(10).verdict).toBe('watch');
    expect(planned(10).bank).toEqual(planned(11).bank);
    expect(codes(planned(10))).toContain('record.insufficient');
    expect(codes(planned(10))).not.toContain('layout.onlyWatch');
  });
});
