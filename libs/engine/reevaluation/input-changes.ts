/** A field of the site that is not what it was; a part that came or went is one change. */
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
  if (!isPart(before) || !isPart(after)) {
    const [was, is] = [plainOf(before), plainOf(after)];
    return was === is ? [] : [{ path, before: was, after: is }];
  }
  const list = Array.isArray(before) || Array.isArray(after);
  const keys = [...new Set([...Object.keys(before), ...Object.keys(after)])];
  return keys.flatMap((key) => {
    const place = list ? `${path}[${key}]` : path === '' ? key : `${path}.${key}`;
    return changesIn(before[key], after[key], place);
  });
}

function isPart(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null;
}

// A whole part reads as its fields.
function plainOf(value: unknown): Plain {
  if (value === undefined || value === null) return null;
  if (!isPart(value)) return value as string | number | boolean;
  if (Array.isArray(value)) {
    return value.some(isPart) ? `${value.length} ${value.length === 1 ? 'entry' : 'entries'}` : value.join('; ');
  }
  return Object.entries(value)
    .filter(([, entry]) => entry !== undefined)
    .map(([key, entry]) => `${key} ${plainOf(entry)}`)
    .join(', ');
}
