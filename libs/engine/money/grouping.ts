import type { Selection } from './selection.js';
import { DAY_S, type TariffCalendar } from './tariff-calendar.js';

/** A selection's intervals put into groups month by month: demand blocks, or the periods of a clause. */
export interface Grouping {
  /** group of each of the selection's intervals, counted from 0 in its month */
  groupOf: Int32Array;
  /** intervals in each group, one list a month */
  sizes: Float64Array[];
  /** in which months every group is a single interval, in their order */
  single: boolean[];
  /** most groups of a month */
  most: number;
}

/** What energies are added up of. */
export interface EnergyShape {
  selection: Selection;
  /** periods of the selection, null for whole months */
  grouping: Grouping | null;
  /** length of an interval [h] */
  hours: number;
  /** the record's own active power, which no bank at its bus moves: its sums are kept; null where there is none [kW] */
  steadyKw: Float64Array | null;
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
function demandBlocks(
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
function periods(calendar: TariffCalendar, selection: Selection, per: Period): Grouping {
  const { localS } = calendar;
  const keys: Record<Period, (i: number) => number> = {
    month: () => 0,
    day: (i) => Math.floor(localS[i]! / DAY_S),
    hour: (i) => Math.floor(localS[i]! / 3600),
    interval: (i) => i,
  };
  return groupIntervals(selection, keys[per]);
}

/** The groupings of a tariff on its record's calendar, each formed once however many readings ask for it. */
export class Groupings {
  readonly calendar: TariffCalendar;
  readonly #demandS: number;
  readonly #periods = new Map<string, Grouping>();
  readonly #blocks = new Map<string, Grouping>();

  /**
   * @param calendar the record by the site's clock
   * @param demandS length of a demand block [s]
   */
  constructor(calendar: TariffCalendar, demandS: number) {
    this.calendar = calendar;
    this.#demandS = demandS;
  }

  /**
   * The periods of a selection.
   * @param selection the intervals
   * @param per length of a period
   * @returns null for whole months
   */
  periods(selection: Selection, per: Period): Grouping | null {
    if (per === 'month') return null;
    return kept(this.#periods, `${per} ${selection.key}`, () => periods(this.calendar, selection, per));
  }

  /**
   * The local days of a selection.
   * @param selection the intervals
   * @returns one group a day
   */
  days(selection: Selection): Grouping {
    return kept(this.#periods, `day ${selection.key}`, () => periods(this.calendar, selection, 'day'));
  }

  /**
   * What the energies of a selection are added up of.
   * @param selection the intervals
   * @param per length of a period
   * @returns intervals, periods, hours
   */
  energyShape(selection: Selection, per: Period): EnergyShape {
    const { intervalS, steadyKw } = this.calendar;
    return { selection, grouping: this.periods(selection, per), hours: intervalS / 3600, steadyKw };
  }

  /**
   * The demand blocks of a selection, none of which runs over the end of a period.
   * @param selection the intervals
   * @param per length of a period
   * @returns the blocks
   */
  blocks(selection: Selection, per: Period): Grouping {
    return kept(this.#blocks, `${per} ${selection.key}`, () =>
      demandBlocks(this.calendar, selection, this.#demandS, this.periods(selection, per)),
    );
  }
}

function kept(known: Map<string, Grouping>, key: string, make: () => Grouping): Grouping {
  const made = known.get(key) ?? make();
  known.set(key, made);
  return made;
}

// Groups are numbered by their first interval. Keys ascend but where the clock is set back, so the search back is short.
function groupIntervals(selection: Selection, keyOf: (i: number, k: number) => number): Grouping {
  const { intervals, monthFrom } = selection;
  const groupOf = new Int32Array(intervals.length);
  const sizes: Float64Array[] = [];
  const single: boolean[] = [];
  let most = 0;
  for (let m = 0; m + 1 < monthFrom.length; m++) {
    const [from, end] = [monthFrom[m]!, monthFrom[m + 1]!];
    const keys = new Float64Array(end - from);
    const counts = new Float64Array(end - from);
    let groups = 0;
    let highest = Number.NEGATIVE_INFINITY;
    for (let k = from; k < end; k++) {
      const key = keyOf(intervals[k]!, k);
      let group = key > highest ? -1 : keys.lastIndexOf(key, groups - 1);
      if (group < 0) {
        group = groups++;
        keys[group] = key;
        if (key > highest) highest = key;
      }
      groupOf[k] = group;
      counts[group]!++;
    }
    sizes.push(counts.slice(0, groups));
    single.push(groups === end - from);
    most = Math.max(most, groups);
  }
  return { groupOf, sizes, single, most };
}
