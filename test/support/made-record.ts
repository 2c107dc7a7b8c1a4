import { createLoadRecord, type LoadRecord } from '#libs/engine/index.js';
import type { Chance } from './chance.js';

/** 2025-01-01 00:00 UTC. */
export const FIRST_S = Date.UTC(2025, 0, 1) / 1000;

/** Columns of a record as plain lists; one reactive column, lagging > 0. */
export interface MadeColumns {
  activeKw: readonly number[];
  reactiveKvar: readonly number[];
  intervalS?: number;
  /** grid slot of each interval; 0, 1, 2 … where absent */
  slots?: readonly number[];
  firstS?: number;
  voltageV?: readonly number[];
  connectedKvar?: readonly number[];
  standby?: readonly number[];
}

/**
 * A record from lists, its signed reactive column split as a reader splits it.
 * @param columns the lists, all of one length
 * @returns the record
 */
export function madeRecord(columns: MadeColumns): LoadRecord {
  const { activeKw, reactiveKvar, intervalS = 900, firstS = FIRST_S } = columns;
  const slots = columns.slots ?? activeKw.map((_, i) => i);
  const optional = (list: readonly number[] | undefined): Float64Array | null =>
    list === undefined ? null : Float64Array.from(list);
  return createLoadRecord({
    intervalS,
    beginS: Float64Array.from(slots, (slot) => firstS + slot * intervalS),
    activeKw: Float64Array.from(activeKw),
    laggingKvar: Float64Array.from(reactiveKvar, (q) => Math.max(q, 0)),
    leadingKvar: Float64Array.from(reactiveKvar, (q) => Math.max(-q, 0)),
    voltageV: optional(columns.voltageV),
    connectedKvar: optional(columns.connectedKvar),
    standby: columns.standby === undefined ? null : Uint8Array.from(columns.standby),
  });
}

/**
 * A working load that drifts: active power between a tenth and the whole of the peak, reactive power in step with it.
 * @param random where the numbers come from
 * @param intervals how many
 * @param peakKw about the most active power [kW]
 * @param tan reactive over active power, about
 * @returns lists for `madeRecord`
 */
export function driftingLoad(
  random: Chance,
  intervals: number,
  peakKw: number,
  tan: number,
): { activeKw: number[]; reactiveKvar: number[] } {
  const activeKw: number[] = [];
  const reactiveKvar: number[] = [];
  let share = 0.5;
  for (let i = 0; i < intervals; i++) {
    share = Math.min(1, Math.max(0.1, share + 0.5 * (random.next() - 0.5)));
    activeKw.push(peakKw * share);
    reactiveKvar.push(peakKw * share * tan * random.between(0.8, 1.2));
  }
  return { activeKw, reactiveKvar };
}
