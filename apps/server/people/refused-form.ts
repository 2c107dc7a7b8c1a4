import { describeProblem, InputProblem } from '#libs/engine/index.js';
import { describeError } from '../problem-filter.js';

/**
 * What a form that was refused shows, so that it can be sent again.
 * @param error what was thrown
 * @returns status and reason
 * @throws the error itself where it is no refusal
 */
export function refusedForm(error: unknown): { status: number; refused: string } {
  if (!(error instanceof InputProblem)) throw error;
  return {
    status: describeError(error).status,
    refused: `Refused: ${error.problems.map(describeProblem).join('; ')}.`,
  };
}
