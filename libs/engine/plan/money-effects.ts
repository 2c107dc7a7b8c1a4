import type { SettledFinance } from '../money/cash-flow.js';
import type { SavingRange } from '../money/money-result.js';
import type { Remark } from '../problem.js';
import { LOAD_MOVES } from './load-moves.js';
import type { MoneyMover, WeighedWays } from './money-mover.js';
import { weighAgain } from './weigh-again.js';
import type { WeighedBank } from './weighed-bank.js';

/** Values that practice meets; common practice, no source. */
const FINANCE_RANGES: Record<string, Partial<SettledFinance>[]> = {
  'default.finance.discountPct': [{ discountPct: 4 }, { discountPct: 12 }],
  'default.finance.horizonYears': [{ horizonYears: 5 }, { horizonYears: 15 }],
  'default.finance.billGrowthPct': [{ billGrowthPct: -2 }, { billGrowthPct: 4 }],
  'default.finance.costGrowthPct': [{ costGrowthPct: 0 }, { costGrowthPct: 4 }],
};
/** How far made-up or outdated prices may be off. */
const PRICE_LINES = ['prices.invented', 'prices.notYetValid', 'prices.outOfDate'];
const PRICE_MOVES = [0.7, 1.3] as const;

/**
 * Puts beside each assumption that money rests on how far it moves the net present value or the saving of the bank the
 * result tells of. The verdict rests on none of them.
 * @param assumptions lines of the plan
 * @param weighed ways and record
 * @param mover weighs them
 * @param saving the bank's saving as a range
 * @returns the same lines in their order, with effects where one can be computed
 * @source method-robustness
 */
export function withMoneyEffects(
  assumptions: readonly Remark[],
  weighed: WeighedWays,
  mover: MoneyMover,
  saving: SavingRange,
): Remark[] {
  const way = weighed.ways.find(({ name }) => name === weighed.chosen);
  if (way === undefined) return [...assumptions];
  const { npv } = mover.present(way);
  return assumptions.map((line) => {
    if (line.code === 'money.idealControl') {
      const savings = saving.cases.map(({ savingPerYear }) => savingPerYear);
      return { ...line, effect: effectOf('money.savingPerYear', savings) };
    }
    const ends = npv === null ? null : endsOf(line.code, weighed, way, mover);
    return npv === null || ends === null ? line : { ...line, effect: effectOf('money.npv', [npv, ...ends]) };
  });
}

function effectOf(figure: string, reached: readonly number[]): NonNullable<Remark['effect']> {
  return { figure, low: Math.min(...reached), high: Math.max(...reached), changesVerdict: false };
}

function endsOf(code: string, { scale }: WeighedWays, way: WeighedBank, mover: MoneyMover): number[] | null {
  const known = (values: (number | null | undefined)[]): number[] =>
    values.filter((value) => typeof value === 'number');
  if (code === 'money.sameLoad') return known(LOAD_MOVES.map((factor) => mover.at(way, 'load', factor)?.npv));
  if (PRICE_LINES.includes(code)) return known(PRICE_MOVES.map((factor) => mover.at(way, 'costs', factor)?.npv));
  const changes = FINANCE_RANGES[code];
  if (changes === undefined) return null;
  const working = mover.working(way);
  return known(changes.map((change) => weighAgain(scale, way, working, { ...scale.money.finance, ...change }).npv));
}
