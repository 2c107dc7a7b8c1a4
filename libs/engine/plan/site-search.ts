import { type SettledCatalogue, settleCatalogue } from '../layout/candidates.js';
import { type SearchSpace, searchSpace, switchKinds } from '../layout/search-space.js';
import type { MoneyStudy } from './money-study.js';
import { SiteSearchJudge } from './search-judge.js';
import { setPointsOf } from './set-points.js';
import type { Site } from './site.js';
import type { Study } from './study.js';

/** Everything a search for a site's bank needs. */
export interface SiteSearch {
  catalogue: SettledCatalogue;
  /** keys of the catalogue that were taken from the shipped lists */
  absent: string[];
  space: SearchSpace;
  judge: SiteSearchJudge;
}

/** Customary inductance between stages [µH]. */
const INTER_STAGE_UH = 2;

/**
 * The candidates of a site's catalogue, and what judges and prices them.
 * @param study site and record
 * @param site validated site with a tariff, prices and sizes of stages
 * @param money the site's money without a bank
 * @returns candidates and judge
 * @throws InputProblem where the catalogue makes too many candidates
 * @source method-money
 */
export function siteSearch(study: Study, site: Site, money: MoneyStudy): SiteSearch {
  const { prices } = money;
  if (prices === null) throw new Error('a search needs prices');
  const { catalogue, absent } = settleCatalogue(site.catalogue, INTER_STAGE_UH);
  const space = searchSpace({
    catalogue,
    evenSteps: site.catalogue?.evenSteps ?? true,
    kinds: switchKinds(site.catalogue, site.prices?.switches?.[0]?.kind ?? null),
    setPoints: setPointsOf(site, study.site.targetPowerFactor),
    nominalV: study.site.nominalV,
    greatestKvar: study.load.reactiveKvar.reduce((most, kvar) => Math.max(most, kvar), 0),
  });
  const judge = new SiteSearchJudge({ study, site, money, prices, catalogue, space });
  return { catalogue, absent, space, judge };
}
