import type { DateStyle } from './serial-text.js';

const DATE: DateStyle = { date: true, time: false };
const TIME: DateStyle = { date: false, time: true };
const BOTH: DateStyle = { date: true, time: true };

/** Number formats that every workbook has without writing them down (ECMA-376 part 1, 18.8.30), those of dates and times. */
const BUILT_IN: readonly [from: number, to: number, style: DateStyle][] = [
  [14, 17, DATE],
  [18, 21, TIME],
  [22, 22, BOTH],
  // dates, in some languages clock times: what the serial holds decides
  [27, 36, DATE],
  [45, 47, TIME],
  [50, 58, DATE],
];

/**
 * What a built-in number format shows of a date.
 * @param id number of the format
 * @returns null where it shows a number
 */
export function builtInStyle(id: number): DateStyle | null {
  return BUILT_IN.find(([from, to]) => id >= from && id <= to)?.[2] ?? null;
}

const LITERAL = /"[^"]*"|\\.|_.|\*./gs;
const ELAPSED = /\[(h+|m+|s+)\]/gi;
const BRACKETED = /\[[^\]]*\]/g;
const HALVES = /am\/pm|a\/p/gi;
/** Thousandths behind the seconds are the only digits in a format of times. */
const SECONDS_FRACTION = /s[.,]0+/gi;

/**
 * What a number format of the workbook's own shows of a date.
 * @param code for example `dd/mm/yyyy hh:mm`
 * @returns null where it shows a number or text
 */
export function formatStyle(code: string): DateStyle | null {
  const bare = code
    .replace(LITERAL, '')
    .split(';', 1)[0]!
    .replace(ELAPSED, '$1')
    .replace(BRACKETED, '')
    .replace(HALVES, 'h')
    .replace(SECONDS_FRACTION, 's')
    .toLowerCase();
  if (/[0#?@]|general/.test(bare)) return null;
  const time = /[hs]/.test(bare);
  const date = /[ydeg]/.test(bare) || (bare.includes('m') && !time);
  return time || date ? { date, time } : null;
}
