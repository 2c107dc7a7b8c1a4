/**
 * How the parts of a date stand in the file. `slashed` dates (01/02/2018) are day or month first, `short` ones
 * (01/02/18) may begin with the year too: both wait for the whole column. Dotted dates are day first unless the map
 * says otherwise, by the custom of every country that writes them.
 */
export type DateForm = 'yearFirst' | 'slashed' | 'dotted' | 'short';

/** Order of the parts of a numeric date. */
export type DateOrder = 'ymd' | 'dmy' | 'mdy';

/** A stamp as written; what it does not hold is null. */
export interface Stamp {
  /** year × 10 000 + first × 100 + second part; of a short date first × 10 000 + second × 100 + third */
  dateKey: number | null;
  dateForm: DateForm;
  /** seconds since midnight by the clock that was written, 0 … 86 400 [s] */
  clockS: number | null;
  /** local time minus UTC that the stamp itself states [s] */
  offsetS: number | null;
  /** second clock time of a range such as 00:00–00:15 [s] */
  untilS: number | null;
}

const CLOCK = String.raw`(\d{1,2})[:.h](\d{2})(?:[:.](\d{2})(?:[.,]0+)?)?\s*([ap]\.?\s?m\.?)?`;
const OFFSET = String.raw`(?:\s*(z|utc|gmt|[+-]\d{2}:?\d{2}|[+-]\d{2}))?`;
const DATE_ONLY = /^(\S+?)$/;
const DATE_CLOCK = new RegExp(String.raw`^(.*?\d)(?:\s*,\s*|\s+|t)${CLOCK}${OFFSET}$`, 'i');
const RANGE = new RegExp(String.raw`^(?:(.*?\d)(?:\s*,\s*|\s+|t))?${CLOCK}\s*(?:-|–|to|bis|à)\s*${CLOCK}$`, 'i');
const CLOCK_ONLY = new RegExp(`^${CLOCK}$`, 'i');
const COMPACT = /^(\d{8})[t ]?(\d{2})(\d{2})(\d{2})?(?:\s*(z|[+-]\d{2}:?\d{2}))?$/i;
const FOUR_DIGITS = /^(\d{2})(\d{2})$/;

/**
 * Reads a stamp, a date, a clock time or a range of two clock times.
 * @param text cell without surrounding blanks
 * @returns the stamp, or null where the text is none
 */
export function readStamp(text: string): Stamp | null {
  if (text.length > 64 || !/\d/.test(text)) return null;
  const weekday = WEEKDAY.exec(text)?.[0];
  return readBare(text) ?? (weekday === undefined ? null : readBare(text.slice(weekday.length)));
}

/** A day of the week may stand before the date; it is left unread, since the date says it. */
const WEEKDAY = /^[a-zà-ÿ]{2,10}\.?,?\s+(?=\d)/i;

function readBare(text: string): Stamp | null {
  return compact(text) ?? dateAndClock(text) ?? range(text) ?? clockOnly(text) ?? dateOnly(text);
}

function compact(text: string): Stamp | null {
  const parts = COMPACT.exec(text);
  if (parts === null) return null;
  const date = readDate(parts[1]!);
  const clockS = clockSeconds(parts[2]!, parts[3]!, parts[4], undefined);
  if (date === null || clockS === null) return null;
  return { ...date, clockS, offsetS: offsetSeconds(parts[5]), untilS: null };
}

function dateAndClock(text: string): Stamp | null {
  const parts = DATE_CLOCK.exec(text);
  if (parts === null) return null;
  const date = readDate(parts[1]!);
  const clockS = clockSeconds(parts[2]!, parts[3]!, parts[4], parts[5]);
  if (date === null || clockS === null) return null;
  return { ...date, clockS, offsetS: offsetSeconds(parts[6]), untilS: null };
}

function range(text: string): Stamp | null {
  const parts = RANGE.exec(text);
  if (parts === null) return null;
  const date = parts[1] === undefined ? NO_DATE : readDate(parts[1]);
  const clockS = clockSeconds(parts[2]!, parts[3]!, parts[4], parts[5]);
  const untilS = clockSeconds(parts[6]!, parts[7]!, parts[8], parts[9]);
  if (date === null || clockS === null || untilS === null) return null;
  return { ...date, clockS, offsetS: null, untilS };
}

function clockOnly(text: string): Stamp | null {
  const parts = CLOCK_ONLY.exec(text) ?? FOUR_DIGITS.exec(text);
  if (parts === null) return null;
  const clockS = clockSeconds(parts[1]!, parts[2]!, parts[3], parts[4]);
  return clockS === null ? null : { ...NO_DATE, clockS, offsetS: null, untilS: null };
}

function dateOnly(text: string): Stamp | null {
  const date = DATE_ONLY.test(text) || /[a-z]/i.test(text) ? readDate(text) : null;
  return date === null ? null : { ...date, clockS: null, offsetS: null, untilS: null };
}

const NO_DATE = { dateKey: null, dateForm: 'yearFirst' as DateForm };

type DatePart = Pick<Stamp, 'dateKey' | 'dateForm'>;

const YEAR_FIRST = /^(\d{4})([-/.])(\d{1,2})\2(\d{1,2})$/;
const YEAR_LAST = /^(\d{1,2})([-/.])(\d{1,2})\2(\d{4}|\d{2})$/;
const EIGHT_DIGITS = /^(\d{4})(\d{2})(\d{2})$/;
const DAY_NAMED = /^(\d{1,2})(?:st|nd|rd|th|\.)?[-/ ]?([a-zà-ÿ]{3,12})\.?,?[-/ ]?(\d{4}|\d{2})$/i;
const NAMED_DAY = /^([a-zà-ÿ]{3,12})\.? (\d{1,2})(?:st|nd|rd|th)?,? (\d{4})$/i;

function readDate(text: string): DatePart | null {
  const yearFirst = YEAR_FIRST.exec(text);
  if (yearFirst !== null) return keyed('yearFirst', yearFirst[1]!, yearFirst[3]!, yearFirst[4]!);
  const yearLast = YEAR_LAST.exec(text);
  if (yearLast !== null) return yearLastDate(yearLast);
  const digits = EIGHT_DIGITS.exec(text);
  if (digits !== null) return keyed('yearFirst', digits[1]!, digits[2]!, digits[3]!);
  return namedMonth(text);
}

function yearLastDate([, first, mark, second, year]: RegExpExecArray): DatePart {
  if (mark === '.') return keyed('dotted', fullYear(year!), first!, second!);
  if (year!.length === 4) return keyed('slashed', year!, first!, second!);
  return { dateForm: 'short', dateKey: Number(first) * 10_000 + Number(second) * 100 + Number(year) };
}

function namedMonth(text: string): DatePart | null {
  const day = DAY_NAMED.exec(text);
  const named = NAMED_DAY.exec(text);
  const [month, date, year] =
    day !== null ? [day[2]!, day[1]!, day[3]!] : named !== null ? [named[1]!, named[2]!, named[3]!] : [];
  if (month === undefined || date === undefined || year === undefined) return null;
  const number = monthNumber(month);
  return number === 0 ? null : keyed('yearFirst', fullYear(year), String(number), date);
}

function keyed(dateForm: DateForm, year: string, first: string, second: string): DatePart {
  return { dateForm, dateKey: Number(year) * 10_000 + Number(first) * 100 + Number(second) };
}

/** Two digits mean 1970 … 2069. */
function fullYear(year: string): string {
  return year.length === 4 ? year : String(Number(year) + (Number(year) < 70 ? 2000 : 1900));
}

/** First letters that tell a month apart in English, German, French and Spanish, without accents. */
const MONTHS = [
  ['jan', 'ene'],
  ['feb', 'fev'],
  ['mar', 'mae', 'mrz'],
  ['apr', 'abr', 'avr'],
  ['may', 'mai'],
  ['jun', 'juin'],
  ['jul', 'juil'],
  ['aug', 'ago', 'aou'],
  ['sep', 'set'],
  ['oct', 'okt'],
  ['nov'],
  ['dec', 'dez', 'dic'],
];

function monthNumber(name: string): number {
  const plain = name.toLowerCase().normalize('NFD').replace(/\p{M}/gu, '');
  if (plain.startsWith('jui')) return plain.startsWith('juin') ? 6 : 7;
  return 1 + MONTHS.findIndex((starts) => starts.some((start) => plain.startsWith(start)));
}

function clockSeconds(
  hour: string,
  minute: string,
  second: string | undefined,
  half: string | undefined,
): number | null {
  let hours = Number(hour);
  if (half !== undefined) {
    if (hours < 1 || hours > 12) return null;
    hours = (hours % 12) + (/^p/i.test(half) ? 12 : 0);
  }
  const clockS = hours * 3600 + Number(minute) * 60 + Number(second ?? 0);
  const valid = Number(minute) < 60 && Number(second ?? 0) < 60 && clockS <= 86_400;
  return valid ? clockS : null;
}

function offsetSeconds(text: string | undefined): number | null {
  if (text === undefined) return null;
  if (/^[a-z]/i.test(text)) return 0;
  const minutes = Number(text.slice(1, 3)) * 60 + Number(text.slice(3).replace(':', '') || 0);
  return (text.startsWith('-') ? -60 : 60) * minutes;
}

/**
 * Day number of a date key.
 * @param dateKey the parts as kept in a stamp
 * @param dateForm how they stand there
 * @param order which part is which, for slashed, dotted and short dates
 * @returns year, month, day, or null where there is no such order for the form
 */
export function datePartsOf(
  dateKey: number,
  dateForm: DateForm,
  order: DateOrder,
): { year: number; month: number; day: number } | null {
  const head = Math.floor(dateKey / 10_000);
  const middle = Math.floor(dateKey / 100) % 100;
  const tail = dateKey % 100;
  if (dateForm === 'yearFirst') return { year: head, month: middle, day: tail };
  if (dateForm === 'short') {
    if (order === 'ymd') return { year: Number(fullYear(String(head))), month: middle, day: tail };
    const year = Number(fullYear(String(tail)));
    return order === 'dmy' ? { year, month: middle, day: head } : { year, month: head, day: middle };
  }
  if (order === 'ymd') return null;
  return order === 'dmy' ? { year: head, month: tail, day: middle } : { year: head, month: middle, day: tail };
}
