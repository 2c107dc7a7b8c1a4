import { MAX_INTERVALS } from '../meter-format.js';
import { refuseTooLong } from '../time/stamped-rows.js';
import type { Stream, StreamDay } from './nem12-records.js';

/** A day of a stream as the file gives it: once, or in several versions. */
interface Versions {
  first: StreamDay;
  last: StreamDay;
}

/** All days of one data stream. */
export class StreamDays {
  readonly stream: Stream;
  readonly days = new Map<number, Versions>();
  duplicates = 0;
  /** days that stand in the file with different values */
  conflicts = 0;
  /** row of the first that contradicts an earlier one, 0 where none does */
  conflictRow = 0;

  constructor(stream: Stream) {
    this.stream = stream;
  }

  /**
   * Keeps a day; the same day again is dropped where it says the same, kept beside the first where it does not.
   * @param day with its quality settled
   */
  add(day: StreamDay): void {
    const known = this.days.get(day.day);
    if (known === undefined) {
      if ((this.days.size + 1) * day.values.length > MAX_INTERVALS) refuseTooLong(day.row);
      this.days.set(day.day, { first: day, last: day });
    } else if (sameValues(known.last, day)) {
      this.duplicates++;
    } else {
      this.conflicts++;
      if (this.conflictRow === 0) this.conflictRow = day.row;
      known.last = day;
    }
  }

  /**
   * A day in the version that counts.
   * @param day days since 1970-01-01
   * @param keep first or last version in the file
   */
  at(day: number, keep: 'first' | 'last'): StreamDay | undefined {
    return this.days.get(day)?.[keep];
  }
}

/**
 * The values of a day in kW, kvar, kWh or kvarh.
 * @param day with its unit
 */
export function kiloValues({ values, unit: { times, over } }: StreamDay): Float64Array {
  return values.map((value) => (value * times) / over);
}

function sameValues(one: StreamDay, other: StreamDay): boolean {
  const [a, b] = [kiloValues(one), kiloValues(other)];
  if (one.unit.energy !== other.unit.energy || a.length !== b.length) return false;
  return a.every((value, i) => value === b[i] || (Number.isNaN(value) && Number.isNaN(b[i]!)));
}
