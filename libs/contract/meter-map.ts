/**
 * Names of the columns a map may choose; `date` and `clock` together stand for `time`. Apparent power, power factor and
 * current give kW and kvar where the file has none; `meter` names the meter of each row, `quality` its status.
 */
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
  'apparent',
  'powerFactor',
  'current',
  'meter',
  'quality',
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
  'VA',
  'kVA',
  'MVA',
  'VAh',
  'kVAh',
  'MVAh',
  'V',
  'kV',
  'A',
] as const;

export type MeterUnit = (typeof METER_UNITS)[number];

/** What a negative power factor says: which kvar the interval has, or which way its kW flow. */
export const POWER_FACTOR_SIGNS = ['negativeLeads', 'negativeLags', 'negativeExports'] as const;

export type PowerFactorSign = (typeof POWER_FACTOR_SIGNS)[number];

/** Between which conductors a voltage is measured. */
export type VoltageBetween = 'lineToLine' | 'lineToNeutral';

/** What a letter or word in a column of qualities says of its row. */
export type QualityMeaning = 'measured' | 'estimated' | 'missing';

/** How missing intervals are filled; only where it is asked for. */
export type MeterRepair = 'none' | 'hold' | 'interpolate' | 'typicalDay';

/** Columns whose unit a map may state. */
export const UNIT_COLUMNS = [
  'active',
  'exported',
  'reactive',
  'lagging',
  'leading',
  'voltage',
  'connected',
  'apparent',
  'current',
] as const;

/** A column by its number counted from 1, or by its name in the header row. */
export type ColumnName = number | string;

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
  /** each column as its number counted from 1, or as its name in the header row; a list of three is a column a phase */
  columns?: Partial<Record<MeterColumn, ColumnName | readonly ColumnName[]>>;
  units?: Partial<Record<(typeof UNIT_COLUMNS)[number], MeterUnit>>;
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
  /** what columns of energy hold: the energy of each interval, or the reading of a register that only rises */
  energy?: 'interval' | 'register';
  /** what a negative power factor says */
  powerFactorSign?: PowerFactorSign;
  /** what voltages are measured between */
  voltageBetween?: VoltageBetween;
  /** meaning of the letters or words in the quality columns */
  quality?: Record<string, QualityMeaning>;
  /** in a file of one row a day: whether its columns follow the clock or the time since midnight where clocks change */
  dayColumns?: 'clock' | 'elapsed';
  /** numbers such as 9999 or -999 that may stand for a missing value: all of them do, or none */
  fillers?: 'missing' | 'values';
  /** which of several rows with one stamp and different values counts */
  keepRow?: 'first' | 'last';
  /** which counts where a file that extends a record disagrees with it: the record as it stands, or the file */
  overlap?: 'earlier' | 'later';
}
