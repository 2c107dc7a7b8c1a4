import { createHash, randomUUID } from 'node:crypto';
import { ENGINE_VERSION, type LoadRecord } from '#libs/engine/index.js';
import type { Hands, Runner } from '#libs/jobs/in-process-jobs.js';
import type { WorkerPool } from '#libs/jobs/pool/worker-pool.js';
import type { Job } from '#libs/store/job.js';
import { finishJob } from '#libs/store/jobs.js';
import { paperFormOf } from '#libs/store/paper-form.js';
import { frozenMark } from '#libs/store/plan-hash.js';
import { readRecord } from '#libs/store/records.js';
import { type AskedAct, carryOut } from '#libs/store/reviews.js';
import type { Revision } from '#libs/store/revision.js';
import { insertRevision } from '#libs/store/revisions.js';
import { noSite } from '#libs/store/sites.js';
import type { Store } from '#libs/store/store.js';
import { StoredSite } from '#libs/store/stored-site.js';
import type { PlanTask, PlanValue } from './compute-plan.js';
import { frameOf, sheetOf } from './frame-of.js';
import type { FrozenPlan } from './plan-request.js';
import { contentOf } from './planning.js';

/**
 * Does the jobs of planning: computes in a worker thread, then writes revision, proposal and the job's end at once.
 * @param store the store
 * @param pool worker threads started with planning-worker
 */
export function planRunner(store: Store, pool: WorkerPool): Runner {
  return async (job, hands) => {
    const frozen = job.request as FrozenPlan;
    const { recordId } = frozen;
    const record = recordId === null ? null : await store.read((manager) => readRecord(manager, recordId));
    // It can be removed while the job waits; then the job's end is a refusal, not a fault.
    if (record === null && recordId !== null) throw noSite(`record ${recordId}`);
    while (!(await attempt({ store, pool, job, frozen, record }, hands))) {
      // Another revision took the number this proposal was made for: make it again for the next one.
    }
  };
}

interface Work {
  store: Store;
  pool: WorkerPool;
  job: Job;
  frozen: FrozenPlan;
  record: LoadRecord | null;
}

/** @returns false where the revision's number was taken meanwhile */
async function attempt({ store, pool, job, frozen, record }: Work, hands: Hands): Promise<boolean> {
  const site = await store.read((manager) => manager.findOneBy(StoredSite, { id: job.siteId }));
  if (site === null) throw noSite(job.siteId);
  const content = contentOf(frozen);
  const revision = numberedRevision(site, frozen, content);
  const task: PlanTask = { ...frozen, record, frame: { ...(await frameOf(store, revision)), ...sheetOf(frozen) } };
  const { result, proposal, ...rest } = await pool.run<PlanValue>('computePlan', task, hands);
  const sha256 = createHash('sha256').update(proposal).digest('hex');
  const complete: Revision = { ...revision, ...rest, result: JSON.stringify(result), verdict: result.verdict };
  return store.write(async (manager) => {
    const standing = await insertRevision(manager, {
      revision: complete,
      proposal: { bytes: Buffer.from(proposal), sha256 },
    });
    if (standing === null) return false;
    if (standing === complete) await carryOut(manager, complete, preparation(complete, frozen, proposal));
    const end = { state: 'done', error: null, revision: standing.revision, finishedAt: new Date() } as const;
    if (!(await finishJob(manager, job, end))) throw new Error('the job was taken from this worker');
    return true;
  });
}

/** The first line of a revision's log: who made it, and the marks plan and paper are known again by. */
function preparation(revision: Revision, { preparedBy, author }: FrozenPlan, proposal: Uint8Array): AskedAct {
  const by = preparedBy ?? { id: 'unnamed', name: author ?? 'unnamed', role: 'planner' };
  return { by, act: { act: 'prepare', ...frozenMark(revision, proposal) }, now: revision.createdAt, seen: null };
}

type Numbered = Omit<Revision, 'result' | 'proposed' | 'rival' | 'verdict'>;

function numberedRevision(site: StoredSite, frozen: FrozenPlan, content: { text: string; hash: string }): Numbered {
  return {
    id: randomUUID(),
    siteId: site.id,
    number: `P-${String(site.number).padStart(4, '0')}`,
    revision: site.lastRevision + 1,
    kind: frozen.kind,
    recordId: frozen.recordId,
    recordHash: frozen.recordHash,
    inputs: content.text,
    engineVersion: ENGINE_VERSION,
    contentHash: content.hash,
    createdAt: new Date(),
    author: frozen.author,
    reason: frozen.reason,
    paperForm: paperFormOf(frozen),
  };
}
