type Part = string | number;

/** "supply.transformers[0].ratedKva" as its steps. */
export function stepsOf(path: string): Part[] {
  return [...path.matchAll(/([A-Za-z_]\w*)|\[(\d+)\]/g)].map(([, name, index]) => name ?? Number(index));
}

/** @returns what stands at a path of a document, undefined where nothing does */
export function valueAt(document: unknown, path: string): unknown {
  return stepsOf(path).reduce<unknown>(
    (part, step) => (part === null || typeof part !== 'object' ? undefined : (part as Record<Part, unknown>)[step]),
    document,
  );
}

/**
 * A copy of a document with another value at a path; undefined takes the key away, and objects left empty with it.
 * @returns the copy; what lies beside the path is shared
 */
export function withValueAt<T>(document: T, path: string, value: unknown): T {
  return placed(document, stepsOf(path), value) as T;
}

function placed(part: unknown, steps: readonly Part[], value: unknown): unknown {
  const [step, ...rest] = steps;
  if (step === undefined) return value;
  if (typeof step === 'number') {
    const list = Array.isArray(part) ? [...part] : [];
    const next = placed(list[step], rest, value);
    if (next === undefined && rest.length === 0) list.splice(step, 1);
    else list[step] = next;
    return list;
  }
  const object = { ...(part as Record<string, unknown> | undefined) };
  const next = placed(object[step], rest, value);
  if (next === undefined) delete object[step];
  else object[step] = next;
  return Object.keys(object).length === 0 && part !== undefined ? undefined : object;
}
