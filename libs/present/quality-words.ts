import type { RecordGrade, Remark, ZoneTable } from '#libs/engine/index.js';
import { formatNumber, formatQuantity, GAP } from './format-number.js';
import { say, words } from './language.js';
import { formatLength, formatMoment, formatMonth } from './local-stamp.js';

/** Coverage of a month as it is stated. */
export interface MonthStated {
  month: string;
  intervalsExpected: number;
  intervals: number;
  coveredPct: number;
  repaired: number;
}

/** A quality statement as readers make it and the API gives it. */
export interface QualityStated {
  format: string;
  rowsRead: number;
  rejectedRows: number;
  intervalsExpected: number;
  missingSpanCount: number;
  missingSpans: readonly { beginS: number; endS: number; intervals: number }[];
  duplicates: number;
  repaired: number;
  repair: { method: 'none' | 'hold' | 'interpolate' | 'typicalDay'; upToS: number | null };
  suspectZeroCount: number;
  suspectZeros: readonly { at: string; beginS: number; endS: number; intervals: number }[];
  months: readonly MonthStated[];
  seasonsMissing: readonly string[];
  grade: RecordGrade;
  gradeRule: Remark;
  questions: readonly Remark[];
}

const GRADES: Record<RecordGrade, string> = words({
  full: 'full: a year of readings',
  usable: 'usable: a season may be missing',
  limited: 'limited: it says little of the rest of the year',
  insufficient: 'insufficient: no bank can be recommended on it',
});

/**
 * A grade with what it means.
 * @param grade of a record
 */
export function gradeWords(grade: RecordGrade): string {
  return GRADES[grade];
}

const REPAIRS = words({
  none: 'none asked for',
  hold: 'holding the value before',
  interpolate: 'a line between neighbours',
  typicalDay: 'the typical day',
} as const);

/** Spans that a list shows before it only counts them. */
const SHOWN_SPANS = 5;

/**
 * A quality statement as label and text, without grade, months and questions.
 * @param quality the statement
 * @param zone the clock of its moments
 * @returns rows in the order they are read
 */
export function qualityRows(quality: QualityStated, zone: ZoneTable): [string, string][] {
  const whole = (value: number) => formatNumber(value, 'whole');
  const { repair, missingSpans, missingSpanCount, suspectZeros, suspectZeroCount } = quality;
  const upTo = repair.upToS === null ? '' : say`, gaps up to ${formatLength(repair.upToS)}`;
  const missing = quality.missingSpans.length === 0 ? say`none` : listed(missingSpans, missingSpanCount, zone);
  const zeros = listed(
    suspectZeros.map((run) => ({ ...run, of: `${run.at} ` })),
    suspectZeroCount,
    zone,
  );
  return [
    [say`rows read`, say`${whole(quality.rowsRead)} (${quality.format}), ${whole(quality.rejectedRows)} rejected`],
    [say`intervals expected`, whole(quality.intervalsExpected)],
    [say`missing spans`, missing],
    [say`repaired`, `${whole(quality.repaired)}: ${REPAIRS[repair.method]}${upTo}`],
    [say`repeats left out`, whole(quality.duplicates)],
    [say`suspect zeros`, suspectZeroCount === 0 ? say`none` : zeros],
    [
      say`seasons without readings`,
      quality.seasonsMissing.length === 0 ? say`none` : quality.seasonsMissing.join(', ').replaceAll('-', '–'),
    ],
  ];
}

interface Span {
  beginS: number;
  endS: number;
  of?: string;
}

function listed(spans: readonly Span[], count: number, zone: ZoneTable): string {
  const shown = spans
    .slice(0, SHOWN_SPANS)
    .map(
      ({ beginS, endS, of = '' }) =>
        say`${of}from ${formatMoment(zone, beginS)}, ${formatLength(Math.round(endS - beginS))}`,
    );
  const more = count - shown.length;
  return `${formatNumber(count, 'whole')}: ${shown.join('; ')}${more > 0 ? say`; and ${formatNumber(more, 'whole')} more` : ''}`;
}

/** Heads of the columns of `monthCells`. */
export const MONTH_HEADS = words(['month', 'expected', 'valid', 'repaired', 'covered'] as const);
/** Place of the head that stands only where repairs are known by the month. */
export const REPAIRED_HEAD = 3;

/**
 * Coverage of a month as cells of a table.
 * @param month coverage; without `repaired` where that is not known by the month
 */
export function monthCells(month: Omit<MonthStated, 'repaired'> & { repaired?: number }): string[] {
  const whole = (value: number) => formatNumber(value, 'whole');
  return [
    formatMonth(month.month),
    whole(month.intervalsExpected),
    whole(month.intervals),
    ...(month.repaired === undefined ? [] : [whole(month.repaired)]),
    coveredWords(month),
  ];
}

// 99.97 % is not all of it.
function coveredWords({ intervals, intervalsExpected, coveredPct }: Omit<MonthStated, 'repaired'>): string {
  if (intervals === intervalsExpected) return `100${GAP}%`;
  return coveredPct > 99.9 ? say`over 99.9\u00a0%` : formatQuantity(coveredPct, '%');
}
