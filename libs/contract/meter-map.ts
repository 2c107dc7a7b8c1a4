/** Names of the columns a map may choose; `date` and `clock` together stand for `time`. */
export const METER_COLUMNS = [
  'time',
  'date',
  'clock',
  'active',
  'exported',
  'reactive',
  'lagging',
  'leading',
  'voltage',
  'connected',
  'standby',
] as const;

export type MeterColumn = (typeof METER_COLUMNS)[number];

/** Units a map may state for a column: `W` and `var` are means of the interval, `Wh` and `varh` its energies. */
export const METER_UNITS = [
  'W',
  'kW',
  'MW',
  'Wh',
  'kWh',
  'MWh',
  'var',
  'kvar',
  'Mvar',
  'varh',
  'kvarh',
  'Mvarh',
  'V',
  'kV',
] as const;

export type MeterUnit = (typeof METER_UNITS)[number];

/** How missing intervals are filled; only where it is asked for. */
export type MeterRepair = 'none' | 'hold' | 'interpolate' | 'typicalDay';

/**
 * What a person says about a meter file, in answer to a question or ahead of one; what is left out the reader finds out.
 * The file given with `--map` holds one of these, and so does each reading of a question.
 */
export interface MeterMap {
  /** a row of the table of formats, for example `csv` */
  format?: string;
  /** the sheet of a workbook: its name, or its number counted from 1 */
  sheet?: number | string;
  separator?: ',' | ';' | '\t' | '|';
  decimal?: '.' | ',';
  /** row of the column names, counted from 1; 0 where the file has none */
  headerRow?: number;
  /** each column as its number counted from 1, or as its name in the header row */
  columns?: Partial<Record<MeterColumn, number | string>>;
  units?: Partial<
    Record<'active' | 'exported' | 'reactive' | 'lagging' | 'leading' | 'voltage' | 'connected', MeterUnit>
  >;
  /** what columns without a unit of their own hold: means in kW and kvar, or energies in kWh and kvarh */
  quantity?: 'power' | 'energy';
  /** which sign of a signed reactive column is lagging */
  sign?: 'laggingPositive' | 'leadingPositive';
  /** what a stamp marks */
  stamp?: 'begin' | 'end';
  /** order of the parts of a numeric date */
  dateOrder?: 'ymd' | 'dmy' | 'mdy';
  /** IANA name or fixed offset the stamps are in */
  timeZone?: string;
  /** number or name of the meter that is meant, where the file holds several */
  meter?: string;
  /** ratio of the instrument transformers that the file's values still have to be multiplied by */
  multiplier?: number;
  repair?: MeterRepair;
  /** longest gap that is repaired [s] */
  upToS?: number;
  /** which of several rows with one stamp and different values counts */
  keepRow?: 'first' | 'last';
  /** which counts where a file that extends a record disagrees with it: the record as it stands, or the file */
  overlap?: 'earlier' | 'later';
}
