import type { LoadRecord } from './load-record.js';
import { offsetAtS, type ZoneTable } from './zone-table.js';

/** The columns of a record as its meter gave them, before anything was filled in. */
export type MeteredColumns = Pick<
  LoadRecord,
  'intervalS' | 'beginS' | 'activeKw' | 'laggingKvar' | 'leadingKvar' | 'voltageV'
>;

/** A record by the hour: one entry an hour that has a value, or one an interval where those are longer. */
export interface HourlyLoad {
  /** beginning of the hour, UTC [s] */
  beginS: Float64Array;
  activeKw: Float64Array;
  /** lagging − leading [kvar] */
  reactiveKvar: Float64Array;
  voltageV: Float64Array | null;
  /** local clock, 0 … 23 */
  hour: Uint8Array;
  /** local days since 1970-01-01 */
  day: Int32Array;
}

const HOUR_S = 3600;

/**
 * Means of a record by the hour.
 * @param columns as metered
 * @param zone the site's zone
 * @returns columns of one length
 */
export function hourlyLoad(columns: MeteredColumns, zone: ZoneTable): HourlyLoad {
  const { beginS, intervalS, activeKw, laggingKvar, leadingKvar, voltageV } = columns;
  const n = beginS.length;
  const stepS = Math.max(HOUR_S, intervalS);
  const most = n === 0 ? 0 : Math.min(n, Math.ceil((beginS[n - 1]! - beginS[0]!) / stepS) + 2);
  const load: HourlyLoad = {
    beginS: new Float64Array(most),
    activeKw: new Float64Array(most),
    reactiveKvar: new Float64Array(most),
    voltageV: voltageV === null ? null : new Float64Array(most),
    hour: new Uint8Array(most),
    day: new Int32Array(most),
  };
  let hours = 0;
  let i = 0;
  while (i < n) {
    const fromS = Math.floor(beginS[i]! / HOUR_S) * HOUR_S;
    const untilS = fromS + stepS;
    const first = i;
    let kw = 0;
    let kvar = 0;
    for (; i < n && beginS[i]! < untilS; i++) {
      kw += activeKw[i]!;
      kvar += laggingKvar[i]! - leadingKvar[i]!;
    }
    load.beginS[hours] = fromS;
    load.activeKw[hours] = kw / (i - first);
    load.reactiveKvar[hours] = kvar / (i - first);
    if (voltageV !== null && load.voltageV !== null) load.voltageV[hours] = meanOf(voltageV, first, i);
    const localS = fromS + offsetAtS(zone, fromS);
    const day = Math.floor(localS / 86_400);
    load.day[hours] = day;
    load.hour[hours] = Math.floor((localS - day * 86_400) / HOUR_S);
    hours++;
  }
  return firstHours(load, hours);
}

function meanOf(values: Float64Array, from: number, to: number): number {
  let sum = 0;
  for (let i = from; i < to; i++) sum += values[i]!;
  return sum / (to - from);
}

function firstHours(load: HourlyLoad, hours: number): HourlyLoad {
  return {
    beginS: load.beginS.slice(0, hours),
    activeKw: load.activeKw.slice(0, hours),
    reactiveKvar: load.reactiveKvar.slice(0, hours),
    voltageV: load.voltageV?.slice(0, hours) ?? null,
    hour: load.hour.slice(0, hours),
    day: load.day.slice(0, hours),
  };
}
