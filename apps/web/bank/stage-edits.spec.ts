import { describe, expect, it } from 'vitest';
import { bankFrom, stagesOf, withRatio, withStageAdded, withStageMoved, withStageRemoved } from './stage-edits.js';

const BANK = {
  stages: [
    { count: 1, ratedKvar: 25, ratedV: 480, reactorPct: 7 },
    { count: 2, ratedKvar: 50, ratedV: 480, reactorPct: 7 },
  ],
  interStageUh: 3,
};
const ratings = (bank: typeof BANK) => stagesOf(bank).map(({ ratedKvar }) => ratedKvar);

describe('a bank under the hand', () => {
  it('is its physical stages and back again, so that nothing is lost on the way', () => {
    expect(ratings(BANK)).toEqual([25, 50, 50]);
    expect(bankFrom(BANK, stagesOf(BANK))).toEqual(BANK);
  });

  it('gets one more stage like its last', () => {
    expect(withStageAdded(BANK).stages.at(-1)).toMatchObject({ count: 3, ratedKvar: 50 });
  });

  it('loses the stage that was dragged off, and is no bank without its last', () => {
    expect(withStageRemoved(BANK, 0).stages).toEqual([BANK.stages[1]]);
    expect(withStageRemoved({ stages: [{ count: 1, ratedKvar: 25, ratedV: 480 }] }, 0).stages).toEqual([]);
  });

  it('keeps its stages in the order they were dragged to: equal neighbours are one group again', () => {
    const moved = withStageMoved(BANK, 0, 1) as typeof BANK;
    expect(ratings(moved)).toEqual([50, 25, 50]);
    expect(moved.stages.map(({ count }) => count)).toEqual([1, 1, 1]);
    expect(withStageMoved(moved, 1, 0)).toEqual(BANK);
  });

  it('takes another ratio in every group; a nameplate inductance, which would contradict it, goes', () => {
    const stages = [{ ...BANK.stages[0]!, reactorMh: 1 }];
    expect(withRatio({ stages }, 14, 525).stages).toEqual([{ ...BANK.stages[0], reactorPct: 14, ratedV: 525 }]);
  });
});
