import { QUANTITIES, type Quantity } from '../record/build-columns.js';

/** What columns of delimited text hold: the quantities of a record, and those from which its kW and kvar can be worked out. */
export type CsvQuantity = Quantity | 'apparent' | 'powerFactor' | 'current';

export const CSV_QUANTITIES: readonly CsvQuantity[] = [...QUANTITIES, 'apparent', 'powerFactor', 'current'];
