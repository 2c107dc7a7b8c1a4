import type { Outcome } from '#libs/engine/index.js';
import type { BarFigure } from './bar-figure.js';
import { formatNumber } from './format-number.js';

/** So many switchings a stage and year are counted as much in practice. */
export const PRACTICE_A_YEAR = 5000;
const YEAR_S = 365 * 86_400;

/**
 * How often each stage was switched over the record.
 * @param outcome the plan or judgement
 * @returns one bar a stage
 */
export function stageSwitchings(outcome: Outcome): BarFigure {
  const { operation, record } = outcome.result;
  const practice = (PRACTICE_A_YEAR * (record.endS - record.beginS)) / YEAR_S;
  const most = Math.max(0, ...operation.switchings);
  const whole = (value: number) => formatNumber(value, 'whole');
  return {
    id: 'stageSwitchings',
    finding:
      operation.switchings.length === 0
        ? 'No stage to switch'
        : `${whole(operation.totalSwitchings)} switchings, at most ${whole(most)} a stage`,
    caption: 'Switchings of each stage over the record; averages hide some, so this is the least.',
    sentence: operation.switchings.map((count, at) => `Stage ${at + 1}: ${whole(count)}.`).join(' '),
    bars: operation.switchings.map((count, at) => ({ name: String(at + 1), value: count, text: whole(count) })),
    to: Math.max(most, practice) * 1.05,
    limit: { at: practice, text: `${whole(practice)}, practice`, dotted: true },
    table: {
      columns: ['stage', 'switchings'].map((head) => ({ head, right: true })),
      rows: operation.switchings.map((count, at) => [String(at + 1), whole(count)]),
    },
  };
}
