import type { Job } from '#libs/store/job.js';

/** A job as the API shows it: what it was asked, how far it is, what came of it. */
export function showJob(job: Job) {
  const {
    publicId: id,
    siteId,
    kind,
    state,
    attempt,
    progress,
    error,
    revision,
    recordId,
    createdAt,
    finishedAt,
  } = job;
  const links = {
    self: `/api/jobs/${id}`,
    events: `/api/jobs/${id}/events`,
    revision: revision === null ? null : `/api/sites/${siteId}/revisions/${revision}`,
    record: recordId === null ? null : `/api/sites/${siteId}/records/${recordId}`,
  };
  const known = { id, siteId, kind, state, attempt, progress, error, revision, recordId, createdAt, finishedAt };
  return { ...known, ...paceOf(job), links };
}

/** Rate and time left at that rate, as of its worker's last word; null before there is one. */
function paceOf({ state, progress, startedS, heartbeatS, request }: Job) {
  const elapsedS = startedS === null ? 0 : heartbeatS - startedS;
  if (state !== 'running' || !(elapsedS > 0) || !(progress > 0)) return { remainingS: null, bytesPerS: null };
  const bytes = (request as { file?: { bytes: number } }).file?.bytes;
  return {
    remainingS: (elapsedS * (1 - progress)) / progress,
    bytesPerS: bytes === undefined ? null : (bytes * progress) / elapsedS,
  };
}
