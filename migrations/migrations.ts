import { FirstTables1764547200000 } from './1764547200000-first-tables.js';
import { ExtendedRecords1764634000000 } from './1764634000000-extended-records.js';

/** Every change of the schema, oldest first. */
export const migrations = [FirstTables1764547200000, ExtendedRecords1764634000000];
