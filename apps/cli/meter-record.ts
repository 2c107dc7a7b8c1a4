import { readMeterMap } from '#libs/contract/meter-map-schema.js';
import type { MeterReading } from '#libs/meter-files/meter-format.js';
import { readMeterFile } from '#libs/meter-files/read-meter-file.js';
import type { CommandLine } from './command.js';
import { openInput, readJson } from './input-file.js';
import { inFile } from './refused-file.js';

/**
 * Reads the meter file a command names, as its options say.
 * @param line what was typed
 * @param path the meter file
 * @param siteTimeZone the site's zone, where there is a site
 * @returns the record and how good its file was
 */
export async function readMeterRecord(line: CommandLine, path: string, siteTimeZone?: string): Promise<MeterReading> {
  const mapPath = line.values.get('map');
  const map =
    mapPath === undefined ? undefined : await inFile(mapPath, async () => readMeterMap(await readJson(mapPath)));
  return inFile(path, async () => {
    const { bytes, sizeBytes } = await openInput(path);
    return readMeterFile(bytes, {
      ...present('format', line.values.get('format')),
      ...present('timeZone', line.values.get('time-zone')),
      ...present('map', map),
      ...present('siteTimeZone', siteTimeZone),
      ...present('sizeBytes', sizeBytes),
    });
  });
}

function present<K extends string, T>(key: K, value: T | undefined): { [P in K]?: T } {
  return value === undefined ? {} : ({ [key]: value } as { [P in K]?: T });
}
