import type { SchemaElement } from 'hyparquet';
import type { CellText } from '../sheet/cell-text.js';
import { clockText, dateText } from '../sheet/stamp-parts.js';

/** A value as its physical type gives it. */
export type RawValue = number | bigint | Uint8Array;

/** Writes a value of a column as a cell. */
export type ValueText = (value: RawValue) => string;

const DAY_S = 86_400;
/** Years 0 … 9999. */
const FIRST_S = -62_167_219_200;
const LAST_S = 253_402_300_800;
/** Parts of a second by the format's names. */
const UNITS: Record<string, { aSecond: number; digits: number }> = {
  MILLIS: { aSecond: 1e3, digits: 3 },
  MICROS: { aSecond: 1e6, digits: 6 },
  NANOS: { aSecond: 1e9, digits: 9 },
};

const utf8 = new TextDecoder('utf-8');

/**
 * How the values of a column are written (Parquet logical types).
 * @param element the column in the schema
 * @param cells how numbers and texts are written
 * @returns null where its type holds no reading
 */
export function valueText(element: SchemaElement, cells: CellText): ValueText | null {
  const decimal = element.converted_type === 'DECIMAL' || element.logical_type?.type === 'DECIMAL';
  switch (element.type) {
    case 'BOOLEAN':
      return (value) => (value ? 'true' : 'false');
    case 'INT32':
    case 'INT64':
      return decimal ? decimalText(element) : wholeText(element);
    case 'FLOAT':
    case 'DOUBLE':
      return (value) => floatText(value as number, cells);
    case 'BYTE_ARRAY':
      return decimal ? decimalText(element) : (value) => cells.text(utf8.decode(value as Uint8Array));
    case 'FIXED_LEN_BYTE_ARRAY':
      return decimal ? decimalText(element) : null;
    default:
      return null;
  }
}

/** Not a number stands for a missing one; an infinite one is left for the reader to refuse. */
function floatText(value: number, cells: CellText): string {
  if (Number.isFinite(value)) return cells.number(value);
  return Number.isNaN(value) ? '' : String(value);
}

function wholeText(element: SchemaElement): ValueText {
  const { converted_type: converted, logical_type: logical } = element;
  const stamp = timeOf(element, 'TIMESTAMP');
  if (stamp !== null) return stampText(stamp.unit, stamp.utc);
  const clock = timeOf(element, 'TIME');
  if (clock !== null) return (value) => clockTextOf(value, clock.unit);
  if (converted === 'DATE' || logical?.type === 'DATE') return (value) => dayText(Number(value));
  const unsigned = /^UINT/.test(converted ?? '') || (logical?.type === 'INTEGER' && !logical.isSigned);
  if (!unsigned) return (value) => String(value);
  return (value) => (typeof value === 'bigint' ? String(BigInt.asUintN(64, value)) : String((value as number) >>> 0));
}

/** Unit of a stamp or a clock time; a stamp of the older naming is in UTC. */
function timeOf(element: SchemaElement, type: 'TIMESTAMP' | 'TIME'): { unit: string; utc: boolean } | null {
  const { converted_type: converted, logical_type: logical } = element;
  if (logical?.type === type) return { unit: logical.unit, utc: logical.isAdjustedToUTC };
  if (converted === `${type}_MILLIS`) return { unit: 'MILLIS', utc: true };
  return converted === `${type}_MICROS` ? { unit: 'MICROS', utc: true } : null;
}

function stampText(unit: string, utc: boolean): ValueText {
  const zone = utc ? 'Z' : '';
  return (value) => {
    const moment = split(value, unit);
    if (moment.wholeS < FIRST_S || moment.wholeS >= LAST_S) return String(value);
    const day = Math.floor(moment.wholeS / DAY_S);
    return `${dateText(day)} ${clockText(moment.wholeS - day * DAY_S)}${moment.fraction}${zone}`;
  };
}

function clockTextOf(value: RawValue, unit: string): string {
  const { wholeS, fraction } = split(value, unit);
  return wholeS >= 0 && wholeS <= DAY_S ? clockText(wholeS) + fraction : String(value);
}

/** Whole seconds, and the rest as digits behind a point; '' where there is none. */
function split(value: RawValue, unit: string): { wholeS: number; fraction: string } {
  const { aSecond, digits } = UNITS[unit] ?? UNITS.MILLIS!;
  const whole = typeof value === 'bigint' ? value : BigInt(value as number);
  const each = BigInt(aSecond);
  const rest = ((whole % each) + each) % each;
  const fraction = rest === 0n ? '' : `.${String(rest).padStart(digits, '0')}`;
  return { wholeS: Number((whole - rest) / each), fraction };
}

function dayText(day: number): string {
  return day * DAY_S >= FIRST_S && day * DAY_S < LAST_S ? dateText(day) : String(day);
}

/** A decimal number in its own digits: whole number and scale. */
function decimalText(element: SchemaElement): ValueText {
  const logical = element.logical_type;
  const scale = (logical?.type === 'DECIMAL' ? logical.scale : element.scale) ?? 0;
  return (value) => {
    const whole = value instanceof Uint8Array ? signedWhole(value) : BigInt(value);
    const digits = String(whole < 0n ? -whole : whole).padStart(scale + 1, '0');
    const point = digits.length - scale;
    const sign = whole < 0n ? '-' : '';
    return scale === 0 ? sign + digits : `${sign}${digits.slice(0, point)}.${digits.slice(point)}`;
  };
}

/** Two's complement, greatest byte first. */
function signedWhole(bytes: Uint8Array): bigint {
  let value = 0n;
  for (const byte of bytes) value = (value << 8n) | BigInt(byte);
  return BigInt.asIntN(8 * bytes.length, value);
}
