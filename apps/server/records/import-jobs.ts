import { createHash } from 'node:crypto';
import { existsSync } from 'node:fs';
import { canonicalJson } from '#libs/contract/canonical-json.js';
import { ENGINE_VERSION, InputProblem } from '#libs/engine/index.js';
import type { Runner } from '#libs/jobs/in-process-jobs.js';
import type { Job } from '#libs/store/job.js';
import { finishJob, type JobRequest, unfinishedJobs } from '#libs/store/jobs.js';
import type { Store } from '#libs/store/store.js';
import type { ImportOrder, RecordImport } from './record-import.js';
import type { Spool } from './spool.js';

/** Kind of the jobs that read a meter file. */
export const IMPORT = 'import';

/** An order as it waits in its job: the file by its place in the spool. */
export type FrozenImport = Omit<ImportOrder, 'file'> & {
  file: Omit<ImportOrder['file'], 'path'> & { place: string };
};

/**
 * The job that reads a meter file; the same file with the same words about it is the same job.
 * @param spool where the file lies
 * @param order the file and what is said about it
 */
export function importRequest(spool: Spool, order: ImportOrder): JobRequest {
  const { path: _, ...file } = order.file;
  const request: FrozenImport = { ...order, file: { ...file, place: spool.placeOf(order.file) } };
  const inputHash = createHash('sha256')
    .update(canonicalJson({ ...order, file: file.sha256 }))
    .digest('hex');
  return { siteId: order.siteId, kind: IMPORT, inputHash, engineVersion: ENGINE_VERSION, request };
}

/** Places in the spool of files whose import goes on. */
export async function wantedPlaces(store: Store): Promise<string[]> {
  return (await store.read((manager) => unfinishedJobs(manager, IMPORT))).map(placeOf);
}

/** Removes the file of an import that was given up. */
export async function discardImport(spool: Spool, job: Job): Promise<void> {
  await spool.discard({ path: spool.pathAt(placeOf(job)) });
}

/**
 * Does the jobs of reading: reads in a worker thread, then writes record and the job's end at once. The file stays in the
 * spool only where another process is to go on with it.
 */
export function importRunner({
  store,
  spool,
  importer,
}: {
  store: Store;
  spool: Spool;
  importer: RecordImport;
}): Runner {
  return async (job, hands) => {
    const { file, ...said } = job.request as FrozenImport;
    const { place, ...facts } = file;
    const order: ImportOrder = { ...said, file: { ...facts, path: spool.pathAt(place) } };
    try {
      if (!existsSync(order.file.path)) throw lostFile();
      const read = await importer.read(order, hands);
      await store.write(async (manager) => {
        const record = await importer.insert(manager, read);
        const end = { state: 'done', error: null, recordId: record.id, finishedAt: new Date() } as const;
        if (!(await finishJob(manager, job, end))) throw new Error('the job was taken from this worker');
      });
    } finally {
      if (!hands.signal.aborted || !(await isUnfinished(store, job.id))) await discardImport(spool, job);
    }
  };
}

function placeOf(job: Job): string {
  return (job.request as FrozenImport).file.place;
}

async function isUnfinished(store: Store, id: number): Promise<boolean> {
  const jobs = await store.read((manager) => unfinishedJobs(manager, IMPORT));
  return jobs.some((job) => job.id === id);
}

function lostFile(): InputProblem {
  const found = 'none: it was lost with the server that took it; send it again';
  return new InputProblem([{ code: 'stopped', path: 'file', expected: 'the file that was sent', found }]);
}
