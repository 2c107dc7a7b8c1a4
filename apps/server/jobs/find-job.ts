import { InputProblem } from '#libs/engine/index.js';
import { Job } from '#libs/store/job.js';
import type { Store } from '#libs/store/store.js';
import { StoredSite } from '#libs/store/stored-site.js';
import type { Actor } from '../people/actor.js';

/**
 * A job of the actor's organisation by what it is called outside.
 * @throws InputProblem `not-found`, also where it is another organisation's
 */
export async function findJob(store: Store, { organisationId }: Actor, publicId: string): Promise<Job> {
  const job = await store.read((manager) => manager.findOneBy(Job, { publicId }));
  const own = { id: job?.siteId ?? '', organisationId };
  if (job !== null && (await store.read((manager) => manager.existsBy(StoredSite, own)))) return job;
  throw new InputProblem([
    { code: 'not-found', expected: 'a job that exists', found: JSON.stringify(publicId.slice(0, 60)) },
  ]);
}
