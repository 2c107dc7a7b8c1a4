import { pathWords } from '#libs/present/path-words.js';

/**
 * A paper's fields, one row each, in the order they stand in.
 * @param part of a document
 * @param path to it
 * @returns path and value as text
 */
export function paperRows(part: unknown, path = ''): [path: string, value: string][] {
  if (Array.isArray(part) && part.every((one) => one === null || typeof one !== 'object')) {
    return [[path, part.join('; ')]];
  }
  if (part === null || typeof part !== 'object') return [[path, String(part)]];
  return Object.entries(part).flatMap(([key, value]) => {
    const step = Array.isArray(part) ? `${path}[${key}]` : path === '' ? key : `${path}.${key}`;
    return paperRows(value, step);
  });
}

/** The same rows with each field's place in words. */
export function rowsInWords(rows: readonly [path: string, value: string][]): [field: string, value: string][] {
  return rows.map(([path, value]) => [pathWords(path), value]);
}
