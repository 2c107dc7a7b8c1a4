import * as z from 'zod';
import type { Problem } from '#libs/engine/index.js';
import { readQuantity, unitOfName } from './quantity.js';
import { shown } from './shown.js';

/** Bounds of a number; every number is also finite and at most 10¹² in size. */
export interface Range {
  min?: number;
  max?: number;
  above?: number;
  below?: number;
}

/** More than 0, and large enough to divide by. */
export const POSITIVE: Range = { above: 0, min: 1e-9 };
export const NOT_NEGATIVE: Range = { min: 0 };
/** Below about 53 V a capacitor's peak is under the 75 V a discharge has to reach: no power capacitor. */
export const CAPACITOR_V: Range = { min: 60, max: 1e6 };
export const POWER_FACTOR: Range = { above: 0, min: 1e-3, max: 1 };

const LARGEST = 1e12;

/** A problem on its way through the schema library: the path is added where the issue surfaces. */
export type ProblemParams = { problem: Omit<Problem, 'path'> };

/**
 * A number in the unit its name ends in, or a text with a unit of the same dimension.
 * @param name the key, or the key of the object around `max` and `min`
 * @param range bounds of the number in that unit
 * @returns a schema that yields the number
 */
export function quantity(name: string, range: Range = {}) {
  const unit = unitOfName(name);
  if (unit === null) throw new Error(`the name "${name}" ends in no unit`);
  return z
    .unknown()
    .transform((value, context): number => {
      const read = quantityValue(value, unit);
      const problem = typeof read === 'number' ? rangeProblem(read, range, unit, value) : read;
      if (problem === null) return read as number;
      context.issues.push({ code: 'custom', input: value, params: { problem } satisfies ProblemParams });
      return z.NEVER;
    })
    .meta({
      anyOf: [{ type: 'number' }, { type: 'string' }],
      description: `${inWords(range)} in ${unit}, or text with a unit of the same dimension`,
    });
}

/**
 * A number without a unit.
 * @param range its bounds
 */
export function plain(range: Range = {}) {
  let number = z.number().min(-LARGEST).max(LARGEST);
  if (range.min !== undefined) number = number.min(range.min);
  if (range.max !== undefined) number = number.max(range.max);
  if (range.above !== undefined) number = number.gt(range.above);
  if (range.below !== undefined) number = number.lt(range.below);
  return number;
}

/**
 * A whole number from `min` to `max`. (The library's own `int` would keep the rules between fields from running.)
 */
export function whole(min: number, max: number) {
  return z.number().multipleOf(1).min(min).max(max).meta({ type: 'integer' });
}

/** Something to be seen: fillers and the empty braille cell count as letters or signs and show nothing. */
const SHOWS = String.raw`(?![\u115f\u1160\u3164\uffa0\u2800])[\p{L}\p{N}\p{P}\p{S}]`;
const LABEL = new RegExp(String.raw`^(?=.*${SHOWS})[^\p{Cc}\p{Cs}]*$`, 'u');

/** A word or two that show something, without control characters. */
export function label(longest = 120) {
  return z.string().min(1).max(longest).regex(LABEL, { error: 'text that shows, without control characters' });
}

/** A list of `min` to `max` entries. */
export function listOf<T extends z.ZodType>(entry: T, min: number, max: number) {
  return z.array(entry).min(min).max(max);
}

/** A local calendar date "2026-01-31" that exists. */
export function localDay() {
  return z.string().refine(isDay, { error: 'a date such as "2026-01-31"' });
}

/** A calendar month "2026-01". */
export function localMonth() {
  return z.string().regex(/^\d{4}-(0[1-9]|1[0-2])$/, { error: 'a month such as "2026-01"' });
}

/** Three capital letters. */
export function currency() {
  return z.string().regex(/^[A-Z]{3}$/, { error: 'three capital letters such as "EUR"' });
}

/** A reactor ratio: at +10 % capacitance and +3 % inductance the reactor must still be smaller than the capacitor. */
export function reactorPct() {
  return quantity('reactorPct', { min: 0, below: 88 });
}

function isDay(text: string): boolean {
  if (!/^\d{4}-\d{2}-\d{2}$/.test(text)) return false;
  const date = new Date(`${text}T00:00:00Z`);
  return !Number.isNaN(date.getTime()) && date.toISOString().startsWith(text);
}

/**
 * A range in words.
 * @param range bounds
 * @returns for example "a number above 0 and at most 1"
 */
export function inWords({ min, max, above, below }: Range): string {
  const parts = [
    above === undefined ? undefined : `above ${above}`,
    min === undefined || above !== undefined ? undefined : `at least ${min}`,
    below === undefined ? undefined : `below ${below}`,
    max === undefined ? undefined : `at most ${max}`,
  ].filter((part) => part !== undefined);
  return parts.length === 0 ? 'a number' : `a number ${parts.join(' and ')}`;
}

function quantityValue(value: unknown, unit: string): number | Omit<Problem, 'path'> {
  const expected = `a number in ${unit}, or text with a unit of the same dimension`;
  const found = shown(value);
  if (value === undefined) return { code: 'missing', expected, found, unit };
  if (typeof value === 'number') return value;
  if (typeof value !== 'string') return { code: 'wrong-type', expected, found, unit };
  const reading = readQuantity(value, unit);
  if ('value' in reading) return reading.value;
  if (reading.fault === 'number') {
    return { code: 'wrong-type', expected: `a number with a decimal point and a unit such as ${unit}`, found, unit };
  }
  const wanted =
    reading.fault === 'no-unit'
      ? `a unit after the number, such as ${unit}`
      : `a unit that measures the same as ${unit}`;
  return { code: 'wrong-unit', expected: wanted, found, unit };
}

function rangeProblem(value: number, range: Range, unit: string, given: unknown): Omit<Problem, 'path'> | null {
  const found = shown(given);
  if (!Number.isFinite(value)) return { code: 'not-finite', expected: 'a finite number', found, unit };
  const { min = -LARGEST, max = LARGEST, above = -Infinity, below = Infinity } = range;
  if (value > above && value >= min && value < below && value <= max) return null;
  return {
    code: 'out-of-range',
    expected: inWords({ ...range, max: range.max ?? (value > LARGEST ? LARGEST : undefined) }),
    found,
    unit,
  };
}
