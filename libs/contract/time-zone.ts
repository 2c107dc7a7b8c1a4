import { InputProblem, localTime, type ZoneTable } from '#libs/engine/index.js';
import { shown } from './shown.js';

const DAY_S = 86_400;
const RECORD_MARGIN_S = 40 * DAY_S;
const LONGEST_SPAN_S = 400 * 366 * DAY_S;
/** The calendar used is the Gregorian one; moments before it and after four-digit years are refused. */
const EARLIEST_S = Date.UTC(1600, 0, 1) / 1000;
const LATEST_S = Date.UTC(9999, 0, 1) / 1000;
const FIXED_OFFSET = /^(?:UTC|GMT)?([+\-−])(\d{1,2})(?::?([0-5]\d))?$/;
const LOCAL_PARTS = /^(\d+)\/(\d+)\/(\d+), (\d+):(\d+):(\d+)$/;

/**
 * The offsets of a zone over a span, as data. A change of offset is found by looking once a day and halving to the second.
 * @param zone IANA name, "UTC", or a fixed offset such as "+10:00" or "UTC+10"
 * @param fromS beginning of the span, UTC [s]
 * @param toS end of the span [s]
 * @returns the table, its first entry at `fromS`
 * @throws InputProblem where the zone is unknown or the span is impossible
 */
export function zoneTable(zone: string, fromS: number, toS: number): ZoneTable {
  const firstS = Math.floor(fromS);
  const lastS = Math.ceil(toS);
  if (!(firstS >= EARLIEST_S && lastS <= LATEST_S && firstS <= lastS && lastS - firstS <= LONGEST_SPAN_S)) {
    const found = `${fromS} to ${toS}`;
    throw new InputProblem([
      { code: 'out-of-range', expected: 'times within 400 years, 1600 to 9998', found, unit: 's' },
    ]);
  }
  const fixedS = fixedOffsetS(zone);
  if (fixedS !== null) return { zone, fromS: [firstS], offsetS: [fixedS] };
  return scannedTable(zone, firstS, lastS);
}

/**
 * The table a record's months are found by: its own span and more than a month on either side.
 * Whoever hashes a plan's inputs takes this one, so that equal inputs have equal hashes.
 * @param zone IANA name, "UTC", or a fixed offset
 * @param record a load record
 * @returns the table
 */
export function zoneTableOf(zone: string, record: { firstS: number; endS: number }): ZoneTable {
  return zoneTable(zone, record.firstS - RECORD_MARGIN_S, record.endS + RECORD_MARGIN_S);
}

/**
 * Whether a text names a zone that `zoneTable` takes.
 * @param zone IANA name, "UTC", or a fixed offset
 */
export function isTimeZone(zone: string): boolean {
  return fixedOffsetS(zone) !== null || clockOf(zone) !== null;
}

/**
 * The local calendar date at a moment.
 * @param zone IANA name, "UTC", or a fixed offset
 * @param epochS UTC [s]
 * @returns "2026-01-31"
 */
export function localDate(zone: string, epochS: number): string {
  const { year, month, day } = localTime(zoneTable(zone, epochS, epochS), Math.floor(epochS));
  return `${String(year).padStart(4, '0')}-${String(month).padStart(2, '0')}-${String(day).padStart(2, '0')}`;
}

function fixedOffsetS(zone: string): number | null {
  if (zone === 'UTC' || zone === 'Z') return 0;
  const parts = FIXED_OFFSET.exec(zone);
  if (parts === null) return null;
  const [, sign, hours, minutes = '0'] = parts;
  const offsetS = Number(hours) * 3600 + Number(minutes) * 60;
  if (offsetS > 18 * 3600) return null;
  return sign === '+' || offsetS === 0 ? offsetS : -offsetS;
}

function scannedTable(zone: string, firstS: number, lastS: number): ZoneTable {
  const clock = clockOf(zone);
  if (clock === null) {
    const expected = 'a time zone such as "Europe/Dublin", "UTC" or "+10:00"';
    throw new InputProblem([{ code: 'out-of-range', path: 'timeZone', expected, found: shown(zone) }]);
  }
  const table: ZoneTable = { zone, fromS: [firstS], offsetS: [offsetS(clock, firstS)] };
  let atS = firstS;
  let hereS = table.offsetS[0]!;
  while (atS < lastS) {
    const nextS = Math.min(atS + DAY_S, lastS);
    const thereS = offsetS(clock, nextS);
    if (thereS !== hereS) {
      table.fromS.push(changeBetween(clock, atS, nextS));
      table.offsetS.push(thereS);
      hereS = thereS;
    }
    atS = nextS;
  }
  return table;
}

/** First second at which the offset is no longer that of `atS`. */
function changeBetween(clock: Intl.DateTimeFormat, atS: number, nextS: number): number {
  const beforeS = offsetS(clock, atS);
  let low = atS;
  let high = nextS;
  while (high - low > 1) {
    const middle = Math.floor((low + high) / 2);
    if (offsetS(clock, middle) === beforeS) low = middle;
    else high = middle;
  }
  return high;
}

const clocks = new Map<string, Intl.DateTimeFormat | null>();

/** Building a clock takes a few milliseconds, reading it a few microseconds; names that fail are not kept. */
function clockOf(zone: string): Intl.DateTimeFormat | null {
  const known = clocks.get(zone);
  if (known !== undefined) return known;
  // a name, never an offset of another spelling: those are read above, the same way whatever the run-time does
  if (!/^[A-Za-z][A-Za-z0-9_+\-/]{0,63}$/.test(zone)) return null;
  try {
    const clock = new Intl.DateTimeFormat('en-US', {
      timeZone: zone,
      calendar: 'gregory',
      numberingSystem: 'latn',
      hourCycle: 'h23',
      year: 'numeric',
      month: 'numeric',
      day: 'numeric',
      hour: 'numeric',
      minute: 'numeric',
      second: 'numeric',
    });
    clocks.set(zone, clock);
    return clock;
  } catch {
    return null;
  }
}

function offsetS(clock: Intl.DateTimeFormat, epochS: number): number {
  const parts = LOCAL_PARTS.exec(clock.format(epochS * 1000));
  if (parts === null) throw new Error(`the run-time wrote a date in an unknown form at ${epochS}`);
  const [month, day, year, hour, minute, second] = parts.slice(1).map(Number) as [
    number,
    number,
    number,
    number,
    number,
    number,
  ];
  return Date.UTC(year, month - 1, day, hour, minute, second) / 1000 - epochS;
}
