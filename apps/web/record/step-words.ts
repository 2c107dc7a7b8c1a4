import { formatQuantity } from '#libs/present/format-number.js';

/** The length of an interval, in minutes where they are whole. */
export function stepWords(intervalS: number): string {
  return intervalS % 60 === 0
    ? formatQuantity(intervalS / 60, 'min', 'given')
    : formatQuantity(intervalS, 's', 'given');
}
