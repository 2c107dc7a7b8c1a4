import type { Ageing } from '#libs/engine/index.js';
import { formatNumber, formatQuantity } from './format-number.js';
import { say, words } from './language.js';
import { verdictWords } from './verdict-words.js';

const FROM = words({
  new: 'end of life of a new one',
  installed: 'installed, not measured',
  measured: 'as measured',
} as const);

/** Heads over the cells of `ageingRows`. */
export const AGEING_HEADS = words([
  'which capacitors',
  'capacitance left',
  'reactor ratio',
  'tuned order',
  'verdict',
  'take a stage out at',
] as const);

/** What has to be known beside the rows. */
export function ageingNote(): string {
  return say`Judged beside the corners, not among them: the reactor stays, so ratio and tuned order move as the capacitance falls.
    A stage comes out where the verdict turns graver with that one stage, one phase of the delta measured; a dash means
    that it stands down to half of the nameplate’s capacitance, or is over a limit already.`;
}

/**
 * What ageing does to the verdict, in a few words.
 * @param ageing of the result, with at least one case
 * @returns without a full stop
 */
export function ageingFinding({ cases }: Ageing): string {
  const isOver = cases.some(({ verdict }) => verdict === 'avoid');
  return isOver ? say`a limit is passed as capacitors age` : say`no case passes a limit`;
}

/**
 * The cases of ageing, one row a case.
 * @param ageing of the result
 * @returns cells under `AGEING_HEADS`
 */
export function ageingRows({ cases, stages }: Ageing): string[][] {
  return cases.map(({ group, capacitanceFactor, from, reactorPct, tunedOrderH, verdict }) => {
    const end = group === null ? null : stages[group]!;
    const which = group === null ? say`all stages alike` : say`one stage of group ${group + 1}`;
    return [
      `${which}, ${FROM[from]}`,
      formatQuantity(100 * capacitanceFactor, '%', 'given'),
      reactorPct === null || reactorPct === 0 ? '–' : formatQuantity(reactorPct, '%'),
      formatQuantity(tunedOrderH, ''),
      verdictWords(verdict),
      end === null || end.comesOutUf === null
        ? '–'
        : `${formatQuantity(end.comesOutUf, 'µF')} (${formatNumber(end.comesOutPct!)} %)`,
    ];
  });
}
