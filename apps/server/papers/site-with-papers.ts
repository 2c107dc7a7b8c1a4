import type { PlanRequest } from '#libs/contract/plan-request-schema.js';
import { readSiteWithMathjs } from '#libs/contract/read-site-with-mathjs.js';
import type { Site, SitePapers } from '#libs/engine/index.js';
import { findPaper } from '#libs/store/papers.js';
import type { Store } from '#libs/store/store.js';
import type { StoredSite } from '#libs/store/stored-site.js';

/**
 * A site with the shared papers it refers to in place; which versions they are stays with it, and so with its revision.
 * @param store the store
 * @param stored the site; only papers of its organisation are looked for
 * @param asked papers this plan takes in place of the site's own
 * @returns the site, as the engine takes it
 * @throws InputProblem where a paper does not exist, or what comes together does not fit
 */
export async function siteWithPapers(
  store: Store,
  { document, organisationId }: Pick<StoredSite, 'document' | 'organisationId'>,
  asked: PlanRequest['papers'],
): Promise<Site> {
  const given = await readSiteWithMathjs(document);
  const papers: SitePapers = {};
  const { papers: _, ...whole }: Record<string, unknown> = { ...document };
  for (const kind of ['tariff', 'prices'] as const) {
    const reference = asked?.[kind] ?? given.papers?.[kind];
    if (reference === undefined) continue;
    const paper = await store.read((manager) =>
      findPaper(manager, { organisationId, kind, ...reference }, `papers.${kind}`),
    );
    // a tariff that names itself otherwise keeps its name
    whole[kind] = { name: paper.name, ...paper.document };
    papers[kind] = { name: paper.name, version: paper.version, date: paper.date };
  }
  if (papers.tariff === undefined && papers.prices === undefined) return given;
  return { ...(await readSiteWithMathjs(whole)), papers };
}
