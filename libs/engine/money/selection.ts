import { InputProblem } from '../problem.js';
import { civilDate } from '../record/zone-table.js';
import type { TariffWindow } from './papers.js';
import { DAY_S, type TariffCalendar } from './tariff-calendar.js';

/** The intervals that a clause, or one of its windows, looks at. */
export interface Selection {
  /** equal for equal choices of windows */
  key: string;
  /** indices into the record, ascending */
  intervals: Int32Array;
  /** place in `intervals` at which each month begins; one more than there are months */
  monthFrom: Int32Array;
}

/** Which windows a selection is made of. */
export interface SelectedWindows {
  /** intervals in any of these; null means all */
  union: readonly string[] | null;
  /** and in this one; null means all */
  within: string | null;
}

/** Everything. */
export const ALWAYS: SelectedWindows = { union: null, within: null };

/** The intervals of each named window, and selections made of them. */
export class WindowMasks {
  readonly #calendar: TariffCalendar;
  readonly #masks = new Map<string, Uint8Array>();
  readonly #selections = new Map<string, Selection>();

  constructor(calendar: TariffCalendar, windows: readonly TariffWindow[]) {
    this.#calendar = calendar;
    for (const window of windows) this.#masks.set(window.name, windowMask(calendar, window));
  }

  /**
   * The intervals of a choice of windows; equal choices share one selection.
   * @param chosen names of windows
   * @returns the selection
   */
  selection(chosen: SelectedWindows): Selection {
    const key = JSON.stringify([chosen.union === null ? null : [...chosen.union].sort(), chosen.within]);
    const known = this.#selections.get(key);
    if (known !== undefined) return known;
    const made = this.#make(key, chosen);
    this.#selections.set(key, made);
    return made;
  }

  #make(key: string, chosen: SelectedWindows): Selection {
    const { months, localS } = this.#calendar;
    const union = chosen.union?.map((name) => this.#mask(name)) ?? null;
    const within = chosen.within === null ? null : this.#mask(chosen.within);
    const intervals = new Int32Array(localS.length);
    const monthFrom = new Int32Array(months.length + 1);
    let count = 0;
    for (const [m, month] of months.entries()) {
      monthFrom[m] = count;
      for (let i = month.from; i < month.end; i++) {
        if (within !== null && within[i] === 0) continue;
        if (union !== null && !isInAny(union, i)) continue;
        intervals[count++] = i;
      }
    }
    monthFrom[months.length] = count;
    return { key, intervals: intervals.subarray(0, count), monthFrom };
  }

  #mask(name: string): Uint8Array {
    const mask = this.#masks.get(name);
    if (mask === undefined) throw new Error(`no window of the name ${name}`);
    return mask;
  }

  /**
   * Prices by window share out a clause's intervals: each is in exactly one of them.
   * @param selection the clause's intervals
   * @param names windows that have a price
   * @param clause months the clause holds in, and its path for the refusal
   * @throws InputProblem naming the clause and the first moment that is in none or several
   */
  requirePartition(
    selection: Selection,
    names: readonly string[],
    clause: { months: readonly number[] | undefined; path: string },
  ): void {
    const masks = names.map((name) => this.#mask(name));
    for (const [m, month] of this.#calendar.months.entries()) {
      if (clause.months !== undefined && !clause.months.includes(month.month)) continue;
      for (let k = selection.monthFrom[m]!; k < selection.monthFrom[m + 1]!; k++) {
        const i = selection.intervals[k]!;
        let count = 0;
        for (let w = 0; w < masks.length; w++) count += masks[w]![i]!;
        if (count === 1) continue;
        const holding = names.filter((_, w) => masks[w]![i] === 1);
        throw new InputProblem([
          {
            code: 'inconsistent',
            path: `${clause.path}.prices`,
            expected: 'exactly one window at every moment',
            found: `${holding.length === 0 ? 'none' : holding.join(' and ')} at ${moment(this.#calendar.localS[i]!)}`,
          },
        ]);
      }
    }
  }
}

function isInAny(masks: readonly Uint8Array[], i: number): boolean {
  for (let w = 0; w < masks.length; w++) if (masks[w]![i] === 1) return true;
  return false;
}

function windowMask(calendar: TariffCalendar, window: TariffWindow): Uint8Array {
  const { localS, dayKind, months } = calendar;
  const mask = new Uint8Array(localS.length);
  const ranges = window.hours ?? null;
  for (const { month, from, end } of months) {
    if (window.months !== undefined && !window.months.includes(month)) continue;
    for (let i = from; i < end; i++) {
      if (window.days !== undefined && !window.days.includes(dayKind[i]!)) continue;
      const hour = (localS[i]! - Math.floor(localS[i]! / DAY_S) * DAY_S) / 3600;
      if (ranges === null || inAnyRange(ranges, hour)) mask[i] = 1;
    }
  }
  return mask;
}

function inAnyRange(ranges: readonly (readonly [number, number])[], hour: number): boolean {
  for (const [from, to] of ranges) {
    if (from > to ? hour >= from || hour < to : hour >= from && hour < to) return true;
  }
  return false;
}

function moment(localS: number): string {
  const day = Math.floor(localS / DAY_S);
  const date = civilDate(day);
  const minutes = Math.floor((localS - day * DAY_S) / 60);
  const two = (value: number): string => String(value).padStart(2, '0');
  return `${date.year}-${two(date.month)}-${two(date.day)} ${two(Math.floor(minutes / 60))}:${two(minutes % 60)}`;
}
