import type { Job } from '#libs/store/job.js';
import type { JobRequest } from '#libs/store/jobs.js';

/** Long work, wherever it is done. */
export interface Jobs {
  /** Queues work; where the same is already queued or running, that job is returned. */
  submit(request: JobRequest): Promise<Job>;

  /**
   * The job at each change after `afterStep`, the last one finished.
   * @throws InputProblem `not-found`
   */
  progress(id: number, options?: { afterStep?: number; signal?: AbortSignal }): AsyncGenerator<Job, void, undefined>;

  /**
   * Cancels a job that is not finished; nothing of its work is kept.
   * @returns the cancelled job
   * @throws InputProblem `not-found`, or `conflict` where it has ended otherwise
   */
  cancel(id: number): Promise<Job>;

  /**
   * The job once it is finished, or as it is when the wait is over.
   * @throws InputProblem `not-found`
   */
  result(id: number, waitS: number): Promise<Job>;
}
