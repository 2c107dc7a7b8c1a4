import type { Selection } from './selection.js';
import { DAY_S, type TariffCalendar } from './tariff-calendar.js';

/** A selection's intervals put into groups month by month: demand blocks, or the periods of a clause. */
export interface Grouping {
  /** group of each of the selection's intervals, counted from 0 in its month */
  groupOf: Int32Array;
  /** intervals in each group, one list a month */
  sizes: Float64Array[];
  /** every group is a single interval */
  single: boolean;
  /** most groups of a month */
  most: number;
}

/** The periods a clause may be formed over. */
export type Period = 'month' | 'day' | 'hour' | 'interval';

/**
 * Blocks of the local clock, counted from local midnight; the doubled hour of an autumn night shares its blocks. A
 * block that runs over the end of a period is cut there.
 * @param calendar the record by the site's clock
 * @param selection the intervals to be grouped
 * @param blockS length of a block [s]
 * @param within periods of the same selection, null for whole months
 * @returns the grouping
 * @source method-money
 */
export function demandBlocks(
  calendar: TariffCalendar,
  selection: Selection,
  blockS: number,
  within: Grouping | null,
): Grouping {
  const perDay = Math.ceil(DAY_S / blockS);
  const days = Math.ceil(Math.abs(calendar.localS[calendar.localS.length - 1] ?? 0) / DAY_S) + 2;
  return groupIntervals(selection, (i, k) => {
    const local = calendar.localS[i]!;
    const day = Math.floor(local / DAY_S);
    const block = day * perDay + Math.floor((local - day * DAY_S) / blockS);
    return within === null ? block : within.groupOf[k]! * days * perDay + block;
  });
}

/**
 * The periods of a clause: months, local days, hours of the local clock, or single intervals.
 * @param calendar the record by the site's clock
 * @param selection the intervals to be grouped
 * @param per length of a period
 * @returns the grouping
 * @source method-money
 */
export function periods(calendar: TariffCalendar, selection: Selection, per: Period): Grouping {
  const { localS } = calendar;
  const keys: Record<Period, (i: number) => number> = {
    month: () => 0,
    day: (i) => Math.floor(localS[i]! / DAY_S),
    hour: (i) => Math.floor(localS[i]! / 3600),
    interval: (i) => i,
  };
  return groupIntervals(selection, keys[per]);
}

// Groups are numbered by their first interval. Keys ascend but where the clock is set back, so the search back is short.
function groupIntervals(selection: Selection, keyOf: (i: number, k: number) => number): Grouping {
  const { intervals, monthFrom } = selection;
  const groupOf = new Int32Array(intervals.length);
  const sizes: Float64Array[] = [];
  let most = 0;
  let single = true;
  for (let m = 0; m + 1 < monthFrom.length; m++) {
    const keys: number[] = [];
    const counts: number[] = [];
    let highest = Number.NEGATIVE_INFINITY;
    for (let k = monthFrom[m]!; k < monthFrom[m + 1]!; k++) {
      const key = keyOf(intervals[k]!, k);
      let group = key > highest ? -1 : keys.lastIndexOf(key);
      if (group < 0) {
        group = keys.push(key) - 1;
        counts.push(0);
        highest = Math.max(highest, key);
      }
      groupOf[k] = group;
      counts[group]!++;
      if (counts[group]! > 1) single = false;
    }
    sizes.push(Float64Array.from(counts));
    most = Math.max(most, keys.length);
  }
  return { groupOf, sizes, single, most };
}
