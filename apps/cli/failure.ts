import { writeSync } from 'node:fs';
import { EXIT, EXIT_CODE, errorBody, faultBody } from '#libs/contract/error-body.js';
import { Question, type QuestionReading } from '#libs/contract/question.js';
import { describeProblem, InputProblem } from '#libs/engine/index.js';
import { hasWritten, say, writeJson } from './output.js';
import { fileOf } from './refused-file.js';

/**
 * Tells of an error: as JSON on stdout where that was asked for, always in words on stderr.
 * @param error what was thrown
 * @param json whether --json stands on the command line
 * @returns the exit code
 */
export async function tellFailure(error: unknown, json: boolean): Promise<number> {
  if (!(error instanceof InputProblem)) {
    say(error instanceof Error ? `fault: ${error.stack ?? error.message}` : `fault: ${String(error)}`);
    if (json && !hasWritten()) await writeJson(faultBody(error));
    return EXIT.fault;
  }
  say(inWords(error));
  if (json && !hasWritten()) await writeJson(errorBody(error));
  return EXIT_CODE[error.code];
}

function inWords(problem: InputProblem): string {
  const file = fileOf(problem);
  const prefix = file === undefined ? '' : `${file}: `;
  if (problem instanceof Question) return `${prefix}${problem.questions.map(questionInWords).join('\n')}`;
  return problem.problems.map((one) => `${prefix}${describeProblem(one)}`).join('\n');
}

/** Each reading with the map that settles it, ready to be saved and given with --map. */
function questionInWords(question: Question['questions'][number]): string {
  return `${question.about}; save one of these and give it with --map:\n${question.readings.map(readingInWords).join('\n')}`;
}

/** A reading by its total, its peak and its first row: in what it differs from the others shows in one of them. */
function readingInWords({ map, maxKw, activeKwh, firstRows }: QuestionReading): string {
  const total = `would give ${shortened(activeKwh)} kWh, at most ${shortened(maxKw)} kW`;
  const [beginning, kw, lagging, leading] = firstRows[0] ?? [];
  const first =
    beginning === undefined ? '' : `; begins ${beginning}: ${kw} kW, ${lagging} kvar lagging, ${leading} kvar leading`;
  return `  ${JSON.stringify(map)}   ${total}${first}`;
}

/** Without the last digits of a sum, which are rounding. */
function shortened(value: number): number {
  return Number(value.toPrecision(12));
}

/** Tells a program that waits for JSON that there won't be an answer; written at once, because the process ends. */
export function tellInterruption(): void {
  if (hasWritten()) return;
  const problem = new InputProblem([{ code: 'stopped', expected: 'time to finish', found: 'an interruption' }]);
  writeSync(1, `${JSON.stringify(errorBody(problem))}\n`);
}
