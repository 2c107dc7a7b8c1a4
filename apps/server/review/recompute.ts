import type { PlanInputs } from '#libs/contract/plan-content.js';
import { InputProblem } from '#libs/engine/index.js';
import type { WorkerPool } from '#libs/jobs/pool/worker-pool.js';
import { readRecord } from '#libs/store/records.js';
import type { Revision } from '#libs/store/revision.js';
import type { Store } from '#libs/store/store.js';
import type { PlanTask, PlanValue } from '../planning/compute-plan.js';

/** Where a computation is done. */
export interface Bench {
  store: Store;
  pool: WorkerPool;
}

/**
 * Computes a revision once more from its frozen inputs, with the engine as it is now; nothing is stored.
 * @param bench store and threads
 * @param revision whose inputs count
 * @param frame what its paper says of itself
 * @throws InputProblem where the record behind it is gone
 */
export async function recompute(
  { store, pool }: Bench,
  revision: Revision,
  frame: PlanTask['frame'],
): Promise<PlanValue> {
  const task: PlanTask = { ...(await frozenTask(store, revision)), frame };
  return pool.run<PlanValue>('computePlan', task);
}

/**
 * The frozen inputs of a revision with the record behind it.
 * @param store the store
 * @param revision whose inputs count
 * @throws InputProblem where the record is gone
 */
export async function frozenTask(store: Store, revision: Revision): Promise<Omit<PlanTask, 'frame'>> {
  const { kind, site, zone } = JSON.parse(revision.inputs) as PlanInputs;
  const { recordId, recordHash } = revision;
  const record = recordId === null ? null : await store.read((manager) => readRecord(manager, recordId));
  if (record === null && recordId !== null) {
    throw new InputProblem([{ code: 'not-found', expected: 'the record the plan was made from', found: recordId }]);
  }
  return { kind, site, zone, record, recordHash };
}
