/** What kind of thing is wrong with an input. HTTP statuses and exit codes are exhaustive tables over this list. */
export const PROBLEM_CODES = [
  'usage',
  'question',
  'missing',
  'unknown-key',
  'wrong-type',
  'wrong-unit',
  'out-of-range',
  'inconsistent',
  'unreadable',
  'unknown-format',
  'empty-file',
  'no-time-column',
  'no-active-column',
  'no-reactive-column',
  'bad-number',
  'bad-time',
  'mixed-intervals',
  'conflicting-repeat',
  'wrong-length',
  'not-finite',
  'too-large',
  'too-many-levels',
  'unknown-level',
  'load-too-large',
  'not-supported-yet',
  'not-found',
  'conflict',
  'stale',
  'stopped',
] as const;

export type ProblemCode = (typeof PROBLEM_CODES)[number];

/** One thing that is wrong with what the caller gave, and where. */
export interface Problem {
  code: ProblemCode;
  /** path into the site file, for example `supply.transformers[0].ratedKva` */
  path?: string;
  /** row of a meter file, counted from 1 */
  row?: number;
  /** column of a meter file, counted from 1 */
  column?: number;
  expected: string;
  found: string;
  unit?: string;
}

/** Thrown when the caller's data can't be used: a list, not the first fault. */
export class InputProblem extends Error {
  override readonly name = 'InputProblem';
  readonly problems: readonly Problem[];

  constructor(problems: readonly Problem[]) {
    super(problems.map(describeProblem).join('\n'));
    this.problems = problems;
  }

  /** code of the first problem */
  get code(): ProblemCode {
    return this.problems[0]?.code ?? 'unreadable';
  }
}

/**
 * One sentence naming where, what was expected and what was found.
 * @param problem what is wrong
 * @returns plain text, no final stop
 */
export function describeProblem(problem: Problem): string {
  const where = [
    problem.path,
    problem.row === undefined ? undefined : `row ${problem.row}`,
    problem.column === undefined ? undefined : `column ${problem.column}`,
  ].filter((part) => part !== undefined);
  const place = where.length === 0 ? '' : `${where.join(', ')}: `;
  return `${place}expected ${problem.expected}, found ${problem.found}`;
}

/** Lets long work say how far it is and ask whether it should go on. */
export interface Watch {
  /** @param fraction share of the work that is done, 0 … 1 */
  report(fraction: number): void;
  /** @returns true when the caller wants the work to end */
  stopped(): boolean;
}

/** Thrown by long work when its watch says stop. */
export class Stopped extends Error {
  override readonly name = 'Stopped';
}

/**
 * A remark by code and values; `present` puts it in words.
 * Used for reasons, assumptions, cautions and the record's notes.
 */
export interface Remark {
  code: string;
  /** path into the site file of the field it concerns */
  path: string | null;
  values: Record<string, number | string>;
  unit: string | null;
  source: string | null;
  /** how far the open point moves a figure; null until robustness is computed */
  effect: { figure: string; low: number; high: number; changesVerdict: boolean } | null;
  /** empty in the engine; filled from the message catalogue */
  text: string;
}

/**
 * A remark with the optional parts filled in.
 * @param code name of the remark in the message catalogue
 * @param values numbers and names the sentence needs
 * @param rest path, unit and source where there are any
 * @returns the remark, without words
 */
export function remark(
  code: string,
  values: Record<string, number | string> = {},
  rest: { path?: string; unit?: string; source?: string } = {},
): Remark {
  return {
    code,
    path: rest.path ?? null,
    values,
    unit: rest.unit ?? null,
    source: rest.source ?? null,
    effect: null,
    text: '',
  };
}
