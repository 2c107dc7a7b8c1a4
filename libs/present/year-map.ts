import { civilDate, localTime, offsetAtS, type ZoneTable } from '#libs/engine/index.js';
import type { ChartTable } from './chart.js';
import { formatNumber, formatQuantity } from './format-number.js';
import { monthLetters } from './local-stamp.js';

/** Inks between nothing and the most. */
const STEPS = 7;
const DAY_S = 86_400;
/** Steps that read well, in a power of ten. */
const ROUND = [1, 1.5, 2, 2.5, 3, 4, 5, 6, 8, 10];

/** A record by day and hour, as data: what a cell holds is a step of ink. */
export interface YearMap {
  id: string;
  finding: string;
  caption: string;
  sentence: string;
  /** what a cell shows */
  measure: string;
  unit: string;
  days: number;
  /** [day · 24 + hour]: step 0 … 6; GAP_CELL without a reading; BEYOND_CELL over `beyond` */
  cells: Uint8Array;
  /** lower ends of the steps and the end of the last */
  bounds: number[];
  /** months as stretches of days */
  months: { name: string; from: number; to: number }[];
  /** what lies over this is drawn in full ink */
  beyond: number | null;
  table: ChartTable;
}

export const GAP_CELL = 254;
export const BEYOND_CELL = 255;

/** What a map is made from; columns of length n. */
export interface YearMapParts {
  id: string;
  measure: string;
  unit: string;
  caption: string;
  beginS: Float64Array;
  intervalS: number;
  values: Float64Array;
  zone: ZoneTable;
  beyond: number | null;
  /** heading, from the greatest value and the share of hours without a reading */
  finding(facts: { most: number; gapPct: number; beyondHours: number }): string;
  table: ChartTable;
}

/**
 * Days across, hours of the day down, the greatest value of each hour: shifts, seasons and gaps at once.
 * @param parts columns and words
 * @returns the map
 */
export function yearMap(parts: YearMapParts): YearMap {
  const { beginS, values, zone } = parts;
  const dayOf = (s: number) => Math.floor((s + offsetAtS(zone, s)) / DAY_S);
  const firstDay = dayOf(beginS[0]!);
  const days = dayOf(beginS.at(-1)!) - firstDay + 1;
  const greatest = new Float64Array(days * 24).fill(Number.NaN);
  for (let i = 0; i < beginS.length; i++) {
    const localS = beginS[i]! + offsetAtS(zone, beginS[i]!);
    const day = Math.floor(localS / DAY_S);
    const at = (day - firstDay) * 24 + Math.floor((localS - day * DAY_S) / 3600);
    if (!(greatest[at]! >= values[i]!)) greatest[at] = values[i]!;
  }
  const stands = hoursOfRecord(parts, { firstDay, days });
  // An hour that the clock leaves out is none without a reading.
  const [begin, end] = [stands.indexOf(1), stands.lastIndexOf(1)];
  for (let at = begin + 1; at < end; at++) if (stands[at] === 0) greatest[at] = greatest[at - 1]!;
  const most = greatest.reduce((top, value) => (Number.isNaN(value) ? top : Math.max(top, value)), 0);
  const bounds = boundsOf(parts.beyond === null || parts.beyond <= 0 ? most : Math.min(most, parts.beyond));
  const cells = Uint8Array.from(greatest, (value) => cellOf(value, bounds, parts.beyond));
  const { id, measure, unit, caption, beyond, table } = parts;
  const hours = countOf(stands, () => true);
  const facts = {
    most,
    gapPct: (100 * countOf(stands, (at) => cells[at] === GAP_CELL)) / hours,
    beyondHours: countOf(stands, (at) => cells[at] === BEYOND_CELL),
  };
  return {
    ...{ id, measure, unit, caption, beyond, table, days, cells, bounds },
    finding: parts.finding(facts),
    sentence:
      `${measure} by day and hour over ${days} days: at the most ${formatQuantity(most, unit)}; ` +
      `${facts.gapPct === 0 ? 'no hour is' : `${formatQuantity(facts.gapPct, '%')} of the hours are`} without a reading.`,
    months: monthsOf(firstDay, days),
  };
}

/** 1 for each cell whose hour the record reaches and the clock has. */
function hoursOfRecord(
  { beginS, zone }: YearMapParts,
  { firstDay, days }: { firstDay: number; days: number },
): Uint8Array {
  const stands = new Uint8Array(days * 24);
  // Half hours reach every hour of a clock that is moved by half an hour.
  for (let s = beginS[0]!; s <= beginS.at(-1)!; s += 1800) {
    const localS = s + offsetAtS(zone, s);
    stands[Math.floor(localS / 3600) - firstDay * 24] = 1;
  }
  return stands;
}

function countOf(stands: Uint8Array, counts: (at: number) => boolean): number {
  return stands.reduce((sum, stood, at) => (stood === 1 && counts(at) ? sum + 1 : sum), 0);
}

function boundsOf(most: number): number[] {
  const raw = Math.max(most, 1e-9) / STEPS;
  const power = 10 ** Math.floor(Math.log10(raw));
  const step = (ROUND.find((factor) => factor * power >= raw * (1 - 1e-9)) ?? 10) * power;
  const bounds = [];
  for (let n = 0; n < STEPS && n * step < most; n++) bounds.push(n * step);
  return [...bounds, most];
}

function cellOf(value: number, bounds: readonly number[], beyond: number | null): number {
  if (Number.isNaN(value)) return GAP_CELL;
  if (beyond !== null && value > beyond * (1 + 1e-12)) return BEYOND_CELL;
  const step = bounds.findLastIndex((bound) => value >= bound);
  return Math.max(0, Math.min(step, bounds.length - 2));
}

function monthsOf(firstDay: number, days: number): YearMap['months'] {
  const months: YearMap['months'] = [];
  let last = '';
  for (let day = 0; day < days; day++) {
    const { year, month } = civilDate(firstDay + day);
    const name = `${year}-${String(month).padStart(2, '0')}`;
    if (name !== last) months.push({ name: monthLetters(name), from: day, to: days });
    if (name !== last && months.length > 1) months[months.length - 2]!.to = day;
    last = name;
  }
  return months;
}

/**
 * A cell's day and hour by the record's clock.
 * @param zone the site's offsets
 * @param beginS beginning of the record [s]
 * @param day days from the record's first
 * @returns UTC [s] of about the local noon of that day
 */
export function noonOfDayS(zone: ZoneTable, beginS: number, day: number): number {
  return beginS - localTime(zone, beginS).secondOfDay + (day + 0.5) * DAY_S;
}

/**
 * Ends of the steps as text, for the legend.
 * @param map the map
 * @returns one text a bound
 */
export function legendOf(map: YearMap): string[] {
  return map.bounds.map((bound, at) => formatNumber(bound, at < map.bounds.length - 1 ? 'given' : 'computed'));
}
