import type { LimitChoice } from '../duty/limit-editions.js';
import type { RuleSet } from '../duty/rules.js';
import type { SiteFacts } from '../duty/site-facts.js';
import type { Loads } from '../network/loads.js';
import type { Topology } from '../network/topology.js';
import type { Supply } from '../supply/supply.js';
import type { MoneyPapers } from './money-papers.js';
import type { RecordedBank } from './site.js';

/** The site with every default filled in. */
export interface SettledSite {
  name: string;
  asOf: string | null;
  timeZone: string;
  currency: string | null;
  rules: RuleSet;
  frequencyHz: number;
  nominalV: number;
  highestV: number;
  meteredAt: 'bus' | 'primary';
  recordedBank: RecordedBank;
  targetPowerFactor: number;
  onExport: 'importOnly' | 'absolute';
  supply: Supply;
  loads: Loads;
  /** null where the site has one bus */
  topology: Topology | null;
  emcClass: 1 | 2 | 3;
  limits: LimitChoice;
  facts: SiteFacts;
  papers: MoneyPapers;
}
