import type { MeterMap } from '#libs/contract/meter-map.js';
import { ask, Refused } from '../api/ask.js';
import type { JobShown, RecordShown } from '../api/shown.js';
import { followJob } from '../desk/follow-job.js';

/** What is said about a meter file. */
export interface Said {
  answers: MeterMap;
  /** name of the kept answers it is read with, empty for none */
  keptMap: string;
  /** the record it extends, empty where it becomes one of its own */
  extendsId: string;
}

/** Who hears of a reading, and may stop listening. */
export interface Listening {
  moved: (job: JobShown) => void;
  signal: AbortSignal;
}

/** So long the server is waited for before the reading is followed [s]. */
const WAIT_S = 1;

/**
 * Sends a meter file and waits until it is read, however long that takes.
 * @returns the record, null where the reading was cancelled
 * @throws Refused with problems or questions, NoConnection where nothing answers
 */
export async function sendMeterFile(
  siteId: string,
  file: File,
  { answers, keptMap, extendsId }: Said,
  listening: Listening,
): Promise<RecordShown | null> {
  const query = new URLSearchParams({ name: file.name, wait: String(WAIT_S) });
  if (Object.keys(answers).length > 0) query.set('map', JSON.stringify(answers));
  if (keptMap !== '') query.set('keptMap', keptMap);
  const path = extendsId === '' ? 'records' : `records/${extendsId}/revisions`;
  const { body, status } = await ask<RecordShown | JobShown>(`/api/sites/${siteId}/${path}?${query}`, {
    method: 'POST',
    body: file,
    headers: { 'content-type': 'application/octet-stream' },
  });
  return status === 202 ? followImport(siteId, (body as JobShown).id, listening) : (body as RecordShown);
}

/**
 * Follows a reading to its end, also one that was begun before the page was loaded.
 * @returns the record, null where the reading was cancelled
 * @throws Refused with problems or questions
 */
export function followImport(siteId: string, jobId: string, { moved, signal }: Listening): Promise<RecordShown | null> {
  return new Promise((resolve, reject) => {
    const ended = (end: JobShown) => {
      if (end.state === 'failed' && end.error !== null) reject(new Refused(end.error));
      else if (end.links.record === null) resolve(null);
      else ask<RecordShown>(end.links.record).then(({ body }) => resolve(body), reject);
    };
    const stop = followJob(siteId, jobId, { moved, ended }, 'import');
    signal.addEventListener('abort', stop, { once: true });
  });
}
