import { Question, type QuestionReading } from '#libs/contract/question.js';
import { InputProblem, type ProblemCode } from '#libs/engine/index.js';
import type { MeterReading } from '../meter-format.js';
import { sameColumns, shownReading } from '../record/reading-shown.js';
import type { Worksheet } from './workbook-parts.js';

/** What a sheet was read as. */
export interface SheetAttempt {
  sheet: Worksheet;
  result: MeterReading | InputProblem;
}

/**
 * With these a sheet is none of meter rows at all, the later the nearer to one; with any other it is one that cannot be read.
 */
const NO_RECORD: readonly ProblemCode[] = [
  'unknown-format',
  'empty-file',
  'no-time-column',
  'no-active-column',
  'no-reactive-column',
  'missing',
];

/**
 * The one sheet of a workbook that holds the record.
 * @param attempts every sheet, as it was read
 * @returns the sheet and its reading
 * @throws Question where several hold different records, InputProblem where none holds one or one of them can't be read
 */
export function chooseSheet(attempts: readonly SheetAttempt[]): { sheet: Worksheet; reading: MeterReading } {
  const [only] = attempts;
  if (attempts.length === 1 && only!.result instanceof InputProblem) throw only!.result;
  const candidates = attempts.filter(({ result }) => !isNoRecord(result));
  const refused = candidates.find(({ result }) => isRefusal(result));
  if (refused !== undefined) throw refused.result;
  const [first] = candidates;
  if (first === undefined) throw mostTelling(attempts);
  const distinct: SheetAttempt[] = [];
  for (const candidate of candidates) {
    if (!distinct.some((other) => isSame(other.result, candidate.result))) distinct.push(candidate);
  }
  if (distinct.length > 1) ask(distinct);
  if (first.result instanceof InputProblem) throw first.result;
  return { sheet: first.sheet, reading: first.result };
}

function isNoRecord(result: SheetAttempt['result']): boolean {
  return isRefusal(result) && result.problems.every(({ code }) => NO_RECORD.includes(code));
}

function isRefusal(result: SheetAttempt['result']): result is InputProblem {
  return result instanceof InputProblem && !(result instanceof Question);
}

function isSame(a: SheetAttempt['result'], b: SheetAttempt['result']): boolean {
  return !(a instanceof InputProblem) && !(b instanceof InputProblem) && sameColumns(a.record, b.record);
}

/** The sheet that came nearest to being a record. */
function mostTelling(attempts: readonly SheetAttempt[]): InputProblem {
  const problems = attempts.map(({ result }) => result as InputProblem);
  const rank = ({ code }: InputProblem) => NO_RECORD.indexOf(code);
  return problems.reduce((best, problem) => (rank(problem) > rank(best) ? problem : best));
}

function ask(attempts: readonly SheetAttempt[]): never {
  const readings = attempts.flatMap(({ sheet, result }): QuestionReading[] => {
    if (result instanceof Question) {
      const [question] = result.questions;
      return question!.readings.map((reading) => ({ ...reading, map: { sheet: sheet.name, ...reading.map } }));
    }
    return result instanceof InputProblem ? [] : [shownReading({ sheet: sheet.name }, result.record)];
  });
  throw new Question([{ id: 'sheet', about: 'which sheet of the workbook holds the record', readings }]);
}
