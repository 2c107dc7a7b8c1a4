import { ask, Refused } from '../api/ask.js';
import type { JobShown } from '../api/shown.js';

/** How a job ended. */
export type JobEnd = JobShown & { state: 'done' | 'failed' | 'cancelled' };

const keyOf = (siteId: string) => `varwright:job:${siteId}`;
/** Asked so often [ms]. */
const ASK_AGAIN_MS = 400;

/** @returns the job this browser waited for when the page was left */
export function keptJob(siteId: string): number | null {
  const id = Number(localStorage.getItem(keyOf(siteId)) ?? Number.NaN);
  return Number.isInteger(id) && id > 0 ? id : null;
}

/**
 * Follows a job to its end, over lost connections and reloads.
 * @returns stops following; the job goes on
 */
export function followJob(
  siteId: string,
  jobId: number,
  ears: { moved(job: JobShown): void; ended(end: JobEnd): void },
): () => void {
  localStorage.setItem(keyOf(siteId), String(jobId));
  let isOver = false;
  let timer: ReturnType<typeof setTimeout> | undefined;
  const hear = (job: JobShown) => {
    if (isOver) return;
    if (!isEnded(job)) {
      ears.moved(job);
      return;
    }
    isOver = true;
    localStorage.removeItem(keyOf(siteId));
    ears.ended(job);
  };
  const askAgain = async () => {
    try {
      hear((await ask<JobShown>(`/api/jobs/${jobId}`)).body);
    } catch (error) {
      if (error instanceof Refused) {
        isOver = true;
        localStorage.removeItem(keyOf(siteId));
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
