import type { Problem } from '#libs/engine/index.js';

/** A problem between fields; its path is still a list. */
export type RuleBreach = Omit<Problem, 'path' | 'row' | 'column'> & { path: PropertyKey[] };

/** What the schema could read so far: fields that failed are absent or of some other type. */
export type Readable = unknown;

/** The part of a value at a path, undefined where there is none. */
export function partAt(value: Readable, ...path: PropertyKey[]): Readable {
  let part = value;
  for (const key of path) {
    if (typeof part !== 'object' || part === null || !Object.hasOwn(part, key)) return undefined;
    part = (part as Record<PropertyKey, unknown>)[key];
  }
  return part;
}

/** The number at a path, NaN where there is none: comparisons with it are false. */
export function numberAt(value: Readable, ...path: PropertyKey[]): number {
  const part = partAt(value, ...path);
  return typeof part === 'number' ? part : Number.NaN;
}

/** The text at a path, undefined where there is none. */
export function textAt(value: Readable, ...path: PropertyKey[]): string | undefined {
  const part = partAt(value, ...path);
  return typeof part === 'string' ? part : undefined;
}

/** The list at a path, empty where there is none. */
export function listAt(value: Readable, ...path: PropertyKey[]): unknown[] {
  const part = partAt(value, ...path);
  return Array.isArray(part) ? part : [];
}

/** The entries of a list that repeat an earlier one, as index and value. */
export function repeatsIn<T>(list: readonly T[]): { index: number; value: T }[] {
  const seen = new Set<T>();
  const repeats: { index: number; value: T }[] = [];
  list.forEach((value, index) => {
    if (value !== undefined && seen.has(value)) repeats.push({ index, value });
    seen.add(value);
  });
  return repeats;
}
