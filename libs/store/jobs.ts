import { randomUUID } from 'node:crypto';
import { type EntityManager, In } from 'typeorm';
import { Job, type JobState } from './job.js';
import type { Store } from './store.js';

/** States in which work is still to come. */
export const UNFINISHED: JobState[] = ['queued', 'running'];

/** A claim: which job, and which attempt at it. */
export type Claim = Pick<Job, 'id' | 'attempt'>;

/** What is asked for. */
export type JobRequest = Pick<Job, 'siteId' | 'kind' | 'inputHash' | 'engineVersion' | 'request'>;

/**
 * Queues work; where the same is already queued or running, that is returned instead.
 * @param manager the write's manager
 * @param request what is asked for
 * @param now moment of the request
 */
export async function insertJob(manager: EntityManager, request: JobRequest, now: Date): Promise<Job> {
  const { siteId, inputHash, engineVersion } = request;
  const same = await manager.findOneBy(Job, { siteId, inputHash, engineVersion, state: In(UNFINISHED) });
  if (same !== null) return same;
  const job = manager.create(Job, {
    ...request,
    publicId: randomUUID(),
    state: 'queued',
    attempt: 0,
    step: 1,
    heartbeatS: now.getTime() / 1000,
    progress: 0,
    error: null,
    revision: null,
    recordId: null,
    startedS: null,
    createdAt: now,
    finishedAt: null,
  });
  return manager.save(Job, job);
}

/**
 * The jobs of a kind whose work is still to come, oldest first.
 * @param kind of job
 */
export function unfinishedJobs(manager: EntityManager, kind: string): Promise<Job[]> {
  return manager.find(Job, { where: { kind, state: In(UNFINISHED) }, order: { id: 'ASC' } });
}

/**
 * Takes the oldest job that waits, or whose worker has not been heard of for the length of the lease.
 * @param store the store
 * @param nowS UTC [s]
 * @param leaseS silence after which a worker is given up [s]
 * @returns the job under its new attempt, null where there is none
 */
export function claimJob(store: Store, nowS: number, leaseS: number): Promise<Job | null> {
  return store.write(async (manager) => {
    const search = manager
      .createQueryBuilder(Job, 'job')
      .where("job.state = 'queued' OR (job.state = 'running' AND job.heartbeatS < :silentS)", {
        silentS: nowS - leaseS,
      })
      .orderBy('job.id')
      .limit(1);
    if (store.skipsLocked) search.setLock('pessimistic_write').setOnLocked('skip_locked');
    const job = await search.getOne();
    if (job === null) return null;
    const taken = { attempt: job.attempt + 1, step: job.step + 1, heartbeatS: nowS, startedS: nowS };
    await manager.update(Job, { id: job.id }, { ...taken, state: 'running', progress: 0 });
    return { ...job, ...taken, state: 'running', progress: 0 };
  });
}

/**
 * Says that a job's worker lives, and how far it is.
 * @returns false where the claim no longer holds: the job was cancelled or given to another worker
 */
export async function beat(
  manager: EntityManager,
  claim: Claim,
  { nowS, progress }: { nowS: number; progress: number },
): Promise<boolean> {
  return change(manager, claim, { heartbeatS: nowS, progress });
}

/**
 * Ends a claimed job.
 * @returns false where the claim no longer holds; nothing is changed then
 */
export async function finishJob(
  manager: EntityManager,
  claim: Claim,
  end: Pick<Job, 'state' | 'error' | 'finishedAt'> & Partial<Pick<Job, 'revision' | 'recordId'>>,
): Promise<boolean> {
  const progress = end.state === 'done' ? { progress: 1 } : {};
  return change(manager, claim, { ...end, ...progress });
}

/** Puts a claimed job back in the queue, for whoever comes next. */
export async function releaseJob(manager: EntityManager, claim: Claim): Promise<boolean> {
  return change(manager, claim, { state: 'queued' });
}

type Change = Partial<
  Pick<Job, 'state' | 'heartbeatS' | 'progress' | 'error' | 'revision' | 'recordId' | 'finishedAt'>
>;

async function change(manager: EntityManager, { id, attempt }: Claim, values: Change): Promise<boolean> {
  const held = { id, attempt, state: 'running' as const };
  const { affected } = await manager.update(Job, held, { ...values, step: () => 'step + 1' });
  return affected === 1;
}

/**
 * Cancels a job that is not finished, whoever works on it.
 * @returns false where it was finished already, or does not exist
 */
export async function cancelJob(manager: EntityManager, id: number, now: Date): Promise<boolean> {
  const { affected } = await manager.update(
    Job,
    { id, state: In(UNFINISHED) },
    { state: 'cancelled', finishedAt: now, step: () => 'step + 1' },
  );
  return affected === 1;
}
