import type { MeterMap } from '#libs/contract/meter-map.js';
import { shown } from '#libs/contract/shown.js';
import { InputProblem, type Problem } from '#libs/engine/index.js';
import { readJson } from './input-file.js';

type Overlap = NonNullable<MeterMap['overlap']>;

/** What `--map` says of the meter file and of those that extend it. */
export interface MapFile {
  /** for every file */
  map: MeterMap;
  /** which counts where a further file disagrees, one after the other; null where `map` answers for all of them */
  overlaps: readonly Overlap[] | null;
}

/**
 * Reads a map file. A command takes several further files, so `overlap` may be a list there, in the order of `--extend`;
 * a file beyond its end is asked about.
 * @param path of the map file
 * @param further how many files extend the record
 * @throws InputProblem with every problem and its path
 */
export async function readMapFile(path: string, further: number): Promise<MapFile> {
  // the checks of a map are loaded where there is one: they take up more memory than the rest of the reader
  const { readMeterMap } = await import('#libs/contract/meter-map-schema.js');
  const json = await readJson(path);
  if (!isRecord(json) || !Array.isArray(json.overlap)) return { map: readMeterMap(json), overlaps: null };
  const { overlap, ...rest } = json;
  return { map: readMeterMap(rest), overlaps: overlapsOf(overlap, further) };
}

function isRecord(json: unknown): json is Record<string, unknown> {
  return typeof json === 'object' && json !== null;
}

function overlapsOf(list: readonly unknown[], further: number): readonly Overlap[] {
  const problems: Problem[] = list.flatMap((each, k) => {
    if (each === 'earlier' || each === 'later') return [];
    return [{ code: 'wrong-type', path: `overlap.${k}`, expected: '"earlier" or "later"', found: shown(each) }];
  });
  if (list.length > further) {
    const expected = `at most one answer for each file of --extend, ${further} in all`;
    problems.push({ code: 'wrong-length', path: 'overlap', expected, found: `${list.length}` });
  }
  if (problems.length > 0) throw new InputProblem(problems);
  return list as readonly Overlap[];
}
