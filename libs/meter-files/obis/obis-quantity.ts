import type { Remark } from '#libs/engine/index.js';
import type { MeterChannel } from '../channels/meter-channel.js';
import { note } from '../note.js';
import type { Quantity } from '../record/build-columns.js';

/**
 * Value group C: what is measured. +R is the reactive energy of quadrants I and II, −R that of III and IV, so the first
 * is lagging in the sign of this program (Q above 0) whichever way active power flows.
 */
const QUANTITIES: Record<string, Quantity> = {
  1: 'active',
  2: 'exported',
  3: 'lagging',
  4: 'leading',
  5: 'lagging',
  6: 'lagging',
  7: 'leading',
  8: 'leading',
};

/** Value group D: 8 is a register's reading, 29 the energy of the interval, 4 and 5 the interval's mean demand. */
const READINGS = new Set(['8']);
const INTERVALS = new Set(['4', '5', '25', '29']);

/** What an identification code says of a channel. */
export interface ObisQuantity {
  quantity: Quantity;
  /** a single quadrant of reactive energy */
  quadrant: boolean;
  /** a register's reading, not the value of an interval */
  cumulative: boolean;
}

const CODE = /^(?:\d{1,3}-\d{1,3}:)?(\d{1,3})\.(\d{1,3})(?:\.(\d{1,3}))?(?:[*&]\d{1,3})?$/;

/**
 * Reads an object identification code (OBIS) of electricity.
 * @param code such as `1-1:1.29.0`, `1.5` or `5.8.0`
 * @returns null for what is no total of the energies and powers a record is made of: rates, maxima, phases, apparent power
 */
export function obisQuantity(code: string): ObisQuantity | null {
  const parts = CODE.exec(code.trim());
  if (parts === null) return null;
  const [, c = '', d = '', rate = '0'] = parts;
  const quantity = QUANTITIES[c];
  if (quantity === undefined || rate !== '0') return null;
  if (!READINGS.has(d) && !INTERVALS.has(d)) return null;
  return { quantity, quadrant: Number(c) >= 5, cumulative: READINGS.has(d) };
}

/** A channel with its identification code. */
export interface ObisChannel {
  code: string;
  found: ObisQuantity;
  channel: MeterChannel;
}

/**
 * Chooses among the channels of a meter that say the same in several ways: interval values before register readings,
 * the whole of a reactive energy before its quadrants.
 * @param all channels of one meter
 * @returns the channels that count, and notes on what was left out
 */
export function chosenChannels(all: readonly ObisChannel[]): { channels: MeterChannel[]; notes: Remark[] } {
  const filled = all.filter(({ channel }) => channel.count > 0);
  const kept = filled.filter(({ found }) => {
    const rivals = filled.filter(({ found: other }) => other.quantity === found.quantity);
    const intervals = rivals.filter(({ found: other }) => !other.cumulative);
    if (found.cumulative && intervals.length > 0) return false;
    const alike = rivals.filter(({ found: other }) => other.cumulative === found.cumulative);
    return !(found.quadrant && alike.some(({ found: other }) => !other.quadrant));
  });
  const left = filled.filter((channel) => !kept.includes(channel)).map(({ code }) => code);
  const notes = left.length === 0 ? [] : [note('channels-left-out', { channels: left.sort().join(', ') })];
  return { channels: kept.map(({ channel }) => channel), notes };
}
