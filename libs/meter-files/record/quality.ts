import { type LoadRecord, localTime, type ZoneTable } from '#libs/engine/index.js';

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
  /** rows that hold no valid interval: no value, a skipped hour, a repeat that was overruled, totals, headers */
  rejectedRows: number;
  /** quarters of the year with under ten days of valid intervals, by their months */
  seasonsMissing: ('Dec-Feb' | 'Mar-May' | 'Jun-Aug' | 'Sep-Nov')[];
  /** by days of measured intervals and share missing: full 361 and 1 %, usable 85 and 5 %, limited 11 and 20 %, else insufficient */
  grade: 'full' | 'usable' | 'limited' | 'insufficient';
}

/** Counts only the reader knows. */
export interface ReadCounts {
  format: string;
  rowsRead: number;
  rejectedRows: number;
}

/**
 * States the quality of a record.
 * @param record the record
 * @param counts of the rows it was read from
 * @param zone the zone whose months make the seasons
 */
export function qualityOf(record: LoadRecord, counts: ReadCounts, zone: ZoneTable): Quality {
  const spans = missingSpans(record);
  return {
    ...counts,
    intervalsExpected: record.beginS.length + record.missing,
    missingSpanCount: spans.count,
    missingSpans: spans.first,
    duplicates: record.duplicates,
    repaired: record.repaired,
    seasonsMissing: seasonsMissing(record, zone),
    grade: gradeOf(record),
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

const SEASONS = ['Dec-Feb', 'Mar-May', 'Jun-Aug', 'Sep-Nov'] as const;

function seasonsMissing({ beginS, intervalS }: LoadRecord, zone: ZoneTable) {
  const coveredS = [0, 0, 0, 0];
  for (let i = 0; i < beginS.length; ) {
    // the season is looked up once a day
    const { month, secondOfDay } = localTime(zone, beginS[i]!);
    const untilS = beginS[i]! + DAY_S - secondOfDay;
    const from = i;
    while (i < beginS.length && beginS[i]! < untilS) i++;
    coveredS[Math.floor((month % 12) / 3)]! += (i - from) * intervalS;
  }
  return SEASONS.filter((_, index) => coveredS[index]! < SEASON_DAYS * DAY_S);
}

function gradeOf({ beginS, intervalS, repaired, missing }: LoadRecord): Quality['grade'] {
  const measured = beginS.length - repaired;
  const days = (measured * intervalS) / DAY_S;
  const missingShare = (missing + repaired) / (beginS.length + missing);
  if (days >= 361 && missingShare <= 0.01) return 'full';
  if (days >= 85 && missingShare <= 0.05) return 'usable';
  return days >= 11 && missingShare <= 0.2 ? 'limited' : 'insufficient';
}
