import type { LimitsInput } from '../duty/limit-editions.js';
import type { RuleSet } from '../duty/rules.js';
import type { BankPlace, CurrentTransformer, GeneratorRule } from '../duty/site-facts.js';
import type { BankInput } from '../layout/bank.js';
import type { CatalogueInput } from '../layout/catalogue.js';
import type { Finance, PriceBook, Tariff } from '../money/papers.js';
import type { LoadsInput } from '../network/loads.js';
import type { NetworkInput } from '../network/topology.js';
import type { Control } from '../operation/control.js';
import type { EstimateInput } from '../requirement/estimate-input.js';
import type { SupplyInput } from '../supply/supply.js';

/** Was a bank working while the record was taken. */
export type RecordedBank =
  | { state: 'none' }
  | { state: 'out' }
  | { state: 'fixed'; kvar: number }
  | { state: 'logged' }
  | {
      state: 'switching';
      /** the bank that was switching; the site's own where absent */
      bank?: BankInput;
      /** its controller's settings; the site's own where absent */
      control?: Partial<Control>;
      /** the load's own power factor, without the bank, lies between these, as is known or was measured */
      loadPowerFactor?: { min: number; max: number };
    }
  | { state: 'unknown' };

/** A value that stood in the site file in another form. */
export interface Understood {
  path: string;
  /** as it was given */
  given: string;
  /** as it is used, in `unit` */
  value: number;
  unit: string;
}

/** A shared paper that a site refers to; version and date are known once it was looked up. */
export interface PaperReference {
  name: string;
  /** the latest where absent */
  version?: number;
  /** local date from which the paper holds, "2026-01-01" */
  date?: string;
}

/** Where a site's tariff and prices come from, if they do not stand in its file. */
export interface SitePapers {
  tariff?: PaperReference;
  prices?: PaperReference;
}

/** The site file once it is validated: plain numbers in the unit of each name; optional parts as given. */
export interface Site {
  name: string;
  /** local date "2026-01-31", held against validity dates */
  asOf?: string;
  /** IANA name */
  timeZone: string;
  currency?: string;
  rules: RuleSet;
  frequencyHz: number;
  bus: { nominalV: number; highestV?: number };
  meteredAt?: 'bus' | 'primary';
  recordedBank?: RecordedBank;
  target?: { powerFactor?: number; onExport?: 'importOnly' | 'absolute' };
  control?: Partial<Control> & { currentTransformer?: CurrentTransformer; generator?: GeneratorRule };
  supply: SupplyInput;
  loads?: LoadsInput;
  /** the network where the site has several buses */
  network?: NetworkInput;
  bank?: BankInput;
  limits?: LimitsInput;
  /** where the bank stands */
  place?: BankPlace;
  papers?: SitePapers;
  tariff?: Tariff;
  prices?: PriceBook;
  catalogue?: CatalogueInput;
  finance?: Finance;
  /** bills and equipment in place of a meter's record */
  estimate?: EstimateInput;
  /** values that were given in another form; none come from the site file itself */
  understood?: Understood[];
}
