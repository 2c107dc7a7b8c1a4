import type { BankOutcome } from '#libs/engine/index.js';
import { formatNumber, formatQuantity } from './format-number.js';
import { verdictWords } from './verdict-words.js';

/**
 * What more stages need, for a terminal.
 * @param outcome plan or judgement
 * @returns one phrase a stage added
 */
export function spareWaysLines({ result, site }: BankOutcome): string[] {
  return result.spareWays.map(({ added, ratedKvar, effectiveKvar, conductorMinA, capital, verdict }) => {
    const stages = `${formatNumber(added, 'whole')} × ${formatQuantity(ratedKvar, 'kvar', 'given')}`;
    const cost = capital === null ? '' : `, ${formatQuantity(capital, site.currency ?? '', 'whole')}`;
    const needs = `${formatQuantity(effectiveKvar, 'kvar')}, conductors for ${formatQuantity(conductorMinA, 'A')}${cost}`;
    return `${stages}: ${needs}, ${verdictWords(verdict)}`;
  });
}
