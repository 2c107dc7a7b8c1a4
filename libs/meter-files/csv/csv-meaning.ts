import type { MeterMap, PowerFactorSign, QualityMeaning } from '#libs/contract/meter-map.js';
import type { ReadOptions } from '../meter-format.js';
import type { RowSet } from '../row-set.js';
import type { CountedClock } from '../time/counted-clock.js';
import type { DateOrder } from '../time/stamp-text.js';
import type { StampedRows } from '../time/stamped-rows.js';
import type { ColumnChoice } from './column-choice.js';
import type { CsvLayout } from './csv-layout.js';
import type { DecimalMark, DecimalSign } from './decimal-mark.js';
import type { RowQualities } from './row-qualities.js';
import type { SkippedRows } from './row-shape.js';

/** One way of reading whatever the file leaves open. */
export interface CsvMeaning {
  choice: ColumnChoice;
  decimal: DecimalSign | null;
  order: DateOrder;
  keep: 'first' | 'last' | undefined;
  /** what columns of energy hold; null where their names and numbers say it */
  energy: 'interval' | 'register' | null;
  powerFactorSign: PowerFactorSign;
  multiplier: number;
  /** meaning of quality codes, beside those that have one by custom */
  quality: Readonly<Record<string, QualityMeaning>>;
  /** what the columns of a row a day count */
  days: 'clock' | 'elapsed';
  /** what numbers such as 9999 are that may stand for a missing value; null where there are none */
  fillers: 'missing' | 'values' | null;
}

/** The rows of a file as read, before anything is settled. */
export interface ReadRows {
  readonly rows: StampedRows;
  readonly mark: DecimalMark;
  readonly qualities: RowQualities;
  readonly headers: SkippedRows;
  readonly totals: SkippedRows;
  readonly texts: SkippedRows;
  /** how a column counts the intervals of a day; null where none does */
  readonly counted: CountedClock | null;
  /** columns of power factors whose cells say lagging or leading; leading ones are below zero */
  readonly sided: ReadonlySet<number>;
  /** columns of numbers, counted from 0, in the order of `rows.values` */
  readonly columns: readonly number[];
  /** channels that hold nothing a record is made of, in a file that has a row for each channel and moment */
  readonly leftOut?: ReadonlySet<string>;
  /**
   * The numbers of a column, an open decimal mark taken as such.
   * @param column counted from 0
   */
  valuesOf(column: number): Float64Array;
}

/** Numbers that may stand for a missing value. */
export interface FillerNumbers {
  /** numbers that were taken out of the columns */
  taken: number;
  /** as they were first written */
  value: number;
  /** the columns they were taken out of, counted from 0 */
  columns: number[];
  /** rows of numbers that may be values as well, by column of the rows' values; null where there are none */
  open: Map<number, RowSet> | null;
}

/** A file whose rows have been read, before their meaning is settled. */
export interface CsvFile {
  layout: CsvLayout;
  reader: ReadRows;
  map: MeterMap;
  /** numbers that may stand for a missing value */
  fillers: FillerNumbers;
  options: ReadOptions;
}
