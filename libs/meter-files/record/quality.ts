import type { MeterRepair } from '#libs/contract/meter-map.js';
import {
  gradeRecord,
  isRecordSign,
  type LoadRecord,
  type MeteredColumns,
  type MonthCoverage,
  monthCoverage,
  type RecordGrade,
  type Remark,
  type SuspectZeros,
  type ZoneTable,
} from '#libs/engine/index.js';

/** Days of a season: a season counts as covered by ten days of valid intervals. */
const SEASON_DAYS = 10;
const MOST_SPANS = 100;
const DAY_S = 86_400;

/** A stretch of the record's grid without valid intervals. */
export interface MissingSpan {
  beginS: number;
  endS: number;
  intervals: number;
}

/** Coverage of a local month, with what was filled in. */
export interface MonthQuality extends MonthCoverage {
  /** of `intervals`, those that a repair filled */
  repaired: number;
}

/** How gaps were filled. */
export interface RepairMade {
  method: MeterRepair;
  /** longest gap that was filled [s]; null where none was to be */
  upToS: number | null;
}

/** How good the file behind a record was. */
export interface Quality {
  /** row of the table of formats */
  format: string;
  /** rows of data, repeats and rows without a value included */
  rowsRead: number;
  /** grid slots between the record's beginning and end */
  intervalsExpected: number;
  missingSpanCount: number;
  /** the first hundred, in time order */
  missingSpans: MissingSpan[];
  duplicates: number;
  repaired: number;
  repair: RepairMade;
  /** rows that hold no valid interval: no value, a skipped hour, a repeat that was overruled, totals, headers */
  rejectedRows: number;
  suspectZeroCount: number;
  /** runs of exact zeros that are long against the record's habit; the first hundred, in time order */
  suspectZeros: SuspectZeros[];
  /** every local month the record touches */
  months: MonthQuality[];
  /** quarters of the year with under ten days of valid intervals, by their months */
  seasonsMissing: ('Dec-Feb' | 'Mar-May' | 'Jun-Aug' | 'Sep-Nov')[];
  /** full, usable, limited or insufficient */
  grade: RecordGrade;
  /** what it was given for */
  gradeRule: Remark;
  /** what the values ask of a person; each stands among the record's notes too */
  questions: Remark[];
}

/** Counts only the reader knows. */
export interface ReadCounts {
  format: string;
  rowsRead: number;
  rejectedRows: number;
}

/** What stood in the file before gaps were filled, how they were, and the zeros that were found. */
export interface ReadBasis {
  measured: Pick<MeteredColumns, 'beginS' | 'intervalS'>;
  repair: RepairMade;
  suspectZeros: readonly SuspectZeros[];
}

/**
 * States the quality of a record.
 * @param record the record
 * @param counts of the rows it was read from
 * @param zone the zone of months and seasons; it should reach a month beyond the record
 * @param basis what the record was made from
 */
export function qualityOf(record: LoadRecord, counts: ReadCounts, zone: ZoneTable, basis: ReadBasis): Quality {
  const spans = missingSpans(record);
  const months = monthsOf(record, basis.measured, zone);
  return {
    ...counts,
    intervalsExpected: record.beginS.length + record.missing,
    missingSpanCount: spans.count,
    missingSpans: spans.first,
    duplicates: record.duplicates,
    repaired: record.repaired,
    repair: basis.repair,
    suspectZeroCount: basis.suspectZeros.length,
    suspectZeros: basis.suspectZeros.slice(0, MOST_SPANS),
    months,
    seasonsMissing: seasonsMissing(months, record.intervalS),
    ...gradeRecord(record),
    questions: record.notes.filter(isRecordSign),
  };
}

function missingSpans({ beginS, intervalS, missing }: LoadRecord): { first: MissingSpan[]; count: number } {
  const first: MissingSpan[] = [];
  let count = 0;
  if (missing === 0) return { first, count };
  for (let i = 1; i < beginS.length; i++) {
    const fromS = beginS[i - 1]! + intervalS;
    if (fromS >= beginS[i]!) continue;
    count++;
    const intervals = Math.round((beginS[i]! - fromS) / intervalS);
    if (first.length < MOST_SPANS) first.push({ beginS: fromS, endS: beginS[i]!, intervals });
  }
  return { first, count };
}

function monthsOf(record: LoadRecord, measured: ReadBasis['measured'], zone: ZoneTable): MonthQuality[] {
  // repairs fill gaps between measured intervals, so both touch the same months
  const before = monthCoverage(measured, zone);
  return monthCoverage(record, zone).map((month, at) => ({
    ...month,
    repaired: month.intervals - before[at]!.intervals,
  }));
}

const SEASONS = ['Dec-Feb', 'Mar-May', 'Jun-Aug', 'Sep-Nov'] as const;

function seasonsMissing(months: readonly MonthQuality[], intervalS: number) {
  const coveredS = [0, 0, 0, 0];
  for (const { month, intervals } of months) {
    coveredS[Math.floor((Number(month.slice(-2)) % 12) / 3)]! += intervals * intervalS;
  }
  return SEASONS.filter((_, index) => coveredS[index]! < SEASON_DAYS * DAY_S);
}
