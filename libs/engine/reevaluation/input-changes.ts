/** A field of the site that is not what it was. */
export interface InputChange {
  path: string;
  /** null where it was not given */
  before: string | number | boolean | null;
  after: string | number | boolean | null;
}

/**
 * Fields in which two sites differ, by their path; the date of asking is left out.
 * @param before earlier site
 * @param after later site
 * @returns changed fields in the order of their paths; none where nothing differs
 */
export function inputChanges(before: object, after: object): InputChange[] {
  const [old, now] = [new Map<string, Plain>(), new Map<string, Plain>()];
  fieldsInto(old, before, '');
  fieldsInto(now, after, '');
  return [...new Set([...old.keys(), ...now.keys()])]
    .filter((path) => path !== 'asOf' && old.get(path) !== now.get(path))
    .map((path) => ({ path, before: old.get(path) ?? null, after: now.get(path) ?? null }));
}

type Plain = string | number | boolean | null;

function fieldsInto(fields: Map<string, Plain>, value: unknown, path: string): void {
  if (Array.isArray(value)) {
    for (const [k, entry] of value.entries()) fieldsInto(fields, entry, `${path}[${k}]`);
  } else if (typeof value === 'object' && value !== null) {
    for (const [key, entry] of Object.entries(value)) fieldsInto(fields, entry, path === '' ? key : `${path}.${key}`);
  } else if (value !== undefined) fields.set(path, value as Plain);
}
