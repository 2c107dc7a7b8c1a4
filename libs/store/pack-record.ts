import { type LoadRecord, monthIndex, UTC_TABLE } from '#libs/engine/index.js';
import { type PackedColumn, packColumn } from './packed-column.js';

/** One quantity over one UTC month, ready to be stored. */
export interface MonthColumn extends PackedColumn {
  month: string;
  quantity: string;
}

export type RequiredColumn = (typeof REQUIRED)[number];

const REQUIRED = ['beginS', 'activeKw', 'laggingKvar', 'leadingKvar'] as const;
const OPTIONAL = ['voltageV', 'connectedKvar'] as const;

/**
 * Packs a record's columns by UTC month; no database is needed, so that another thread can do it.
 * @param record the record
 */
export function packRecord(record: LoadRecord): MonthColumn[] {
  const { names, starts } = monthIndex(record.beginS, UTC_TABLE);
  const columns = Object.entries(columnsOf(record));
  return names.flatMap((month, m) =>
    columns.map(([quantity, values]) => ({
      month,
      quantity,
      ...packColumn(values.subarray(starts[m]!, starts[m + 1]!), columnName({ month, quantity })),
    })),
  );
}

/** The name a month's column is packed under. */
export function columnName({ month, quantity }: Pick<MonthColumn, 'month' | 'quantity'>): string {
  return `${quantity} ${month}`;
}

function columnsOf(record: LoadRecord): Record<string, Float64Array> {
  const columns: Record<string, Float64Array> = {};
  for (const name of REQUIRED) columns[name] = record[name];
  for (const name of OPTIONAL) {
    const values = record[name];
    if (values !== null) columns[name] = values;
  }
  if (record.standby !== null) columns.standby = Float64Array.from(record.standby);
  return columns;
}
