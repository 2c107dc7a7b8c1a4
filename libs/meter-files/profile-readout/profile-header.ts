import { shown } from '#libs/contract/shown.js';
import { dayNumber, type Problem } from '#libs/engine/index.js';
import { type ReadUnit, readUnit } from '../csv/unit-text.js';
import { type ObisQuantity, obisQuantity } from '../obis/obis-quantity.js';
import { isDate } from '../time/date-orders.js';

/** What a column of a load profile holds. */
export interface ProfileColumn {
  code: string;
  /** null where a record has no use for it */
  found: ObisQuantity | null;
  unit: ReadUnit | null;
}

/** The head of a stretch of intervals: P.01(time)(status)(minutes)(columns)(code)(unit)(code)(unit)… */
export interface ProfileHeader {
  /** the meter's clock at the end of the first interval [s] */
  clockS: number;
  season: Season;
  intervalS: number;
  /** the status word is not zero */
  flagged: boolean;
  columns: ProfileColumn[];
}

/** What the clock showed: standard time, summer time, UTC, or not said. */
export type Season = 'standard' | 'summer' | 'utc' | null;

const SEASONS: Record<string, Season> = { 0: 'standard', 1: 'summer', 2: 'utc' };
const MOST_COLUMNS = 32;
const LONGEST_MINUTES = 60;

/**
 * Reads the head of a stretch.
 * @param groups what stands between its brackets
 * @param row of the file
 * @returns the head, or what is wrong with it
 */
export function readProfileHeader(groups: readonly string[], row: number): ProfileHeader | Problem {
  const [stamp = '', status = '', minutes = '', count = '', ...rest] = groups;
  const time = readClock(stamp);
  if (time === null) {
    const expected = 'a time as YYMMDDhhmm or YYMMDDhhmmss, with or without the season before it';
    return { code: 'bad-time', row, column: 1, expected, found: shown(stamp) };
  }
  const length = Number(minutes);
  if (!Number.isInteger(length) || length < 1 || length > LONGEST_MINUTES) {
    const expected = `an interval of 1 to ${LONGEST_MINUTES} minutes`;
    return { code: 'out-of-range', row, column: 3, expected, found: shown(minutes), unit: 'min' };
  }
  const width = Number(count);
  if (!Number.isInteger(width) || width < 1 || width > MOST_COLUMNS || rest.length < 2 * width) {
    const expected = 'the number of columns, and a code and a unit for each';
    return { code: 'wrong-length', row, column: 4, expected, found: `${shown(count)} and ${rest.length} cells` };
  }
  const columns: ProfileColumn[] = [];
  for (let k = 0; k < width; k++) {
    const column = readColumn(rest[2 * k]!, rest[2 * k + 1]!);
    if (column !== null) columns.push(column);
    else return { code: 'wrong-unit', row, column: 6 + 2 * k, ...unitWanted(rest[2 * k]!, rest[2 * k + 1]!) };
  }
  return { ...time, intervalS: length * 60, flagged: /[1-9a-f]/i.test(status), columns };
}

/** The cells behind the columns of a head: values of its first interval, where they follow in the same line. */
export function valuesBehind(groups: readonly string[], { columns }: ProfileHeader): readonly string[] {
  return groups.slice(4 + 2 * columns.length);
}

function readColumn(code: string, unitText: string): ProfileColumn | null {
  const found = obisQuantity(code);
  const unit = readUnit(unitText);
  if (found === null) return { code, found, unit };
  const family = familyOf(found);
  if (unit === null || unit.family !== family || (found.cumulative && !unit.energy)) return null;
  return { code, found, unit };
}

function familyOf({ quantity }: ObisQuantity): 'active' | 'reactive' {
  return quantity === 'active' || quantity === 'exported' ? 'active' : 'reactive';
}

function unitWanted(code: string, unitText: string): { expected: string; found: string } {
  const active = familyOf(obisQuantity(code)!) === 'active';
  const expected = `${active ? 'kW or kWh' : 'kvar or kvarh'}, in any prefix, for ${code}`;
  return { expected, found: shown(unitText) };
}

/** Ten or twelve digits are a time, one more before them the season. */
function readClock(stamp: string): { clockS: number; season: Season } | null {
  if (!/^\d{10,13}$/.test(stamp)) return null;
  const odd = stamp.length % 2 === 1;
  const season = odd ? SEASONS[stamp[0]!] : null;
  if (season === undefined) return null;
  const parts = (odd ? stamp.slice(1) : stamp).match(/\d\d/g)!.map(Number);
  const [year = 0, month = 0, day = 0, hours = 0, minutes = 0, seconds = 0] = parts;
  const date = { year: 2000 + year, month, day };
  if (!isDate(date) || hours > 24 || minutes > 59 || seconds > 59) return null;
  if (hours === 24 && minutes + seconds > 0) return null;
  return { clockS: dayNumber(date.year, month, day) * 86_400 + hours * 3600 + minutes * 60 + seconds, season };
}
