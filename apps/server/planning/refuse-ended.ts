import type { ProblemJson } from '#libs/contract/error-body.js';
import { InputProblem } from '#libs/engine/index.js';
import type { Job } from '#libs/store/job.js';
import { StoredProblem } from '../problem-filter.js';

/**
 * Makes the end of a job that led to nothing the answer to whoever waited for it.
 * @throws StoredProblem where it failed, InputProblem `conflict` where it was cancelled
 */
export function refuseEnded(job: Job): void {
  if (job.state === 'failed') throw new StoredProblem(job.error as ProblemJson);
  if (job.state !== 'cancelled') return;
  throw new InputProblem([{ code: 'conflict', expected: 'a job that is done', found: 'cancelled' }]);
}
