import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { InputProblem, offsetAtS } from '#libs/engine/index.js';
import { isTimeZone, localDate, zoneTable } from './time-zone.js';

const SEED = 20_260_131;
const at = (text: string) => Date.parse(text) / 1000;

/** The offset as the run-time's own long name says it, "GMT+10:30": another road than the one the table is made by. */
function offsetByName(zone: string, epochS: number): number {
  const format = new Intl.DateTimeFormat('en-US', { timeZone: zone, timeZoneName: 'longOffset' });
  const name = format.formatToParts(epochS * 1000).find((part) => part.type === 'timeZoneName')?.value ?? '';
  const parts = /^GMT(?:([+-])(\d\d):(\d\d)(?::(\d\d))?)?$/.exec(name);
  if (parts === null) throw new Error(name);
  const sizeS = Number(parts[2] ?? 0) * 3600 + Number(parts[3] ?? 0) * 60 + Number(parts[4] ?? 0);
  return parts[1] === '-' ? -sizeS : sizeS;
}

describe('the table of a zone', () => {
  it('holds the two changes of a year in Dublin, which by EU rule come at 01:00 UTC on the last Sundays of March and October', () => {
    const table = zoneTable('Europe/Dublin', at('2026-01-01T00:00Z'), at('2027-01-01T00:00Z'));
    expect(table).toEqual({
      zone: 'Europe/Dublin',
      fromS: [at('2026-01-01T00:00Z'), at('2026-03-29T01:00Z'), at('2026-10-25T01:00Z')],
      offsetS: [0, 3600, 0],
    });
  });

  it('knows that the south has its summer in January: Sydney is at +11:00 then', () => {
    const table = zoneTable('Australia/Sydney', at('2026-01-01T00:00Z'), at('2026-12-31T00:00Z'));
    expect(table.offsetS).toEqual([39_600, 36_000, 39_600]);
    // by local rule 03:00 on the first Sunday of April and 02:00 on that of October
    expect(table.fromS.slice(1)).toEqual([at('2026-04-05T03:00+11:00'), at('2026-10-04T02:00+10:00')]);
  });

  it('knows a change of half an hour: Lord Howe Island', () => {
    const table = zoneTable('Australia/Lord_Howe', at('2026-01-01T00:00Z'), at('2026-12-31T00:00Z'));
    expect(table.offsetS).toEqual([39_600, 37_800, 39_600]);
  });

  it('knows a day that was left out: Samoa had no 30 December 2011', () => {
    const table = zoneTable('Pacific/Apia', at('2011-12-01T00:00Z'), at('2012-01-31T00:00Z'));
    expect(table.offsetS).toEqual([-10 * 3600, 14 * 3600]);
    expect(localDate('Pacific/Apia', at('2011-12-30T09:59Z'))).toBe('2011-12-29');
    expect(localDate('Pacific/Apia', at('2011-12-30T10:00Z'))).toBe('2011-12-31');
  });

  it.each([
    ['UTC', 0],
    ['Z', 0],
    ['+10:00', 36_000],
    ['UTC+10', 36_000],
    ['+1030', 37_800],
    ['GMT-3', -10_800],
    ['\u221203:30', -12_600],
    ['-00:00', 0],
  ])('of the fixed offset %s has one entry, %d s', (zone, offsetS) => {
    const table = zoneTable(zone, 0, 31_536_000);
    expect(table).toEqual({ zone, fromS: [0], offsetS: [offsetS] });
    expect(Object.is(table.offsetS[0], -0)).toBe(false);
  });

  it('gives at every moment the offset the run-time names', () => {
    const zones = [
      'Europe/Dublin',
      'Europe/Berlin',
      'America/New_York',
      'America/St_Johns',
      'America/Sao_Paulo',
      'America/Santiago',
      'Australia/Adelaide',
      'Australia/Lord_Howe',
      'Pacific/Auckland',
      'Pacific/Chatham',
      'Asia/Kolkata',
      'Asia/Kathmandu',
      'Asia/Tehran',
      'Africa/Casablanca',
      'Antarctica/Troll',
    ];
    const fromS = at('2005-01-01T00:00Z');
    const toS = at('2030-01-01T00:00Z');
    const tables = new Map(zones.map((zone) => [zone, zoneTable(zone, fromS, toS)]));
    fc.assert(
      fc.property(fc.constantFrom(...zones), fc.integer({ min: fromS, max: toS }), (zone, epochS) => {
        expect(offsetAtS(tables.get(zone)!, epochS)).toBe(offsetByName(zone, epochS));
      }),
      { seed: SEED, numRuns: 3000 },
    );
    // random moments rarely fall next to a change: those are looked at one by one
    for (const [zone, table] of tables) {
      for (const epochS of table.fromS.slice(1)) {
        expect(offsetAtS(table, epochS - 1), zone).toBe(offsetByName(zone, epochS - 1));
        expect(offsetAtS(table, epochS), zone).toBe(offsetByName(zone, epochS));
      }
    }
  });

  it.each(['Europe/Nowhere', '', '+25:00', '+10:75', 'UTC+', 'Europe/Dublin\u0000', '../etc', 'x'.repeat(500)])(
    'of the unknown zone %j is refused',
    (zone) => {
      expect(isTimeZone(zone)).toBe(false);
      expect(() => zoneTable(zone, 0, 1)).toThrow(InputProblem);
    },
  );

  it.each([
    ['no number', Number.NaN, 1],
    ['an end before its beginning', 10, 0],
    ['a beginning nobody means', -1e15, 0],
    ['an end without end', 0, Number.POSITIVE_INFINITY],
  ])('over a span with %s is refused', (_what, fromS, toS) => {
    expect(() => zoneTable('UTC', fromS, toS)).toThrow(InputProblem);
  });
});
