import type { MeterMap } from '#libs/contract/meter-map.js';
import { Question, type QuestionReading } from '#libs/contract/question.js';
import { zoneTableOf } from '#libs/contract/time-zone.js';
import {
  InputProblem,
  isRecordSign,
  type KeptRecord,
  type LoadRecord,
  mergeRecords,
  overlapOf,
  type RecordOverlap,
  type RecordSeries,
  type Remark,
  recordSigns,
} from '#libs/engine/index.js';
import { MAX_INTERVALS, type MeterReading } from '../meter-format.js';
import { note } from '../note.js';
import { type MonthQuality, type Quality, qualityOf } from './quality.js';
import { shownReading, utcStamp } from './reading-shown.js';

/** What is said about a file that extends a record. */
export interface ExtendOptions {
  /** what a person says; `overlap` answers which counts where they disagree */
  map?: MeterMap;
  /** zone whose months make the seasons */
  timeZone: string;
}

const SHOWN_ROWS = 3;
/** What each column is called and measured in. */
const SERIES_WORDS: Record<RecordSeries, readonly [name: string, unit: string]> = {
  activeKw: ['active power', ' kW'],
  laggingKvar: ['lagging', ' kvar'],
  leadingKvar: ['leading', ' kvar'],
  voltageV: ['voltage', ' V'],
  connectedKvar: ['connected', ' kvar'],
  standby: ['standby', ''],
};

/**
 * Extends or corrects a record by another file's reading.
 * @param earlier the record as it stands
 * @param later the reading of the further file
 * @param options what is said about it
 * @returns the extended record and its quality; `earlier` itself where the file adds nothing
 * @throws Question where they disagree and nobody has said which counts
 * @throws InputProblem where they are not on one grid, or together too long
 */
export function extendRecord(
  earlier: MeterReading,
  later: MeterReading,
  { map = {}, timeZone }: ExtendOptions,
): MeterReading {
  const overlap = overlapOf(earlier.record, later.record);
  refuseTooLong(earlier.record.beginS.length + overlap.added);
  if (overlap.disagreed > 0 && map.overlap === undefined) throw whichCounts(earlier.record, later.record, overlap);
  const keep = map.overlap ?? 'earlier';
  const merged = mergeRecords(earlier.record, later.record, keep);
  if (merged === earlier.record) return earlier;
  const zone = zoneTableOf(timeZone, merged);
  // what the values ask is looked for anew, over the whole of them
  const { questions, suspectZeros } = recordSigns(merged, zone);
  const kept = merged.notes.filter((remark) => !isRecordSign(remark));
  const notes = [...kept, ...notesOf({ earlier, later, merged }, overlap, keep), ...questions];
  const record: LoadRecord = { ...merged, notes };
  const counts = countsOf(earlier.quality, later.quality, overlap);
  const repair = later.quality.repair.method === 'none' ? earlier.quality.repair : later.quality.repair;
  const quality = qualityOf(record, counts, zone, { measured: merged, repair, suspectZeros });
  return { record, quality: { ...quality, months: withRepairs(quality.months, [earlier.quality, later.quality]) } };
}

/** Each month with what was filled in either of the two. */
function withRepairs(months: readonly MonthQuality[], before: readonly Quality[]): MonthQuality[] {
  return months.map((month) => {
    const filled = before.flatMap(({ months: parts }) => parts.filter((part) => part.month === month.month));
    const repaired = filled.reduce((sum, part) => sum + part.repaired, 0);
    return { ...month, repaired: Math.min(month.intervals, repaired) };
  });
}

function refuseTooLong(intervals: number): void {
  if (intervals <= MAX_INTERVALS) return;
  const expected = `a record of at most ${MAX_INTERVALS} intervals`;
  throw new InputProblem([{ code: 'too-large', expected, found: `${intervals} with the further file` }]);
}

function whichCounts(earlier: LoadRecord, later: LoadRecord, overlap: RecordOverlap): Question {
  const readings = (['earlier', 'later'] as const).map((keep): QuestionReading => {
    const shown = shownReading({ overlap: keep }, mergeRecords(earlier, later, keep));
    return { ...shown, firstRows: firstRows(keep === 'earlier' ? earlier : later, overlap) };
  });
  return new Question([{ id: 'overlap', about: aboutOverlap(overlap), readings, overlap }]);
}

function aboutOverlap({ disagreed, spanCount, spans, largest }: RecordOverlap): string {
  const first = spans[0]!;
  const where =
    spanCount === 1
      ? `from ${utcStamp(first.beginS)} to ${utcStamp(first.endS)}`
      : `in ${spanCount} spans, the first from ${utcStamp(first.beginS)} to ${utcStamp(first.endS)}`;
  const by = (Object.entries(largest) as [RecordSeries, number][]).map(([column, value]) => {
    const [name, unit] = SERIES_WORDS[column];
    return `${name} by up to ${Number(value.toPrecision(6))}${unit}`;
  });
  const intervals = disagreed === 1 ? 'one interval' : `${disagreed} intervals`;
  return `whether the record or the further file counts in ${intervals} where they disagree, ${where}: ${by.join(', ')}`;
}

/** The first intervals that disagree, as one of the two has them: UTC, kW, lagging and leading kvar. */
function firstRows({ beginS, intervalS, ...columns }: LoadRecord, { spans }: RecordOverlap): string[][] {
  const rows: string[][] = [];
  for (const span of spans) {
    for (let i = beginS.indexOf(span.beginS); i < beginS.length && beginS[i]! < span.endS; i++) {
      if (rows.length === SHOWN_ROWS) return rows;
      const values = [columns.activeKw[i], columns.laggingKvar[i], columns.leadingKvar[i]];
      rows.push([utcStamp(beginS[i]!), ...values.map(String)]);
    }
  }
  return rows;
}

function notesOf(
  { earlier, later, merged }: { earlier: MeterReading; later: MeterReading; merged: LoadRecord },
  overlap: RecordOverlap,
  keep: KeptRecord,
): Remark[] {
  const lost = (['voltageV', 'connectedKvar', 'standby'] as const).filter(
    (name) => merged[name] === null && (earlier.record[name] !== null || later.record[name] !== null),
  );
  return [
    note('record-extended', { added: overlap.added, agreed: overlap.agreed }),
    ...(overlap.disagreed > 0 ? [note('overlap-settled', { intervals: overlap.disagreed, kept: keep })] : []),
    ...lost.map((name) => note('column-left-out', { column: SERIES_WORDS[name][0] })),
  ];
}

/** The rows of both files; an interval that was overruled is a row without effect. */
function countsOf(earlier: Quality, later: Quality, { disagreed }: RecordOverlap) {
  const formats = [...new Set([...earlier.format.split(' + '), later.format])];
  return {
    format: formats.join(' + '),
    rowsRead: earlier.rowsRead + later.rowsRead,
    rejectedRows: earlier.rejectedRows + later.rejectedRows + disagreed,
  };
}
