import type { MeterMap } from '#libs/contract/meter-map.js';
import { zoneTableOf } from '#libs/contract/time-zone.js';
import { createLoadRecord, InputProblem, type Remark, recordSigns, type ZoneTable } from '#libs/engine/index.js';
import type { MeterReading } from '../meter-format.js';
import { note } from '../note.js';
import type { RecordColumns } from './build-columns.js';
import { qualityOf, type ReadCounts } from './quality.js';
import { repairGaps } from './repair-gaps.js';

/** What a reader has made of a file. */
export interface ReadResult {
  columns: RecordColumns;
  duplicates: number;
  notes: readonly Remark[];
  counts: ReadCounts;
  /** the site's zone, or the file's */
  zone: ZoneTable;
}

/**
 * Repairs where the map asks for it, looks the values over, and closes columns and notes into a record with its quality.
 * @param result what was read
 * @param map what a person says
 * @throws InputProblem where no interval is left
 */
export function closeReading(result: ReadResult, map: MeterMap): MeterReading {
  if (result.columns.beginS.length === 0) {
    const found = result.counts.rowsRead === 0 ? 'no row of data' : `${result.counts.rowsRead} rows without a value`;
    throw new InputProblem([{ code: 'empty-file', expected: 'at least one interval', found }]);
  }
  const method = map.repair ?? 'none';
  const repaired =
    method === 'none'
      ? { columns: result.columns, intervals: 0 }
      : repairGaps(result.columns, method, map.upToS, result.zone);
  const notes = [...result.notes];
  if (repaired.intervals > 0) {
    notes.push(note('intervals-repaired', { method, intervals: repaired.intervals, upToS: map.upToS ?? 0 }));
  }
  // months at either end reach beyond what the reader needed of the zone
  const zone = zoneOfMonths(result);
  const { questions, suspectZeros } = recordSigns(result.columns, zone);
  notes.push(...questions);
  const record = createLoadRecord({
    ...repaired.columns,
    repaired: repaired.intervals,
    duplicates: result.duplicates,
    notes,
  });
  const repair = { method, upToS: method === 'none' ? null : (map.upToS ?? null) };
  const basis = { measured: result.columns, repair, suspectZeros };
  return { record, quality: qualityOf(record, result.counts, zone, basis) };
}

function zoneOfMonths({ columns, zone }: ReadResult): ZoneTable {
  const { beginS, intervalS } = columns;
  return zoneTableOf(zone.zone, { firstS: beginS[0]!, endS: beginS[beginS.length - 1]! + intervalS });
}
