import { zoneTable } from '#libs/contract/time-zone.js';
import { InputProblem, offsetAtS, type ZoneTable } from '#libs/engine/index.js';

const YEAR_S = 366 * 86_400;
const HOUR_S = 3600;
const MOST_PROBLEMS = 20;

/** Clock times of rows, each with its flag: 1 where the clocks show summer time. */
export interface SeasonRows {
  clock: Float64Array;
  summer: Float64Array;
  rowNumber: Int32Array;
}

/**
 * Moments of rows that say by a flag whether their clock shows summer time; that tells the passes of a doubled hour apart.
 * @param rows clock times and flags
 * @param zone IANA name or offset of the clock; null where nobody says, then standard time is taken for UTC
 * @returns UTC, one a row [s], and the zone's offsets
 * @throws InputProblem where a flag contradicts the zone, naming the row
 */
export function seasonTimes(rows: SeasonRows, zone: string | null): { utcS: Float64Array; table: ZoneTable } {
  const { clock, summer, rowNumber } = rows;
  let fromS = Number.POSITIVE_INFINITY;
  let toS = Number.NEGATIVE_INFINITY;
  for (const localS of clock) {
    fromS = Math.min(fromS, localS);
    toS = Math.max(toS, localS);
  }
  // a year on both sides shows both offsets, whatever season the rows are of
  const table = zoneTable(zone ?? 'UTC', fromS - YEAR_S, toS + YEAR_S);
  const standardS = Math.min(...table.offsetS);
  const summerS = zone === null ? standardS + HOUR_S : Math.max(...table.offsetS);
  const utcS = clock.map((localS, i) => localS - (summer[i] === 1 ? summerS : standardS));
  if (zone === null) return { utcS, table };
  const wrong: number[] = [];
  for (let i = 0; i < utcS.length && wrong.length < MOST_PROBLEMS; i++) {
    const offsetS = clock[i]! - utcS[i]!;
    const isShown = offsetAtS(table, utcS[i]!) === offsetS || offsetAtS(table, utcS[i]! - 1) === offsetS;
    if (!isShown || (summer[i] === 1 && summerS === standardS)) wrong.push(i);
  }
  if (wrong.length === 0) return { utcS, table };
  throw new InputProblem(
    wrong.map((i) => ({
      code: 'bad-time' as const,
      row: rowNumber[i]!,
      column: 2,
      expected: `the flag of the season that the clocks of ${zone} showed`,
      found: String(summer[i]),
    })),
  );
}
