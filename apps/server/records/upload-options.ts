import type { MeterMap } from '#libs/contract/meter-map.js';
import { readMeterMap } from '#libs/contract/meter-map-schema.js';
import { isTimeZone } from '#libs/contract/time-zone.js';
import { InputProblem, type Problem } from '#libs/engine/index.js';
import { waitS } from '../planning/wait-time.js';

/** What the sender says about a meter file. */
export interface UploadOptions {
  format?: string;
  timeZone?: string;
  map?: MeterMap;
  /** name of kept answers to read the file with */
  keptMap?: string;
  /** how long the sender waits before it is given a job to follow; absent, until the file is read [s] */
  waitS?: number;
}

/** How each field is read: into the options, or to a problem. */
const READERS: Record<string, (text: string) => UploadOptions | Omit<Problem, 'path' | 'found'>> = {
  format: (format) => ({ format }),
  timeZone: (timeZone) =>
    isTimeZone(timeZone)
      ? { timeZone }
      : { code: 'out-of-range', expected: 'a time zone such as "Europe/Dublin" or "+10:00"' },
  map: (text) => {
    const json = parsed(text);
    return json === undefined ? { code: 'unreadable', expected: 'a map as JSON' } : { map: readMeterMap(json) };
  },
  keptMap: (keptMap) => ({ keptMap }),
  wait: (wait) => ({ waitS: waitS({ wait }) }),
  // The file's own name; the spool takes it.
  name: () => ({}),
};

/**
 * Reads the fields beside a file, or the query of a request whose body is the file.
 * @param fields texts by name
 * @throws InputProblem with every field that is unknown or cannot be read
 */
export function readUploadOptions(fields: Record<string, unknown>): UploadOptions {
  const problems: Problem[] = [];
  const options: UploadOptions = {};
  for (const [name, value] of Object.entries(fields)) {
    const read = readField(name, value);
    if ('code' in read) problems.push({ ...read, found: JSON.stringify(String(value).slice(0, 60)) });
    else Object.assign(options, read);
  }
  if (problems.length > 0) throw new InputProblem(problems);
  return options;
}

function readField(name: string, value: unknown): UploadOptions | Omit<Problem, 'found'> {
  const reader = Object.hasOwn(READERS, name) ? READERS[name] : undefined;
  if (reader === undefined) {
    const expected = `one of ${Object.keys(READERS).join(', ')}`;
    return { code: 'unknown-key', path: JSON.stringify(name.slice(0, 60)), expected };
  }
  if (typeof value !== 'string') return { code: 'wrong-type', path: name, expected: 'one text' };
  const read = reader(value);
  return 'code' in read ? { ...read, path: name } : read;
}

function parsed(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return undefined;
  }
}
