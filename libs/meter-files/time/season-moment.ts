import { zoneTable } from '#libs/contract/time-zone.js';
import { offsetAtS, type ZoneTable } from '#libs/engine/index.js';

const YEAR_S = 366 * 86_400;
const HOUR_S = 3600;

/** What a meter's clock may show: a zone's standard time and its summer time. */
export interface SeasonClock {
  table: ZoneTable;
  /** the zone was said; else standard time is taken for UTC */
  said: boolean;
  /** local time less UTC [s] */
  standardS: number;
  summerS: number;
}

/**
 * The clock of a meter that says with its stamps whether it shows summer time.
 * @param zone IANA name or offset; null where nobody says
 * @param clockS what it showed, at least once [s]
 */
export function seasonClock(zone: string | null, clockS: Iterable<number>): SeasonClock {
  let fromS = Number.POSITIVE_INFINITY;
  let toS = Number.NEGATIVE_INFINITY;
  for (const shownS of clockS) {
    fromS = Math.min(fromS, shownS);
    toS = Math.max(toS, shownS);
  }
  // a year on both sides shows both offsets, whatever season the stamps are of
  const table = zoneTable(zone ?? 'UTC', fromS - YEAR_S, toS + YEAR_S);
  const standardS = Math.min(...table.offsetS);
  const summerS = zone === null ? standardS + HOUR_S : Math.max(...table.offsetS);
  return { table, said: zone !== null, standardS, summerS };
}

/**
 * The moment at which a clock showed a time; in a doubled hour summer time is the first pass and standard time the second.
 * @param clockS what the clock showed [s]
 * @param summer whether it says that this is summer time
 * @param clock standard and summer time of its zone
 * @returns UTC [s]; null where the zone's clocks never showed that time in that season
 */
export function seasonMoment(clockS: number, summer: boolean, clock: SeasonClock): number | null {
  const { table, said, standardS, summerS } = clock;
  const offsetS = summer ? summerS : standardS;
  const momentS = clockS - offsetS;
  if (!said) return momentS;
  if (summer && summerS === standardS) return null;
  // an interval that ends as the clock changes may be stamped in the old time
  const isShown = offsetAtS(table, momentS) === offsetS || offsetAtS(table, momentS - 1) === offsetS;
  return isShown ? momentS : null;
}
