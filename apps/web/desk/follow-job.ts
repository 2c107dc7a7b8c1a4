import { ask, Refused } from '../api/ask.js';
import type { JobShown } from '../api/shown.js';

/** How a job ended. */
export type JobEnd = JobShown & { state: 'done' | 'failed' | 'cancelled' };

/** What a browser waits for: a plan or an assessment, or a file that is being read. */
export type Awaited = 'job' | 'import';

const keyOf = (siteId: string, what: Awaited) => `varwright:${what}:${siteId}`;
/** Asked so often [ms]. */
const ASK_AGAIN_MS = 400;

/** @returns the job this browser waited for when the page was left */
export function keptJob(siteId: string, what: Awaited = 'job'): string | null {
  return localStorage.getItem(keyOf(siteId, what));
}

/**
 * Follows a job to its end, over lost connections and reloads.
 * @returns stops following; the job goes on
 */
export function followJob(
  siteId: string,
  jobId: string,
  ears: { moved(job: JobShown): void; ended(end: JobEnd): void },
  what: Awaited = 'job',
): () => void {
  localStorage.setItem(keyOf(siteId, what), jobId);
  let isOver = false;
  let timer: ReturnType<typeof setTimeout> | undefined;
  const hear = (job: JobShown) => {
    if (isOver) return;
    if (!isEnded(job)) {
      ears.moved(job);
      return;
    }
    isOver = true;
    localStorage.removeItem(keyOf(siteId, what));
    ears.ended(job);
  };
  const askAgain = async () => {
    try {
      hear((await ask<JobShown>(`/api/jobs/${jobId}`)).body);
    } catch (error) {
      if (error instanceof Refused) {
        isOver = true;
        localStorage.removeItem(keyOf(siteId, what));
      }
    }
    if (!isOver) timer = setTimeout(() => void askAgain(), ASK_AGAIN_MS);
  };
  void askAgain();
  return () => {
    isOver = true;
    clearTimeout(timer);
  };
}

function isEnded(job: JobShown): job is JobEnd {
  return job.state === 'done' || job.state === 'failed' || job.state === 'cancelled';
}
