import { FirstTables1764547200000 } from './1764547200000-first-tables.js';

/** Every change of the schema, oldest first. */
export const migrations = [FirstTables1764547200000];
