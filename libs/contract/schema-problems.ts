import type * as z from 'zod';
import { InputProblem, type Problem, type ProblemCode } from '#libs/engine/index.js';
import type { ProblemParams } from './schema-parts.js';
import { shown } from './shown.js';

/** More problems than this help nobody; the list says how many were left out. */
const MOST_PROBLEMS = 200;

/** What stands under these keys is never repeated. */
const SECRET: ReadonlySet<PropertyKey | undefined> = new Set(['password', 'present']);

type Issue = z.core.$ZodIssue;

/**
 * Reads JSON by a schema.
 * @param schema what it must look like
 * @param json anything
 * @returns the value, with quantities as numbers
 * @throws InputProblem with every problem and its path
 */
export function readBySchema<T extends z.ZodType>(schema: T, json: unknown): z.output<T> {
  const parsed = schema.safeParse(json);
  if (parsed.success) return parsed.data;
  throw new InputProblem(problemsOf(parsed.error.issues, json));
}

/**
 * The schema library's issues as problems of ours.
 * @param issues what it found
 * @param json what it looked at
 * @returns one problem an issue, unknown keys one each
 */
export function problemsOf(issues: readonly Issue[], json: unknown): Problem[] {
  const problems = firstOfEachPlace(issues.flatMap((issue) => problemsOfIssue(issue, json)));
  if (problems.length <= MOST_PROBLEMS) return problems;
  const rest = problems.length - MOST_PROBLEMS;
  return [
    ...problems.slice(0, MOST_PROBLEMS),
    { code: 'too-large', expected: `at most ${MOST_PROBLEMS} problems`, found: `${rest} more` },
  ];
}

/** One value may break several bounds at once; the first says enough. */
function firstOfEachPlace(problems: readonly Problem[]): Problem[] {
  const seen = new Set<string | undefined>();
  return problems.filter(({ path }) => !seen.has(path) && seen.add(path));
}

/**
 * A path in the form a person would type it.
 * @param path keys and indices
 * @returns for example `supply.transformers[0].ratedKva`
 */
export function pathText(path: readonly PropertyKey[]): string {
  let text = '';
  for (const key of path) {
    if (typeof key === 'number') text += `[${key}]`;
    else if (/^[A-Za-z_$][\w$]{0,59}$/.test(String(key))) text += text === '' ? String(key) : `.${String(key)}`;
    else text += `[${shown(String(key))}]`;
  }
  return text;
}

function problemsOfIssue(issue: Issue, json: unknown): Problem[] {
  if (issue.code === 'unrecognized_keys') {
    return issue.keys.map((key) => ({
      code: 'unknown-key',
      path: pathText([...issue.path, key]),
      expected: 'a known key',
      found: shown(key),
    }));
  }
  const where = issue.path.length === 0 ? {} : { path: pathText(issue.path) };
  const own = issue.code === 'custom' ? (issue.params as ProblemParams | undefined)?.problem : undefined;
  if (own !== undefined) return [{ ...where, ...own }];
  const value = valueAt(json, issue.path);
  const found = SECRET.has(issue.path.at(-1)) && value !== undefined ? 'another' : shown(value);
  return [{ ...codeAndExpectation(issue, value), ...where, found }];
}

function valueAt(json: unknown, path: readonly PropertyKey[]): unknown {
  let value = json;
  for (const key of path) {
    if (typeof value !== 'object' || value === null || !Object.hasOwn(value, key)) return undefined;
    value = (value as Record<PropertyKey, unknown>)[key];
  }
  return value;
}

function codeAndExpectation(issue: Issue, value: unknown): { code: ProblemCode; expected: string } {
  const expected = expectation(issue);
  if (value === undefined) return { code: 'missing', expected };
  if (typeof value === 'number' && !Number.isFinite(value)) return { code: 'not-finite', expected: 'a finite number' };
  return { code: isOfWrongType(issue, value) ? 'wrong-type' : 'out-of-range', expected };
}

/** A word that is not on the list is still of the right type. */
function isOfWrongType(issue: Issue, value: unknown): boolean {
  if (issue.code === 'invalid_value') return typeof value !== typeof issue.values[0];
  return issue.code === 'invalid_type';
}

const TYPES: Record<string, string> = {
  number: 'a number',
  string: 'text',
  boolean: 'true or false',
  object: 'an object',
  record: 'an object',
  array: 'a list',
  tuple: 'a list',
};

function expectation(issue: Issue): string {
  switch (issue.code) {
    case 'invalid_type':
      return TYPES[issue.expected] ?? issue.expected;
    case 'invalid_value':
      return oneOf(issue.values);
    case 'invalid_union':
      return 'options' in issue && Array.isArray(issue.options) ? oneOf(issue.options) : issue.message;
    case 'too_small':
      return `${sized(issue.origin)}${issue.inclusive ? 'at least' : 'more than'} ${issue.minimum}`;
    case 'too_big':
      return `${sized(issue.origin)}${issue.inclusive ? 'at most' : 'less than'} ${issue.maximum}`;
    case 'not_multiple_of':
      return 'a whole number';
    default:
      return issue.message;
  }
}

function sized(origin: string): string {
  if (origin === 'array') return 'a list with entries numbering ';
  return origin === 'string' ? 'text with characters numbering ' : '';
}

function oneOf(values: readonly unknown[]): string {
  return `${values.length === 1 ? '' : 'one of '}${values.map((value) => JSON.stringify(value)).join(', ')}`;
}
