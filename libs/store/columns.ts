import 'reflect-metadata';
import { Column, type ColumnOptions, type ColumnType } from 'typeorm';

/** The databases one set of entities serves. */
export type Dialect = 'better-sqlite3' | 'postgres';

const SQL_TYPES = {
  bytes: { 'better-sqlite3': 'blob', postgres: 'bytea' },
  instant: { 'better-sqlite3': 'datetime', postgres: 'timestamptz' },
  double: { 'better-sqlite3': 'double', postgres: 'double precision' },
  // Text on both: what is frozen must come back letter for letter, and jsonb reorders keys.
  json: { 'better-sqlite3': 'simple-json', postgres: 'simple-json' },
} as const satisfies Record<string, Record<Dialect, ColumnType>>;

export type Kind = keyof typeof SQL_TYPES;

let dialect: Dialect = 'better-sqlite3';

/** Says for which database the entities' column types are read next. */
export function speakDialect(spoken: Dialect): void {
  dialect = spoken;
}

/**
 * The type a migration writes.
 * @param kind what the column holds
 * @param spoken the database's own name in the ORM
 */
export function sqlType(kind: Kind, spoken: string): string {
  const type = SQL_TYPES[kind][spoken as Dialect];
  return type === 'simple-json' ? 'text' : type;
}

/** A column whose SQL type differs between the databases; it is read when a data source is initialised. */
export function Col(kind: Kind, options: Omit<ColumnOptions, 'type'> = {}): PropertyDecorator {
  const type = { enumerable: true, get: () => SQL_TYPES[kind][dialect] };
  return Column(Object.defineProperty({ ...options }, 'type', type) as ColumnOptions);
}
