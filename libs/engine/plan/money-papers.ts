import { type SettledFinance, settleFinance } from '../money/cash-flow.js';
import type { PriceBook, Tariff } from '../money/papers.js';
import type { Site } from './site.js';

/** What a site's money is reckoned by, as a paper or a page names it. */
export interface MoneyPapers {
  tariff: Tariff | null;
  prices: PriceBook | null;
  finance: SettledFinance;
  /** code of the site's currency, the price book's where the site gives none, else empty */
  currency: string;
  /** the target has to hold in every month, whatever it costs */
  mustMeetTarget: boolean;
}

/**
 * The papers a site gives, defaults filled in where there is one.
 * @param site its money parts
 * @returns tariff, prices, finance
 */
export function moneyPapers(site: Pick<Site, 'currency' | 'tariff' | 'prices' | 'finance' | 'catalogue'>): MoneyPapers {
  return {
    tariff: site.tariff ?? null,
    prices: site.prices ?? null,
    finance: settleFinance(site.finance).finance,
    currency: site.currency ?? site.prices?.currency ?? '',
    mustMeetTarget: site.catalogue?.mustMeetTarget ?? true,
  };
}
