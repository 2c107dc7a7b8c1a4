import { shown } from '#libs/contract/shown.js';
import { InputProblem, type Remark } from '#libs/engine/index.js';
import { note } from '../note.js';
import type { SeriesMeter } from '../reading-type/read-series.js';
import { SeriesTable } from '../reading-type/series-table.js';
import { EspiBlocks } from './espi-blocks.js';
import type { BlockEntry, EspiEntry, EspiFeed, TypeEntry } from './espi-feed.js';
import { sameType } from './espi-type.js';

/** The meters of a feed. */
export interface JoinedFeed {
  meters: SeriesMeter[];
  notes: Remark[];
}

/**
 * Joins the resources of a feed by their links. Where an entry has none it belongs to what stands before it, as feeds are
 * written in that order; where its links lead nowhere it is refused unless there is only one place for it.
 * @param feed its resources
 * @returns a meter for each usage point of electricity
 * @throws InputProblem where an entry can't be placed
 */
export function joinFeed(feed: EspiFeed): JoinedFeed {
  refuseTwoMeanings(feed.readingTypes);
  const readings = feed.meterReadings.length > 0 ? feed.meterReadings : [unlinked];
  const byLink = linkTable(readings);
  const blocks = readings.map(() => new EspiBlocks());
  let byOrder = 0;
  for (const entry of feed.blocks.values()) {
    const place = placeOf(entry, byLink, readings.length);
    blocks[place.index]!.append(entry.blocks);
    if (place.byOrder) byOrder += entry.entries;
  }
  const usage = usageOf(feed, readings);
  const meters = new Map<string, SeriesTable>();
  readings.forEach((reading, index) => {
    if (blocks[index]!.readings.count === 0) return;
    const point = usage[index]!;
    if (!point.electric) return;
    const type = typeOf(reading, index, feed.readingTypes);
    if (type.byOrder) byOrder++;
    blocks[index]!.settleTimes(type.entry.intervalS);
    blocks[index]!.settleQuality(type.entry.defaultQuality);
    const table = meters.get(point.name) ?? new SeriesTable();
    meters.set(point.name, table);
    table.add(type.entry.type, blocks[index]!.readings, type.entry.intervalS);
  });
  return {
    meters: [...meters].map(([name, { series }]) => ({ name, series })),
    notes: byOrder > 0 ? [note('espi-joined-by-order', { entries: byOrder })] : [],
  };
}

const unlinked: EspiEntry = { self: null, up: [], related: [], title: '', row: 1, after: 0 };

/** Meter readings by every path that leads to one of them. */
function linkTable(readings: readonly EspiEntry[]): Map<string, number> {
  const table = new Map<string, number>();
  readings.forEach(({ self, related }, index) => {
    for (const path of related) if (!/\/ReadingType(?:\/|$)/i.test(path)) table.set(path, index);
    if (self !== null) table.set(self, index);
  });
  return table;
}

interface Place {
  index: number;
  byOrder: boolean;
}

function placeOf(entry: BlockEntry, byLink: ReadonlyMap<string, number>, count: number): Place {
  const paths = [entry.self, ...entry.up, ...entry.related].filter((path) => path !== null);
  const found = paths.flatMap(withAncestors).find((path) => byLink.has(path));
  if (found !== undefined) return { index: byLink.get(found)!, byOrder: false };
  if (count === 1) return { index: 0, byOrder: false };
  if (paths.length === 0) return { index: Math.max(entry.after - 1, 0), byOrder: true };
  const expected = 'a link from the block to its meter reading';
  throw new InputProblem([{ code: 'inconsistent', row: entry.row, expected, found: shown(paths[0]) }]);
}

/** A path and those it lies under, up to three steps. */
function withAncestors(path: string): string[] {
  const paths = [path];
  for (let at = path.lastIndexOf('/'); at > 0 && paths.length < 4; at = path.lastIndexOf('/', at - 1)) {
    paths.push(path.slice(0, at));
  }
  return paths;
}

interface Usage {
  name: string;
  electric: boolean;
}

/** The usage point of each meter reading: by link, else the last before it in the feed. */
function usageOf({ usagePoints }: EspiFeed, readings: readonly EspiEntry[]): Usage[] {
  const titles = usagePoints.map(({ title }) => title);
  const names = usagePoints.map(({ title, self }, i) => {
    return title !== '' && titles.indexOf(title) === titles.lastIndexOf(title)
      ? title
      : (self ?? `usage point ${i + 1}`).slice(-80);
  });
  return readings.map((reading, index) => {
    const linked = usagePoints.findIndex((point) => leadsTo(point, reading));
    const before = usagePoints.findLastIndex(({ after }) => after <= index);
    const at = linked >= 0 ? linked : Math.max(before, 0);
    return { name: names[at] ?? 'unnamed', electric: usagePoints[at]?.electric ?? true };
  });
}

function leadsTo(point: EspiEntry, reading: EspiEntry): boolean {
  const targets = [reading.self, ...reading.up].filter((path) => path !== null);
  return targets.some(
    (path) =>
      point.related.includes(path) || path === point.self || (point.self !== null && path.startsWith(`${point.self}/`)),
  );
}

function typeOf(
  reading: EspiEntry,
  index: number,
  types: readonly TypeEntry[],
): { entry: TypeEntry; byOrder: boolean } {
  const linked = types.find(({ self, up, related }) => {
    const back = [...up, ...related];
    return (self !== null && reading.related.includes(self)) || (reading.self !== null && back.includes(reading.self));
  });
  if (linked !== undefined) return { entry: linked, byOrder: false };
  const [only] = types;
  if (only !== undefined && types.length === 1) return { entry: only, byOrder: false };
  // a feed gives the type behind its meter reading and before the next
  const next = types.find(({ after }) => after === index + 1);
  if (next !== undefined) return { entry: next, byOrder: true };
  const expected = 'a link from the meter reading to its reading type';
  throw new InputProblem([
    { code: 'inconsistent', row: reading.row, expected, found: `${types.length} reading types` },
  ]);
}

function refuseTwoMeanings(types: readonly TypeEntry[]): void {
  const known = new Map<string, TypeEntry>();
  for (const entry of types) {
    if (entry.self === null) continue;
    const earlier = known.get(entry.self);
    if (earlier !== undefined && !sameType(earlier, entry)) {
      const expected = `the reading type of row ${earlier.row}, which has the same link`;
      throw new InputProblem([{ code: 'inconsistent', row: entry.row, expected, found: 'another meaning' }]);
    }
    known.set(entry.self, entry);
  }
}
