import type { Outcome } from '#libs/engine/index.js';
import type { BarFigure } from './bar-figure.js';
import { formatNumber, formatQuantity } from './format-number.js';

/** Beyond so many levels only those with the most hours are drawn. */
const MOST_BARS = 18;

/**
 * How long the bank stood at each of its levels.
 * @param outcome the plan or judgement
 * @returns one bar a level, the greatest on top
 */
export function hoursAtLevel(outcome: Outcome): BarFigure {
  const all = outcome.result.operation.hoursAtLevel;
  const kept = new Set([...all].sort((a, b) => b.hours - a.hours).slice(0, MOST_BARS));
  const shown = all.filter((level) => kept.has(level)).reverse();
  const total = all.reduce((sum, { hours }) => sum + hours, 0);
  const out = all[0]?.hours ?? 0;
  const whole = (value: number) => formatNumber(value, 'whole');
  return {
    id: 'hoursAtLevel',
    finding: `Some stage is in for ${formatQuantity(total === 0 ? 0 : 100 * (1 - out / total), '%')} of the record`,
    caption: `Hours at each level in kvar.${shown.length < all.length ? ` The ${shown.length} of ${all.length} levels with the most hours.` : ''}`,
    sentence: shown.map(({ levelKvar, hours }) => `${formatQuantity(levelKvar, 'kvar')}: ${whole(hours)} h.`).join(' '),
    bars: shown.map(({ levelKvar, hours }) => ({ name: formatNumber(levelKvar), value: hours, text: whole(hours) })),
    to: Math.max(1, ...all.map(({ hours }) => hours)) * 1.15,
    limit: null,
    table: {
      columns: ['level kvar', 'hours'].map((head) => ({ head, right: true })),
      rows: [...all].reverse().map(({ levelKvar, hours }) => [formatNumber(levelKvar), whole(hours)]),
    },
  };
}
