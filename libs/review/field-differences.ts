/** A field that two documents do not share. */
export interface FieldDifference {
  /** path as in refusals: `supply.transformers[0].ratedKva` */
  path: string;
  /** undefined where the first has no such field */
  before: unknown;
  /** undefined where the second has none */
  after: unknown;
}

/**
 * Every field in which two documents differ, in the order of the first, then what only the second has.
 * Numbers are compared to the bit: two revisions are equal or they are not.
 * @param before a JSON value
 * @param after a JSON value
 * @returns one entry a leaf that differs
 */
export function fieldDifferences(before: unknown, after: unknown): FieldDifference[] {
  const found: FieldDifference[] = [];
  compareInto(found, '', before, after);
  return found;
}

function compareInto(found: FieldDifference[], path: string, before: unknown, after: unknown): void {
  if (Array.isArray(before) && Array.isArray(after)) {
    for (let i = 0; i < Math.max(before.length, after.length); i++) {
      compareInto(found, `${path}[${i}]`, before[i], after[i]);
    }
    return;
  }
  if (isObject(before) && isObject(after)) {
    for (const key of new Set([...Object.keys(before), ...Object.keys(after)])) {
      compareInto(found, path === '' ? key : `${path}.${key}`, before[key], after[key]);
    }
    return;
  }
  if (!Object.is(before, after)) found.push({ path, before, after });
}

function isObject(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}
