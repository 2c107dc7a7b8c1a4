import { describe, expect, it } from 'vitest';
import { visitQuestions } from './visit-questions.js';

describe('the questions for the visit', () => {
  it('are three where next to nothing is known: the old bank, what distorts, how strong the supply is', () => {
    const asked = visitQuestions({ supply: { faultLevelMva: { max: 250 }, transformers: [] } });
    expect(asked.map(({ path }) => path)).toEqual([
      'recordedBank.state',
      'loads.distorting',
      'supply.faultLevelMva.min',
    ]);
  });

  it('make room for the next once one is answered; "none" and an empty list are answers', () => {
    const asked = visitQuestions({ recordedBank: { state: 'none' }, loads: { distorting: [] } });
    expect(asked.map(({ path }) => path)).toEqual([
      'supply.faultLevelMva.min',
      'tariff.clauses',
      'loads.backgroundPct',
    ]);
  });

  it('ask again where the answer was that nobody knows', () => {
    expect(visitQuestions({ recordedBank: { state: 'unknown' } })[0]!.path).toBe('recordedBank.state');
  });
});
