import type { MeterMap, PowerFactorSign, QualityMeaning } from '#libs/contract/meter-map.js';
import type { ReadOptions } from '../meter-format.js';
import type { DateOrder } from '../time/stamp-text.js';
import type { ColumnChoice } from './column-choice.js';
import type { CsvLayout } from './csv-layout.js';
import type { DecimalSign } from './decimal-mark.js';
import type { RowReader } from './row-reader.js';

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
}

/** A file whose rows have been read, before their meaning is settled. */
export interface CsvFile {
  layout: CsvLayout;
  reader: RowReader;
  map: MeterMap;
  options: ReadOptions;
}
