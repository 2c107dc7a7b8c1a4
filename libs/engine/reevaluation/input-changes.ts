/** A field of the site that is not what it was; a part that came or went is told by its fields. */
export interface InputChange {
  path: string;
  /** null where it was not given */
  before: Plain;
  after: Plain;
}

type Plain = string | number | boolean | null;

/**
 * Fields in which two sites differ, by their path; the date of asking is left out.
 * @param before earlier site
 * @param after later site
 * @returns changed fields in the order they stand in; none where nothing differs
 */
export function inputChanges(before: object, after: object): InputChange[] {
  return changesIn(before, after, '').filter(({ path }) => path !== 'asOf');
}

function changesIn(before: unknown, after: unknown, path: string): InputChange[] {
  if (!isPart(before) && !isPart(after)) {
    const [was, is] = [plainOf(before), plainOf(after)];
    return was === is ? [] : [{ path, before: was, after: is }];
  }
  const [was, is] = [partOf(before), partOf(after)];
  const list = Array.isArray(before) || Array.isArray(after);
  const keys = [...new Set([...Object.keys(was), ...Object.keys(is)])];
  return keys.flatMap((key) => {
    const place = list ? `${path}[${key}]` : path === '' ? key : `${path}.${key}`;
    return changesIn(was[key], is[key], place);
  });
}

// A list of plain values is one value.
function isPart(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !(Array.isArray(value) && !value.some(isPart));
}

function partOf(value: unknown): Record<string, unknown> {
  return isPart(value) ? value : {};
}

function plainOf(value: unknown): Plain {
  if (value === undefined || value === null) return null;
  return Array.isArray(value) ? value.join('; ') : (value as string | number | boolean);
}
