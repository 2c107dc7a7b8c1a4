import { shown } from '#libs/contract/shown.js';
import { dayNumber, InputProblem, type Problem } from '#libs/engine/index.js';
import { MeterChannel } from '../channels/meter-channel.js';
import type { ObisChannel } from '../obis/obis-quantity.js';
import { obisQuantity } from '../obis/obis-quantity.js';
import type { RowProblems } from '../row-problems.js';
import { isDate } from '../time/date-orders.js';
import type { Segment } from './edifact-segments.js';
import { unitOfCode } from './quantity-units.js';

/** A time of a message: the moment, and whether it stands without an offset, in local time. */
interface MessageTime {
  timeS: number;
  local: boolean;
}

interface PendingValue {
  value: number;
  row: number;
  begin: MessageTime | null;
  end: MessageTime | null;
  reading: MessageTime | null;
}

/** A channel of a metering point; `local` where its stamps have no offset. */
export interface MessageChannel extends ObisChannel {
  local: boolean;
}

/** Qualifiers of a quantity: measured; substituted, proposed, forecast or provisional; not usable. */
const MEASURED = '220';
const UNUSABLE = '20';
const STAMP = /^(\d{4})(\d{2})(\d{2})(\d{2})(\d{2})(?:([+-]\d{2}|Z|UTC))?$/;

/** Takes the segments of messages in order and keeps their values by metering point and identification code. */
export class MessageValues {
  readonly points = new Map<string, Map<string, MessageChannel>>();
  /** codes that are no total of energy or power */
  readonly leftOut = new Set<string>();
  values = 0;
  substituted = 0;
  unusable = 0;
  readonly #problems: RowProblems;
  #point = '';
  #channels: Map<string, MessageChannel> | null = null;
  #code = '';
  #inItem = false;
  /** the item's code has been read */
  #named = false;
  /** the item has a value */
  #valued = false;
  #pending: PendingValue | null = null;

  constructor(problems: RowProblems) {
    this.#problems = problems;
  }

  /** Begins a metering point. */
  place(id: string): void {
    this.close();
    this.#point = id;
    this.#channels = null;
    this.#code = '';
    this.#inItem = false;
    this.#named = false;
    this.#valued = false;
  }

  /** Begins an item, whose identification code follows. */
  item(): void {
    this.close();
    this.#code = '';
    this.#inItem = true;
    this.#named = false;
    this.#valued = false;
  }

  /** Takes the identification code of the item, which stands before its values. */
  product(segment: Segment, row: number): void {
    if (!this.#inItem || this.#valued) this.#refuseOrder(row, 'a line item (LIN) before its code (PIA)');
    if (this.#named) return;
    this.#named = true;
    const code = segment.slice(2).map(([id]) => id ?? '');
    this.#code = code.find((text) => text !== '') ?? '';
  }

  /** Takes a quantity; its times follow. */
  quantity([, composite = []]: Segment, row: number): void {
    this.close();
    if (!this.#named) this.#refuseOrder(row, 'the code of the item (PIA) before its values');
    this.#valued = true;
    const [qualifier = '', text = '', unit = ''] = composite;
    this.values++;
    if (qualifier === UNUSABLE) this.unusable++;
    else if (qualifier !== MEASURED) this.substituted++;
    if (!/^[+-]?\d{1,15}(?:[.,]\d{0,9})?$/.test(text)) {
      this.#problems.add({ code: 'bad-number', row, column: 2, expected: 'a number', found: shown(text) });
      return;
    }
    // a negative zero is a zero
    const value = qualifier === UNUSABLE ? Number.NaN : Number(text.replace(',', '.')) + 0;
    if (this.#open(unit, row)) this.#pending = { value, row, begin: null, end: null, reading: null };
  }

  /** Takes a time: of the value before it, or of the whole message where there is none. */
  time([, composite = []]: Segment, row: number): void {
    if (this.#pending === null) return;
    const [qualifier = '', text = '', format = ''] = composite;
    if (!['163', '164', '7', '9'].includes(qualifier)) return;
    const time = messageTime(text, format);
    if (time === null) {
      const expected = 'a time as CCYYMMDDHHMM, with or without an offset';
      this.#problems.add({ code: 'bad-time', row, column: 2, expected, found: shown(text) });
      this.#pending = null;
    } else {
      const which = qualifier === '163' ? 'begin' : qualifier === '164' ? 'end' : 'reading';
      if (this.#pending[which] !== null) this.#refuseOrder(row, 'each time of a value once');
      this.#pending[which] = time;
    }
  }

  /** Keeps the value that is open, now that all its times are known. */
  close(): void {
    const pending = this.#pending;
    this.#pending = null;
    const kept = this.#channels?.get(this.#code);
    if (pending === null || kept === undefined) return;
    const { channel, found } = kept;
    const at = found.cumulative ? (pending.reading ?? pending.end ?? pending.begin) : pending.begin;
    if (at === null) {
      this.#problems.add({ code: 'bad-time', row: pending.row, expected: 'the time of the value', found: 'none' });
      return;
    }
    if (!found.cumulative && pending.end !== null)
      this.#checkLength(channel, pending.end.timeS - at.timeS, pending.row);
    if (channel.count > 0 && kept.local !== at.local) {
      const expected = 'times all with an offset, or all without one';
      throw new InputProblem([{ code: 'bad-time', row: pending.row, expected, found: 'both' }]);
    }
    kept.local = at.local;
    channel.add(at.timeS, pending.value, pending.row);
  }

  #refuseOrder(row: number, expected: string): never {
    throw new InputProblem([{ code: 'unreadable', row, expected, found: 'another order of segments' }]);
  }

  #checkLength(channel: MeterChannel, intervalS: number, row: number): void {
    if (channel.count === 0) channel.intervalS = intervalS;
    if (intervalS === channel.intervalS && intervalS > 0) return;
    const expected = intervalS > 0 ? `an interval of ${channel.intervalS} s` : 'an end behind the beginning';
    this.#problems.add({ code: 'mixed-intervals', row, expected, found: `${intervalS} s`, unit: 's' });
  }

  /** The channel of the item, made where it is new; false where it is of no use. */
  #open(unitCode: string, row: number): boolean {
    const found = obisQuantity(this.#code);
    if (found === null) {
      this.leftOut.add(this.#code === '' ? `segment ${row}` : this.#code);
      return false;
    }
    const unit = unitOfCode(unitCode);
    const family = found.quantity === 'active' || found.quantity === 'exported' ? 'active' : 'reactive';
    if (unit === null || unit.family !== family || (found.cumulative && !unit.energy)) {
      this.#problems.add(wrongUnit(family, unitCode, row));
      return false;
    }
    this.#channels ??= this.#channelsOf(this.#point);
    const known = this.#channels.get(this.#code);
    if (known === undefined) {
      const { times, over, energy } = unit;
      const kind = { name: this.#code, quantity: found.quantity, energy, cumulative: found.cumulative, times, over };
      this.#channels.set(this.#code, { code: this.#code, found, channel: new MeterChannel(kind), local: false });
      return true;
    }
    const { kind } = known.channel;
    if (kind.times === unit.times && kind.over === unit.over && kind.energy === unit.energy) return true;
    this.#problems.add(wrongUnit(family, unitCode, row));
    return false;
  }

  #channelsOf(point: string): Map<string, MessageChannel> {
    const known = this.points.get(point) ?? new Map<string, MessageChannel>();
    this.points.set(point, known);
    return known;
  }
}

function wrongUnit(family: 'active' | 'reactive', unitCode: string, row: number): Problem {
  const expected = family === 'active' ? 'one unit such as KWH or KWT' : 'one unit such as K3 (kvarh) or KVR (kvar)';
  return { code: 'wrong-unit', row, column: 2, expected, found: shown(unitCode) };
}

/** Format 203 is CCYYMMDDHHMM, 303 the same with the offset in hours. */
function messageTime(text: string, format: string): MessageTime | null {
  const parts = STAMP.exec(text);
  if (parts === null || (format !== '303' && format !== '203')) return null;
  const [year, month, day, hours, minutes] = parts.slice(1, 6).map(Number) as [number, number, number, number, number];
  const offset = parts[6];
  if (!isDate({ year, month, day }) || hours > 24 || minutes > 59 || (hours === 24 && minutes > 0)) return null;
  const timeS = dayNumber(year, month, day) * 86_400 + hours * 3600 + minutes * 60;
  if (offset === undefined) return { timeS, local: true };
  const hoursAhead = offset === 'Z' || offset === 'UTC' ? 0 : Number(offset);
  return Math.abs(hoursAhead) > 14 ? null : { timeS: timeS - hoursAhead * 3600, local: false };
}
