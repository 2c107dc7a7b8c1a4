import { type EntityManager, LessThan } from 'typeorm';
import { Revision } from './revision.js';

/**
 * The revisions of a site before one of them.
 * @param manager of a read
 * @param siteId of the site
 * @param before number of that revision
 * @param most how many, the latest first counted
 * @returns in their order, the earliest first
 */
export async function earlierRevisions(
  manager: EntityManager,
  siteId: string,
  before: number,
  most: number,
): Promise<Revision[]> {
  const found = await manager.find(Revision, {
    where: { siteId, revision: LessThan(before) },
    order: { revision: 'DESC' },
    take: most,
  });
  return found.reverse();
}
