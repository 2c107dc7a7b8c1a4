import { shown } from '#libs/contract/shown.js';
import { InputProblem } from '#libs/engine/index.js';
import type { ReadingType } from '../reading-type/reading-type.js';

const ATTRIBUTES = 18;

/** Seconds of the measuring periods that are intervals; rolling blocks are none. */
const PERIODS_S = new Map([
  [1, 600],
  [2, 900],
  [3, 60],
  [4, 86_400],
  [5, 1800],
  [6, 300],
  [7, 3600],
  [10, 120],
  [14, 180],
  [31, 1200],
  [50, 3600],
  [51, 1800],
  [52, 1200],
  [53, 900],
  [54, 600],
  [55, 300],
  [56, 60],
]);

/** A reading type as a message names it. */
export interface CimType {
  type: ReadingType;
  /** NaN where the type names no interval [s] */
  intervalS: number;
}

/**
 * Reads the name of a reading type: eighteen codes with dots between them, of period, aggregate, measuring period,
 * accumulation, flow direction, commodity, kind, harmonic (two), argument (two), tariff period, critical peak, tier, phases,
 * power of ten, unit and currency.
 * @param ref the name
 * @param place where it stands
 * @throws InputProblem where it is no such name
 */
export function readCimType(ref: string, { row, column }: { row: number; column: number }): CimType {
  const codes = /^-?\d{1,5}(?:\.-?\d{1,5})*$/.test(ref) ? ref.split('.').map(Number) : [];
  if (codes.length !== ATTRIBUTES) {
    const expected = `a reading type of ${ATTRIBUTES} codes with dots between them`;
    throw new InputProblem([{ code: 'unreadable', row, column, expected, found: shown(ref) }]);
  }
  const at = (attribute: number) => codes[attribute - 1]!;
  const power = at(16);
  if (power < -12 || power > 12) {
    const expected = 'a power of ten from -12 to 12 as the 16th code of the reading type';
    throw new InputProblem([{ code: 'out-of-range', row, column, expected, found: `${power}` }]);
  }
  const type = {
    macroPeriod: at(1),
    qualifier: at(2),
    accumulation: at(4),
    flowDirection: at(5),
    commodity: at(6),
    measurementKind: at(7),
    partial: [at(8), at(12), at(13), at(14)].some((code) => code !== 0),
    phase: at(15),
    power,
    unit: at(17),
  };
  return { type, intervalS: PERIODS_S.get(at(3)) ?? Number.NaN };
}
