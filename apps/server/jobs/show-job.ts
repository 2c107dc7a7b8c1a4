import type { Job } from '#libs/store/job.js';

/** A job as the API shows it: what it was asked, how far it is, what came of it. */
export function showJob(job: Job) {
  const { id, siteId, kind, state, attempt, progress, error, revision, createdAt, finishedAt } = job;
  const links = {
    self: `/api/jobs/${id}`,
    events: `/api/jobs/${id}/events`,
    revision: revision === null ? null : `/api/sites/${siteId}/revisions/${revision}`,
  };
  return { id, siteId, kind, state, attempt, progress, error, revision, createdAt, finishedAt, links };
}
