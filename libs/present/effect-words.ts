import type { Remark } from '#libs/engine/index.js';
import { engineName } from './engine-name.js';
import { capital } from './first-letter.js';
import { formatFixed, formatQuantity, formatShare, GAP } from './format-number.js';
import { say, words } from './language.js';

type Effect = NonNullable<Remark['effect']>;

/** Amounts of money an assumption may move. */
export const MONEY_FIGURES: Record<string, string> = words({
  'money.npv': 'net present value',
  'money.savingPerYear': 'saving a year',
});

/**
 * What an assumption moves, if it is wrong.
 * @param effect of a remark: a duty as a share of its limit, any other figure as it is
 * @returns "voltage distortion 62 % to 104 % of its limit, and the verdict changes"
 */
export function effectWords(effect: Effect): string {
  const moved = capital(movedWords(effect));
  return effect.changesVerdict ? say`${moved}, and the verdict changes` : moved;
}

function movedWords({ figure, low, high }: Effect): string {
  if (figure === '') return say`no row moves`;
  const row = /^duties\.(.+)$/.exec(figure)?.[1];
  if (row !== undefined) {
    const duty = engineName(row);
    const [least = '', most = ''] = [low, high].map((ratio) => `${formatShare(100 * ratio)}${GAP}%`);
    return least === most ? say`${duty} stays at ${most} of its limit` : say`${duty} ${least} to ${most} of its limit`;
  }
  const money = MONEY_FIGURES[figure];
  const [least = '', most = ''] = [low, high].map((value) =>
    money === undefined ? formatQuantity(value, '') : formatFixed(value, 0),
  );
  const name = money ?? engineName(figure);
  return least === most ? say`${name} stays at ${most}` : say`${name} ${least} to ${most}`;
}
