import { isTimeZone } from '#libs/contract/time-zone.js';
import { InputProblem } from '#libs/engine/index.js';
import { FORMATS } from '#libs/meter-files/formats.js';
import type { MeterReading, ReadOptions } from '#libs/meter-files/meter-format.js';
import { readMeterFile } from '#libs/meter-files/read-meter-file.js';
import { extendRecord } from '#libs/meter-files/record/extend-record.js';
import type { CommandLine } from './command.js';
import { usage } from './command-line.js';
import { openInput } from './input-file.js';
import { readMapFile } from './map-file.js';
import { say } from './output.js';
import { withProgress } from './reading-progress.js';
import { inFile } from './refused-file.js';

/**
 * Reads the meter file a command names, as its options say, and every file that extends it.
 * @param line what was typed
 * @param path the meter file
 * @param siteTimeZone the site's zone, where there is a site
 * @returns the record and how good its files were
 */
export async function readMeterRecord(line: CommandLine, path: string, siteTimeZone?: string): Promise<MeterReading> {
  checkOptions(line);
  const mapPath = line.values.get('map');
  const files = line.lists.get('extend') ?? [];
  const said = mapPath === undefined ? null : await inFile(mapPath, () => readMapFile(mapPath, files.length));
  const map = said?.map;
  const timeZone = line.values.get('time-zone');
  const options: ReadOptions = {
    ...present('format', line.values.get('format')),
    ...present('timeZone', timeZone),
    ...present('map', map),
    ...present('siteTimeZone', siteTimeZone),
  };
  let reading = await readOne(path, options);
  for (const [k, further] of files.entries()) {
    const later = await readOne(further, options);
    const zone = siteTimeZone ?? timeZone ?? map?.timeZone ?? 'UTC';
    const extended = await inFile(further, async () =>
      extendRecord(reading, later, { map: { ...map, ...present('overlap', said?.overlaps?.[k]) }, timeZone: zone }),
    );
    if (extended === reading) say(`${further} adds nothing to the record`);
    reading = extended;
  }
  return reading;
}

function readOne(path: string, options: ReadOptions): Promise<MeterReading> {
  return inFile(path, async () => {
    const file = await openInput(path);
    const bytes = withProgress(file, (progress) => say(`${path}: ${progress}`));
    return readMeterFile(bytes, { ...options, ...present('sizeBytes', file.sizeBytes) });
  });
}

/** A format or a zone that doesn't exist is a slip of the keyboard, whatever the file holds. */
function checkOptions({ values }: CommandLine): void {
  const names = FORMATS.map(({ name }) => name);
  const format = values.get('format');
  const zone = values.get('time-zone');
  const problems = [
    ...(format === undefined || names.includes(format)
      ? []
      : [usage(`--format with one of ${names.join(', ')}`, JSON.stringify(format))]),
    ...(zone === undefined || isTimeZone(zone)
      ? []
      : [usage('--time-zone with a zone such as "Europe/Dublin", "UTC" or "+10:00"', JSON.stringify(zone))]),
  ];
  if (problems.length > 0) throw new InputProblem(problems);
}

function present<K extends string, T>(key: K, value: T | undefined): { [P in K]?: T } {
  return value === undefined ? {} : ({ [key]: value } as { [P in K]?: T });
}
