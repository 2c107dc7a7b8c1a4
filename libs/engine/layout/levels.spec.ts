import { describe, expect, it } from 'vitest';
import { InputProblem } from '../problem.js';
import type { Bank, StageGroup } from './bank.js';
import { bankLevels, MOST_VECTORS, summarizeBank } from './levels.js';

const group = (count: number, ratedKvar: number, more: Partial<StageGroup> = {}): StageGroup => ({
  count,
  ratedKvar,
  ratedV: 400,
  reactorPct: 0,
  reactorQuality: 30,
  dischargeOhm: null,
  reactorMaxA: null,
  switchPeakA: null,
  fixed: false,
  ...more,
});

const bank = (...groups: StageGroup[]): Bank => ({
  groups,
  interStageUh: 2,
  interStageGiven: true,
  ambientCategory: null,
});
const kvarOf = (of: Bank): number[] => bankLevels(of, 400).map(({ levelKvar }) => Math.round(1e6 * levelKvar) / 1e6);

describe('levels', () => {
  it.each([
    [bank(), [0], 'no bank is one level'],
    [bank(group(3, 25)), [0, 25, 50, 75], 'equal stages'],
    [bank(group(1, 12.5), group(2, 25)), [0, 12.5, 25, 37.5, 50, 62.5], '1:2:2 at the resolution of the smallest'],
    [bank(group(1, 10), group(1, 20), group(1, 40)), [0, 10, 20, 30, 40, 50, 60, 70], '1:2:4'],
    [bank(group(2, 25), group(1, 50)), [0, 25, 50, 75, 100], 'one level by two ways is one level'],
    [
      bank(group(1, 30, { fixed: true }), group(1, 10)),
      [0, 30, 40],
      'what is never switched is in at all but the isolated bank',
    ],
    [bank(group(2, 30, { fixed: true })), [0, 60], 'and whole'],
  ])('%#: %s %s', (of, levels, _why) => {
    expect(kvarOf(of)).toEqual(levels);
  });

  it('list the ways to reach them, fewest stages first', () => {
    const [, , fifty] = bankLevels(bank(group(2, 25), group(1, 50)), 400);
    expect(fifty!.vectors.map((vector) => [...vector])).toEqual([
      [0, 1],
      [2, 0],
    ]);
  });

  it('within a millionth of a kvar are one', () => {
    expect(bankLevels(bank(group(1, 25), group(1, 25.0000005)), 400)).toHaveLength(3);
    expect(bankLevels(bank(group(1, 25), group(1, 25.00001)), 400)).toHaveLength(4);
  });

  it('are refused beyond 4 096 ways, however many kvar', () => {
    const single = (n: number): Bank => bank(...Array.from({ length: n }, (_, k) => group(1, 10 + k)));
    expect(MOST_VECTORS).toBe(4096);
    expect(() => bankLevels(single(12), 400)).not.toThrow();
    expect(() => bankLevels(single(13), 400)).toThrow(InputProblem);
    expect(bankLevels(bank(group(4095, 1)), 400)).toHaveLength(4096);
  });
});

describe('the bank in figures', () => {
  it('has one entry a physical stage, groups expanded in order', () => {
    const of = bank(group(1, 12.5, { ratedV: 480, reactorPct: 7 }), group(2, 25));
    const { stages, effectiveKvar, levelsKvar } = summarizeBank(of, bankLevels(of, 400), 400);
    expect(stages.map(({ ratedKvar }) => ratedKvar)).toEqual([12.5, 25, 25]);
    expect(stages[0]!.capacitorV).toBeCloseTo(400 / 0.93, 9);
    expect(stages[1]!.tunedOrderH).toBeNull();
    expect(effectiveKvar).toBeCloseTo((12.5 * (400 / 480) ** 2) / 0.93 + 50, 9);
    expect(effectiveKvar).toBeCloseTo(levelsKvar[levelsKvar.length - 1]!, 9);
  });
});
