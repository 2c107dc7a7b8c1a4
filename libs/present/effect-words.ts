import type { Remark } from '#libs/engine/index.js';
import { formatShare, GAP } from './format-number.js';

/**
 * What an assumption moves, if it is wrong.
 * @param effect of a remark
 * @returns "voltage distortion 62 % to 104 % of its limit, and the verdict changes"
 */
export function effectWords({ figure, low, high, changesVerdict }: NonNullable<Remark['effect']>): string {
  const share = (ratio: number): string => `${formatShare(100 * ratio)}${GAP}%`;
  const [least, most] = [share(low), share(high)];
  const duty = figure.replace(/^duties\./, '');
  const moved =
    duty === ''
      ? 'No row moves'
      : least === most
        ? `${capital(duty)} stays at ${most} of its limit`
        : `${capital(duty)} ${least} to ${most} of its limit`;
  return changesVerdict ? `${moved}, and the verdict changes` : moved;
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
