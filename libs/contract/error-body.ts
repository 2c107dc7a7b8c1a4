import { describeProblem, type InputProblem, type Problem, type ProblemCode } from '#libs/engine/index.js';
import { Question, type QuestionAsked } from './question.js';

/** The `error` of a failed command; the first problem's fields stand on top. */
export interface ErrorBody {
  error: {
    code: ProblemCode | 'fault';
    message: string;
    path?: string;
    row?: number;
    column?: number;
    problems: readonly Problem[];
    questions?: readonly QuestionAsked[];
  };
}

/** An answer of media type application/problem+json (RFC 9457) with our members added. */
export interface ProblemJson {
  type: string;
  title: string;
  status: number;
  detail: string;
  code: ProblemCode | 'fault';
  path?: string;
  row?: number;
  column?: number;
  problems: readonly Problem[];
  questions?: readonly QuestionAsked[];
  /** answers kept for files with the same header, which may settle the questions */
  offered?: readonly { id: string; name: string }[];
  /** what a stale change had seen, and what stands */
  versions?: { seen: number; current: number };
}

/** HTTP status of an input problem, by the code of its first problem; a fault of ours is 500. */
export const HTTP_STATUS: Record<ProblemCode, number> = {
  usage: 400,
  question: 422,
  missing: 422,
  'unknown-key': 422,
  'wrong-type': 422,
  'wrong-unit': 422,
  'out-of-range': 422,
  inconsistent: 422,
  unreadable: 400,
  'unknown-format': 422,
  'empty-file': 422,
  'no-time-column': 422,
  'no-active-column': 422,
  'no-reactive-column': 422,
  'bad-number': 422,
  'bad-time': 422,
  'mixed-intervals': 422,
  'conflicting-repeat': 422,
  'wrong-length': 422,
  'not-finite': 422,
  'too-large': 413,
  'too-many-levels': 422,
  'unknown-level': 422,
  'load-too-large': 422,
  'not-supported-yet': 422,
  'not-found': 404,
  conflict: 409,
  stale: 412,
  stopped: 409,
};

/** How a command ends. */
export const EXIT = { done: 0, fault: 1, usage: 2, refused: 3, avoid: 6, interrupted: 130 } as const;

/** Exit code of an input problem, by the code of its first problem. */
export const EXIT_CODE: Record<ProblemCode, number> = {
  usage: EXIT.usage,
  question: EXIT.refused,
  missing: EXIT.refused,
  'unknown-key': EXIT.refused,
  'wrong-type': EXIT.refused,
  'wrong-unit': EXIT.refused,
  'out-of-range': EXIT.refused,
  inconsistent: EXIT.refused,
  unreadable: EXIT.refused,
  'unknown-format': EXIT.refused,
  'empty-file': EXIT.refused,
  'no-time-column': EXIT.refused,
  'no-active-column': EXIT.refused,
  'no-reactive-column': EXIT.refused,
  'bad-number': EXIT.refused,
  'bad-time': EXIT.refused,
  'mixed-intervals': EXIT.refused,
  'conflicting-repeat': EXIT.refused,
  'wrong-length': EXIT.refused,
  'not-finite': EXIT.refused,
  'too-large': EXIT.refused,
  'too-many-levels': EXIT.refused,
  'unknown-level': EXIT.refused,
  'load-too-large': EXIT.refused,
  'not-supported-yet': EXIT.refused,
  'not-found': EXIT.refused,
  conflict: EXIT.refused,
  stale: EXIT.refused,
  stopped: EXIT.interrupted,
};

const TITLES: Record<number, string> = {
  400: 'The request cannot be read',
  404: 'Not found',
  409: 'Conflict',
  412: 'Changed in the meantime',
  413: 'Too large',
  422: 'The input is refused',
};

/**
 * An input problem in the form every command prints.
 * @param problem what was thrown
 * @returns the JSON document
 */
export function errorBody(problem: InputProblem): ErrorBody {
  return {
    error: { code: problem.code, message: messageOf(problem), ...placeOf(problem), ...rest(problem) },
  };
}

/**
 * A fault of ours in the same form; its message is for whoever mends it.
 * @param error what was thrown
 * @returns the JSON document
 */
export function faultBody(error: unknown): ErrorBody {
  const message = error instanceof Error ? error.message : String(error);
  return { error: { code: 'fault', message, problems: [] } };
}

/**
 * An input problem as the body of an HTTP answer.
 * @param problem what was thrown
 * @returns the members of application/problem+json
 */
export function problemJson(problem: InputProblem): ProblemJson {
  const status = HTTP_STATUS[problem.code];
  return {
    type: 'about:blank',
    title: problem.code === 'question' ? 'A question is open' : (TITLES[status] ?? 'Refused'),
    status,
    detail: messageOf(problem),
    code: problem.code,
    ...placeOf(problem),
    ...rest(problem),
  };
}

function messageOf(problem: InputProblem): string {
  const [first, ...others] = problem.problems;
  if (first === undefined) return problem.message;
  const more = others.length === 0 ? '' : ` (and ${others.length} more)`;
  return `${describeProblem(first)}${more}`;
}

function placeOf(problem: InputProblem): { path?: string; row?: number; column?: number } {
  const { path, row, column } = problem.problems[0] ?? {};
  return {
    ...(path === undefined ? {} : { path }),
    ...(row === undefined ? {} : { row }),
    ...(column === undefined ? {} : { column }),
  };
}

function rest(problem: InputProblem): { problems: readonly Problem[]; questions?: readonly QuestionAsked[] } {
  return {
    problems: problem.problems,
    ...(problem instanceof Question ? { questions: problem.questions } : {}),
  };
}
