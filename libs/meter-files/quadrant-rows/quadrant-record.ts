import type { MeterMap } from '#libs/contract/meter-map.js';
import { zoneTable } from '#libs/contract/time-zone.js';
import { InputProblem, type Remark } from '#libs/engine/index.js';
import { valuesUnder } from '../csv/raw-columns.js';
import type { DecimalSign } from '../csv/decimal-mark.js';
import { readUnit } from '../csv/unit-text.js';
import type { ReadOptions } from '../meter-format.js';
import { note } from '../note.js';
import { buildColumns, type Quantity, type QuantitySource } from '../record/build-columns.js';
import type { ReadResult } from '../record/close-reading.js';
import { gridRows, type IntervalGrid, sameIn } from '../record/interval-grid.js';
import { RowProblems } from '../row-problems.js';
import { clockTimes, orderRows } from '../time/clock-times.js';
import { type Moments, showsEnds } from '../time/moments.js';
import { type SeasonClock, seasonClock, seasonMoment } from '../time/season-moment.js';
import type { DateOrder } from '../time/stamp-text.js';
import { ENERGIES, FLAG, type QuadrantReader } from './quadrant-reader.js';

/** One way of reading what the rows leave open. */
export interface QuadrantMeaning {
  decimal: DecimalSign | null;
  order: DateOrder;
  keep: 'first' | 'last' | undefined;
}

/** Columns AI, AE, R1 … R4 of the file, counted from 1. */
const FIRST_COLUMN = 3;
const FLAG_COLUMN = 2;
const DAY_S = 86_400;

/**
 * Makes a record of the rows under one meaning. The quadrants are those of IEC 62053-23: with import to the right and
 * inductive energy up they count anticlockwise from I, so that reactive energy is positive in I and II (lagging = R1 + R2)
 * and negative in III and IV (leading = R3 + R4), whichever way active energy flows.
 * @param reader rows as read
 * @param options what is said about the file
 * @param meaning what its open points are taken to mean
 * @throws InputProblem where the rows can't have this meaning
 */
export function quadrantRecord(reader: QuadrantReader, options: ReadOptions, meaning: QuadrantMeaning): ReadResult {
  const map = options.map ?? {};
  const { rows } = reader;
  const values = valuesUnder(reader, meaning.decimal);
  const { moments, grid, ends, because } = placedRows(reader, values, options, meaning);
  refuseWrongQuadrants(values, grid.kept, rows.rowNumber);
  const built = buildColumns(
    { ...grid, utcS: moments.utcS, shiftS: ends ? grid.intervalS : 0, rowNumber: rows.rowNumber },
    sourcesOf(values, map),
  );
  const notes: Remark[] = [
    ...moments.notes,
    ...(because === null ? [] : [note('stamps-mark-ends', { because })]),
    ...(ends || map.stamp !== undefined ? [] : [note('stamps-assumed-beginnings', {})]),
    ...(grid.misplaced > 0 ? [note('rows-put-in-order', { rows: grid.misplaced })] : []),
    ...(grid.duplicates > 0 ? [note('duplicates-dropped', { rows: grid.duplicates })] : []),
    ...(grid.overruled > 0
      ? [note('conflicting-rows-settled', { rows: grid.overruled, kept: meaning.keep ?? '' })]
      : []),
    ...(built.withoutValue > 0 ? [note('intervals-without-value', { intervals: built.withoutValue })] : []),
    note('file-read-as', { format: 'quadrant-rows', columns: `season flag; ${ENERGIES.join('; ')}` }),
    note('quadrants-added', {}),
    ...(map.multiplier === undefined ? [] : [note('values-multiplied', { multiplier: map.multiplier })]),
  ];
  const counts = {
    format: 'quadrant-rows',
    rowsRead: rows.count,
    rejectedRows: built.withoutValue + grid.overruled,
  };
  const [firstS, lastS] = [moments.utcS[grid.kept[0]!]!, moments.utcS[grid.kept.at(-1)!]!];
  const zone = options.siteTimeZone ?? moments.zone.zone;
  return {
    columns: built.columns,
    duplicates: grid.duplicates,
    notes,
    counts,
    zone: zoneTable(zone, firstS - DAY_S, lastS + 2 * DAY_S),
  };
}

interface Placed {
  moments: Moments;
  grid: IntervalGrid;
  ends: boolean;
  /** what shows that stamps mark ends, where nobody says it */
  because: string | null;
}

function placedRows(
  { rows }: QuadrantReader,
  values: readonly Float64Array[],
  options: ReadOptions,
  { order, keep }: QuadrantMeaning,
): Placed {
  const map = options.map ?? {};
  const zone = options.timeZone ?? map.timeZone ?? options.siteTimeZone ?? null;
  const clock = clockTimes(rows, order);
  const { newestFirst, movedMidnights } = orderRows(clock, rows, map.stamp !== 'begin');
  const { rowNumber, count } = rows;
  const notes = [
    ...(zone === null ? [note('zone-assumed-utc', {})] : []),
    ...(newestFirst ? [note('rows-newest-first', { rows: count })] : []),
    ...(movedMidnights > 0 ? [note('midnight-under-ending-day', { rows: movedMidnights })] : []),
  ];
  const season = seasonClock(zone, clock);
  const utcS = seasonMoments({ clock, summer: values[FLAG]!, rowNumber }, season);
  const clockAt = (row: number) => clock[row]!;
  const moments: Moments = { utcS, clockAt, newestFirst, stepS: Number.NaN, skips: true, zone: season.table, notes };
  const energies = values.slice(0, FLAG);
  const grid = gridRows({ utcS, rowNumber, agree: sameIn(energies), spanS: Number.NaN }, keep);
  const bounds = { first: grid.kept[0]!, last: grid.kept.at(-1)!, intervalS: grid.intervalS };
  const because = map.stamp === undefined ? showsEnds(rows, moments, bounds) : null;
  return { moments, grid, ends: map.stamp === 'end' || because !== null, because };
}

/** The flag, 1 for summer time, tells the passes of a doubled hour apart; one that contradicts the zone is refused. */
function seasonMoments(
  { clock, summer, rowNumber }: { clock: Float64Array; summer: Float64Array; rowNumber: Int32Array },
  season: SeasonClock,
): Float64Array {
  const problems = new RowProblems();
  const utcS = clock.map((clockS, i) => {
    const momentS = seasonMoment(clockS, summer[i] === 1, season);
    if (momentS !== null) return momentS;
    const expected = `the flag of the season that the clocks of ${season.table.zone} showed`;
    problems.add({ code: 'bad-time', row: rowNumber[i]!, column: FLAG_COLUMN, expected, found: String(summer[i]) });
    return Number.NaN;
  });
  problems.refuse();
  return utcS;
}

function sourcesOf(values: readonly Float64Array[], { units = {}, multiplier = 1 }: MeterMap): QuantitySource[] {
  const [ai, ae, r1, r2, r3, r4] = values as [Float64Array, ...Float64Array[]];
  const source = (quantity: Quantity, column: number, read: Float64Array, unit: string): QuantitySource => {
    const { energy, times, over } = readUnit(unit)!;
    return { quantity, column: FIRST_COLUMN + column, values: read, energy, times: times * multiplier, over };
  };
  const active = units.active ?? 'kWh';
  const reactive = units.reactive ?? 'kvarh';
  return [
    source('active', 0, ai, active),
    source('exported', 1, ae!, active),
    source('lagging', 2, sum(r1!, r2!), reactive),
    source('leading', 4, sum(r3!, r4!), reactive),
  ];
}

function sum(a: Float64Array, b: Float64Array): Float64Array {
  return a.map((value, row) => value + b[row]!);
}

/** Quadrants II and III belong to export: where they count without any, the columns stand in another order. */
const WRONG_SHARE = 0.05;

function refuseWrongQuadrants(values: readonly Float64Array[], kept: Int32Array, rowNumber: Int32Array): void {
  const [, ae, r1, r2, r3, r4] = values as [Float64Array, ...Float64Array[]];
  let wrong = 0;
  let all = 0;
  let first = -1;
  for (const row of kept) {
    const beside = r2![row]! + r3![row]!;
    const total = beside + r1![row]! + r4![row]!;
    if (Number.isNaN(total)) continue;
    all += total;
    if (ae![row] !== 0 || beside === 0) continue;
    wrong += beside;
    if (first < 0) first = row;
  }
  if (wrong <= WRONG_SHARE * all) return;
  const column = FIRST_COLUMN + (r2![first]! > 0 ? 3 : 4);
  const expected = 'reactive energy of quadrants II and III only where active energy is exported';
  const found = `${r2![first]!} and ${r3![first]!} without export`;
  throw new InputProblem([{ code: 'inconsistent', row: rowNumber[first]!, column, expected, found }]);
}
