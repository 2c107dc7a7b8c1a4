// A slow and plain turning of a file with a row for each channel and moment into one with a row a moment.

/** Where such a file has what, columns counted from 0. */
export interface SlowLong {
  time: number;
  channel: number;
  value: number;
  /** null where the unit stands in the channel's name */
  unit: number | null;
  /** the channels that a record is made of, the unit of a column of its own in brackets behind the name */
  channels: readonly string[];
}

/** A moment as it is written, and the cells of its channels. */
interface Moment {
  stamp: string;
  cells: Map<string, string>;
}

export interface TurnedRows {
  header: string[];
  body: string[][];
  /** other channels, as they are written */
  leftOut: Set<string>;
}

/**
 * The layout by a header whose names for channel and unit have changed places: units are then the channels' names.
 * @param header cells of the row
 * @param long where a sound file has what
 */
export function byHeader(header: readonly string[], long: SlowLong): SlowLong {
  if (long.unit === null || header[long.unit] !== 'channel' || header[long.channel] !== 'unit') return long;
  const channels = long.channels.map((name) => /\[(.*)\]$/.exec(name)![1]!);
  return { ...long, channel: long.unit, unit: null, channels };
}

/**
 * The header and the rows of the file with a row a moment: the n-th row of a channel under a stamp stands beside the n-th
 * of every other.
 * @param rows of data, cells trimmed
 * @param long where they have what
 * @param momentOf what is the same for two stamps of one moment
 */
export function turned(rows: readonly string[][], long: SlowLong, momentOf: (stamp: string) => string): TurnedRows {
  const { time, channel, value, unit, channels } = long;
  const moments = new Map<string, Moment>();
  const counts = new Map<string, number>();
  const leftOut = new Set<string>();
  for (const cells of rows) {
    const name = unit === null ? cells[channel]! : `${cells[channel]} [${cells[unit]}]`;
    if (!channels.includes(name)) {
      leftOut.add(cells[channel]!);
      continue;
    }
    // a stamp of what is left out stamps nothing
    const stamp = cells[time]!;
    const key = momentOf(stamp);
    const count = (counts.get(`${name}\n${key}`) ?? 0) + 1;
    counts.set(`${name}\n${key}`, count);
    const moment = moments.get(`${key}\n${count}`) ?? { stamp, cells: new Map() };
    moment.cells.set(name, cells[value]!);
    moments.set(`${key}\n${count}`, moment);
  }
  const names = channels.filter((name) => [...moments.values()].some(({ cells }) => cells.has(name)));
  const body = [...moments.values()].map(({ stamp, cells }) => [stamp, ...names.map((name) => cells.get(name) ?? '')]);
  return { header: ['time', ...names], body, leftOut };
}
