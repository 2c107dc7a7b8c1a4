import type { EstimateResult, Figure, Result } from '#libs/engine/index.js';
import type { PlanInputs } from './plan-content.js';

// What everything that prints a plan again relies on. A file may hash right and still be made by hand.

type Entry = Record<string, unknown>;

/** Lists of a result, by their place in it; `?` where it may be absent. */
const LISTS = [
  'bank.stages',
  'duties',
  'devices',
  'charge.stages',
  'inrush.stages',
  'ageing.cases',
  'network.levels',
  'requirement.months',
  'reasons',
  'assumptions',
  'cautions',
  'findings?',
];
const RECORD_LISTS = ['operation.months', 'operation.hoursAtLevel'];
const VERDICTS = ['clear', 'watch', 'avoid'];
const LONGEST_VERSION = 32;
const MOST_DEPTH = 24;

/**
 * Whether parsed JSON has finite numbers only and no more parts within parts than an export has.
 * @param value parsed JSON
 */
export function isPlain(value: unknown): boolean {
  let parts = [value];
  for (let depth = 0; parts.length > 0; depth++) {
    if (depth > MOST_DEPTH || parts.some((part) => typeof part === 'number' && !Number.isFinite(part))) return false;
    parts = parts.flatMap((part) => (typeof part === 'object' && part !== null ? Object.values(part) : []));
  }
  return true;
}

/**
 * Whether a value has what a content hash is made from; the site in it is read by the site file's own schema.
 * @param value parsed JSON
 */
export function isPlanInputs(value: unknown): value is PlanInputs {
  if (!isEntry(value) || Object.keys(value).length !== 5) return false;
  const { kind, site, recordHash, zone, engineVersion } = value;
  return (
    (kind === 'plan' || kind === 'assess') &&
    isEntry(site) &&
    typeof site.asOf === 'string' &&
    (site.papers === undefined || arePapers(site.papers)) &&
    (recordHash === null || (typeof recordHash === 'string' && /^[0-9a-f]{64}$/.test(recordHash))) &&
    isZone(zone) &&
    typeof engineVersion === 'string' &&
    engineVersion.length > 0 &&
    engineVersion.length <= LONGEST_VERSION
  );
}

function isZone(value: unknown): boolean {
  if (!isEntry(value)) return false;
  const { zone, fromS, offsetS } = value;
  return (
    Object.keys(value).length === 3 &&
    typeof zone === 'string' &&
    areNumbers(fromS) &&
    areNumbers(offsetS) &&
    fromS.length > 0 &&
    fromS.length === offsetS.length &&
    fromS.every((from, at) => at === 0 || from > fromS[at - 1]!)
  );
}

function arePapers(value: unknown): boolean {
  return (
    isEntry(value) &&
    Object.entries(value).every(
      ([kind, paper]) =>
        (kind === 'tariff' || kind === 'prices') &&
        isEntry(paper) &&
        typeof paper.name === 'string' &&
        typeof paper.version === 'number' &&
        typeof paper.date === 'string' &&
        Object.keys(paper).length === 3,
    )
  );
}

/**
 * Whether a value has the parts of a plan's result.
 * @param value parsed JSON
 */
export function isResult(value: unknown): value is Result | EstimateResult {
  if (!isEntry(value) || !VERDICTS.includes(String(value.verdict)) || !isFigures(value.figures)) return false;
  const lists = value.record === null ? LISTS : [...LISTS, ...RECORD_LISTS];
  return (
    lists.every((path) => hasEntries(value, path)) && (value.network as { levels: Entry[] }).levels.every(hasOrders)
  );
}

function hasOrders(level: Entry): boolean {
  return hasEntries(level, 'orders');
}

/**
 * Whether a value is the figures of a calculation sheet.
 * @param value parsed JSON
 */
export function isFigures(value: unknown): value is Figure[] {
  return Array.isArray(value) && value.every(isFigure);
}

function isFigure(value: unknown): boolean {
  if (!isEntry(value) || Object.keys(value).length !== 8) return false;
  const { id, label, unit, formula, working, source, inputs } = value;
  return (
    [id, label, unit, formula, working, source].every((text) => typeof text === 'string') &&
    typeof value.value === 'number' &&
    Array.isArray(inputs) &&
    inputs.every(isInput)
  );
}

function isInput(value: unknown): boolean {
  if (!isEntry(value) || Object.keys(value).length !== 3) return false;
  return typeof value.symbol === 'string' && typeof value.value === 'number' && typeof value.unit === 'string';
}

function hasEntries(value: Entry, path: string): boolean {
  const steps = path.replace('?', '').split('.');
  let part: unknown = value;
  for (const step of steps) part = isEntry(part) ? part[step] : undefined;
  if (part === undefined && path.endsWith('?')) return true;
  return Array.isArray(part) && part.every(isEntry);
}

function areNumbers(value: unknown): value is number[] {
  return Array.isArray(value) && value.every((one) => Number.isFinite(one));
}

function isEntry(value: unknown): value is Entry {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}
