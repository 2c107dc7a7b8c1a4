// Right by hand: kvar and stages times their prices, written out.
import { describe, expect, it } from 'vitest';
import type { Bank } from '../layout/bank.js';
import type { CostBasis } from '../money/capital.js';
import { pricedTrials, type ReactorTrial } from './reactor-choice.js';

const GROUP = { count: 4, ratedKvar: 50, ratedV: 440, reactorPct: 0, fixed: false, reactorQuality: 30 };
const BANK = { groups: [GROUP] } as unknown as Bank;
const COST: CostBasis = {
  prices: { perKvar: 10, perStage: 60, reactors: [{ reactorPct: 7, perKvar: 12 }], fixed: 900 },
  cabinets: [],
  switchKind: null,
};

function rows(...ratios: number[]): ReactorTrial[] {
  return ratios.map((reactorPct) => ({ reactorPct, capital: null }) as ReactorTrial);
}

function capitals(cost: CostBasis | null): (number | null)[] {
  return pricedTrials(rows(0, 7, 12.5), BANK, cost).map(({ capital }) => capital);
}

describe('what a bank of another reactor ratio costs', () => {
  it('has its reactors’ price among it, and nothing where the book names none', () => {
    const plain = 200 * 10 + 4 * 60 + 900;
    expect(capitals(COST)).toEqual([plain, plain + 200 * 12, null]);
  });

  it('is not told without prices', () => {
    expect(capitals(null)).toEqual([null, null, null]);
  });
});
