const LONGEST = 60;

/**
 * A value of an input in a few words, for the `found` of a problem; never longer than a line.
 * @param value any JSON value
 * @returns text
 */
export function shown(value: unknown): string {
  if (value === undefined) return 'nothing';
  if (typeof value === 'string') return JSON.stringify(value.length > LONGEST ? `${value.slice(0, LONGEST)}…` : value);
  if (Array.isArray(value)) return value.length === 0 ? 'an empty list' : `a list of ${value.length}`;
  if (typeof value === 'object' && value !== null) return 'an object';
  return String(value);
}
