/**
 * JSON with one spelling for one value: keys in code-unit order, no blanks, −0 as 0, absent members left out.
 * @param value numbers, text, booleans, null, lists, typed arrays and plain objects of these
 * @returns the text, for hashing and for comparing
 * @throws Error where a value has no such spelling (NaN, Infinity, a function, a symbol, a bigint)
 */
export function canonicalJson(value: unknown): string {
  if (value === null || typeof value === 'boolean' || typeof value === 'string') return JSON.stringify(value);
  if (typeof value === 'number') return canonicalNumber(value);
  if (Array.isArray(value) || ArrayBuffer.isView(value)) return canonicalList(value);
  if (typeof value === 'object') return canonicalObject(value as Record<string, unknown>);
  throw new Error(`no canonical JSON for a ${typeof value}`);
}

function canonicalNumber(value: number): string {
  if (!Number.isFinite(value)) throw new Error(`no canonical JSON for ${value}`);
  return JSON.stringify(value === 0 ? 0 : value);
}

function canonicalList(list: unknown[] | ArrayBufferView): string {
  const items = Array.isArray(list) ? list : Array.from(list as Float64Array);
  return `[${items.map((item) => (item === undefined ? 'null' : canonicalJson(item))).join(',')}]`;
}

function canonicalObject(object: Record<string, unknown>): string {
  const members = Object.keys(object)
    .sort()
    .filter((key) => object[key] !== undefined)
    .map((key) => `${JSON.stringify(key)}:${canonicalJson(object[key])}`);
  return `{${members.join(',')}}`;
}
