import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { expect } from 'vitest';
import type { ReadOptions } from '#libs/meter-files/meter-format.js';
import { noteCodes, readMeterText } from './meter-text.js';

/** A file of the project's samples. */
export const sample = (name: string) =>
  readFileSync(fileURLToPath(new URL(`../golden/meter-files/${name}.csv`, import.meta.url)));

/** What a sample has to be read as. */
export interface Expected {
  /** first beginning, UTC */
  begin: string;
  intervalS: number;
  kw: number[];
  lagging: number[];
  leading?: number[];
  missing?: number;
  duplicates?: number;
  /** notes beside those of every sample of its kind */
  notes?: string[];
  /** powers come from roots: equal to twelve digits instead of exactly */
  roots?: boolean;
}

/** Reads a sample and holds it against what was worked out by hand. */
export async function expectRecord(name: string, options: ReadOptions, expected: Expected) {
  const reading = await readMeterText(sample(name), options);
  const { record } = reading;
  const values = (column: Float64Array) =>
    Array.from(column, (value) => (expected.roots ? Number(value.toPrecision(12)) : value));
  expect(new Date(record.firstS * 1000).toISOString()).toBe(`${expected.begin}:00.000Z`);
  expect(record.intervalS).toBe(expected.intervalS);
  expect(values(record.activeKw)).toEqual(expected.kw);
  expect(values(record.laggingKvar)).toEqual(expected.lagging);
  expect(values(record.leadingKvar)).toEqual(expected.leading ?? expected.lagging.map(() => 0));
  expect({ missing: record.missing, duplicates: record.duplicates }).toEqual({
    missing: expected.missing ?? 0,
    duplicates: expected.duplicates ?? 0,
  });
  expect(noteCodes(reading)).toEqual(expect.arrayContaining(expected.notes ?? []));
  return reading;
}
