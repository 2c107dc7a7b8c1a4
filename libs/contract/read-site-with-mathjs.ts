import type { Site } from '#libs/engine/index.js';
import { readQuantity } from './quantity.js';
import { readSite } from './read-site.js';
import type { ProblemParams } from './schema-parts.js';
import { siteSchema } from './site-schema.js';
import { understandSite } from './understand-site.js';

/** Units the library and we understand alike; it takes VA for W and var for a complex W, so those stay ours alone. */
const SHARED_UNITS = ['W', 'kW', 'kWh', 'V', 'A', 'ohm', 's', 'Hz'];

/**
 * Reads a site as `readSite` does, and units outside our own table ("5 hp", "2 days") through mathjs, which is loaded
 * only where such a unit stands: it takes a second or two.
 * @param json what JSON.parse gave
 * @returns the site
 * @throws InputProblem with every problem and its path
 */
export async function readSiteWithMathjs(json: unknown): Promise<Site> {
  const parsed = siteSchema.safeParse(json);
  if (parsed.success) return understandSite(parsed.data, json);
  const strange = parsed.error.issues.flatMap((issue) => {
    const problem = issue.code === 'custom' ? (issue.params as ProblemParams | undefined)?.problem : undefined;
    const text = valueAt(json, issue.path);
    const unit = problem?.code === 'wrong-unit' ? problem.unit : undefined;
    return unit !== undefined && typeof text === 'string' && isUnknownUnit(text, unit)
      ? [{ path: issue.path, text, unit }]
      : [];
  });
  if (strange.length === 0) return readSite(json);
  let converted = json;
  for (const { path, text, unit } of strange) {
    const value = await convertedByMathjs(text, unit);
    if (value !== null) converted = replacedAt(converted, path, value);
  }
  return readSite(converted);
}

function isUnknownUnit(text: string, unit: string): boolean {
  const reading = readQuantity(text, unit);
  return SHARED_UNITS.includes(unit) && 'fault' in reading && reading.fault === 'unknown-unit';
}

async function convertedByMathjs(text: string, unit: string): Promise<number | null> {
  const { unit: readUnit } = await import('mathjs');
  try {
    const read = readUnit(text);
    if (/\bVA/i.test(text) || !read.equalBase(readUnit(unit))) return null;
    const value = read.toNumber(unit);
    return Number.isFinite(value) ? value : null;
  } catch {
    return null;
  }
}

function valueAt(json: unknown, path: readonly PropertyKey[]): unknown {
  return path.reduce<unknown>((value, key) => (value as Record<PropertyKey, unknown> | undefined)?.[key], json);
}

/** A copy that differs at one path; everything off the path is shared. */
function replacedAt(json: unknown, path: readonly PropertyKey[], value: number): unknown {
  const [key, ...rest] = path;
  if (key === undefined) return value;
  const copy = Array.isArray(json) ? [...json] : { ...(json as object) };
  (copy as Record<PropertyKey, unknown>)[key] = replacedAt((json as Record<PropertyKey, unknown>)[key], rest, value);
  return copy;
}
