import type { Money, MoneyQuantity, PickChange, Recommended, SavingCase, SavingRange } from '#libs/engine/index.js';
import { formatNumber, formatQuantity } from './format-number.js';
import { say, words } from './language.js';
import { noGuarantee } from './money-words.js';

/** How each case of a saving reads after its amount. */
export const SAVING_CASE_WORDS: Record<SavingCase['name'], string> = words({
  ideal: 'with an ideal controller',
  'one interval late': 'deciding one interval late',
  '95 % available': 'out one day in twenty',
  'one stage out': 'with one stage out',
});

/** What is moved, as a noun. */
export const MONEY_QUANTITY_WORDS: Record<MoneyQuantity, string> = words({
  load: 'load',
  capacitance: 'capacitance',
  stages: 'stages',
  'fault level': 'fault level',
  costs: 'costs',
  tariff: 'tariff',
});

/** The ways that are weighed, as they are named within a sentence. */
export const WAY_WORDS: Record<Recommended, string> = words({
  'do nothing': 'doing nothing',
  "keep today's bank": 'keeping today’s bank',
  'new bank': 'a new bank',
});

/**
 * The saving that is told first: with a range the lower of the ideal controller's and the late one's.
 * @param money of a result
 * @returns a year, in the site's currency
 */
export function headlineSaving({ savingRange, savingPerYear }: Money): number {
  return savingRange?.headlinePerYear ?? savingPerYear;
}

/**
 * A saving with its range.
 * @param saving of a bank
 * @param currency of the site, or null
 * @returns one phrase a case, the headline first
 */
export function savingWords(saving: SavingRange, currency: string | null): string[] {
  const amount = (value: number): string => formatQuantity(value, currency ?? '', 'whole');
  return [
    say`${amount(saving.headlinePerYear)} a year, ${noGuarantee()}`,
    ...saving.cases.map(({ name, savingPerYear }) => `${amount(savingPerYear)} ${SAVING_CASE_WORDS[name]}`),
  ];
}

/**
 * Where another way would be the pick.
 * @param change of one quantity
 * @returns a phrase for each end that there is
 */
export function pickChangeWords(change: PickChange): string[] {
  const { quantity, lowFactor, highFactor, nameBelow, nameAbove } = change;
  const noun = MONEY_QUANTITY_WORDS[quantity];
  const end = (factor: number | null, name: Recommended | null, side: string): string[] =>
    factor === null || name === null ? [] : [say`${WAY_WORDS[name]} with ${noun} ${side} × ${formatNumber(factor)}`];
  return [...end(lowFactor, nameBelow, say`below`), ...end(highFactor, nameAbove, say`above`)];
}
