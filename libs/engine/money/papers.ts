import type { CatalogueInput } from '../layout/catalogue.js';

/** Which reactive energy or power a rule looks at. */
export type ReactiveBasis = 'lagging' | 'leading' | 'both' | 'net';

/** A named part of the year, by the local time of an interval's beginning; absent parts mean always. */
export interface TariffWindow {
  name: string;
  /** 1 … 12 */
  months?: number[];
  /** 1 Monday … 7 Sunday, 8 a listed holiday */
  days?: number[];
  /** [from, to) of the clock; from above to runs over midnight of one date */
  hours?: [from: number, to: number][];
}

/** How the power factor of a period is formed. */
export interface FactorRule {
  basis?: 'energy' | 'atMaxKw' | 'maxima';
  reactive?: ReactiveBasis;
  /** null leaves it unrounded */
  decimals?: number | null;
}

/** Roundings and bounds every scale may add. */
export interface ScaleBounds {
  pctDecimals?: number;
  minPct?: number;
  maxPct?: number;
}

/** Per cent for each point (0.01) below or above a reference. */
export interface PointsScale extends ScaleBounds {
  form: 'points';
  reference: number;
  below?: { downTo: number; pctPerPoint: number }[];
  above?: { upTo: number; pctPerPoint: number }[];
  cumulative?: boolean;
  count?: 'exact' | 'orPart' | 'whole';
}

/** Per cent by the last step reached. */
export interface StepsScale extends ScaleBounds {
  form: 'steps';
  steps: { from: number; pct: number }[];
}

/** Per cent proportional to reference / factor − 1. */
export interface RatioScale extends ScaleBounds {
  form: 'ratio';
  reference: number;
  belowPct: number;
  abovePct: number;
}

/** Per cent as a function of the power factor; positive is a surcharge. */
export type Scale = PointsScale | StepsScale | RatioScale;

/** What every clause may say. */
export interface ClauseCommon {
  /** unique within the tariff */
  name: string;
  /** 1 … 12 */
  months?: number[];
  /** names of windows, a union */
  windows?: string[];
  taxed?: boolean;
  per?: 'month' | 'day' | 'hour' | 'interval';
  reactive?: ReactiveBasis;
}

/** How a demand quantity becomes the billed one. */
export interface BilledQuantity {
  wholeUnits?: 'up' | 'down' | 'nearest';
  minimum?: number;
  ratchet?: { pct: number; months: number; of?: number[] };
}

/** An amount a month. */
export interface FixedClause extends ClauseCommon {
  kind: 'fixed';
  amountPerMonth: number;
}

/** Energy times a price: one of `pricePerUnit`, `prices`, `blocks`. */
export interface EnergyClause extends ClauseCommon {
  kind: 'energy';
  of?: 'kWh' | 'kVAh';
  pricePerUnit?: number;
  /** price by window */
  prices?: Record<string, number>;
  /** the last block has no upper end */
  blocks?: { upTo: number | null; pricePerUnit: number }[];
}

/** Energy of each period times a percentage that depends on its power factor. */
export interface EnergyByFactorClause extends ClauseCommon {
  kind: 'energyByFactor';
  pricePerUnit: number;
  scale: Scale;
}

/** Reactive energy beyond a share of the active: `freeRatio` and a price, or `tiers`. */
export interface KvarhBeyondRatioClause extends ClauseCommon {
  kind: 'kvarhBeyondRatio';
  freeRatio?: number;
  pricePerUnit?: number;
  tiers?: { aboveRatio: number; pricePerUnit: number }[];
  cumulative?: boolean;
  byWindow?: boolean;
}

/** The greatest kvar beyond a share of the greatest kW. */
export interface KvarBeyondRatioClause extends ClauseCommon, BilledQuantity {
  kind: 'kvarBeyondRatio';
  ratio: number;
  at?: 'maxKvar' | 'maxKw';
  pricePerUnit: number;
}

/** Greatest demand times a price: one of `pricePerUnit`, `prices`. */
export interface DemandClause extends ClauseCommon, BilledQuantity {
  kind: 'demand';
  basis: 'kW' | 'kVA' | 'kWOrKvaShare';
  kvaShare?: number;
  scale?: Scale;
  pricePerUnit?: number;
  prices?: Record<string, number>;
}

/** A demand contracted for, with a dearer price for what is drawn beyond it; formed once a month. */
export interface ContractedDemandClause extends ClauseCommon {
  kind: 'contractedDemand';
  basis: 'kW' | 'kVA' | 'kWOrKvaShare';
  kvaShare?: number;
  wholeUnits?: 'up' | 'down' | 'nearest';
  /** in the unit of the basis */
  contracted: number;
  pricePerUnit: number;
  overrunPricePerUnit: number;
  /** beyond the contracted value and still at its price; 0 where absent [%] */
  tolerancePct?: number;
  /** of the contracted value, billed whatever is drawn; 100 where absent [%] */
  leastPct?: number;
}

/** A percentage of earlier lines that depends on the power factor. */
export interface PercentClause extends ClauseCommon {
  kind: 'percent';
  scale: Scale;
  /** names of earlier clauses */
  applies: string[] | 'all';
}

/** An amount by an expression over monthly quantities. */
export interface FormulaClause extends ClauseCommon {
  kind: 'formula';
  expression: string;
}

/** A line of the bill. */
export type Clause =
  | FixedClause
  | EnergyClause
  | EnergyByFactorClause
  | KvarhBeyondRatioClause
  | KvarBeyondRatioClause
  | DemandClause
  | ContractedDemandClause
  | PercentClause
  | FormulaClause;

/** A tariff; checked at the door, not priced yet. */
export interface Tariff {
  name?: string;
  /** null leaves lines unrounded */
  decimals?: number | null;
  taxPct?: number;
  /** length of a demand block [s] */
  demandS?: number;
  factor?: FactorRule;
  /** local dates "2024-12-25" */
  holidays?: string[];
  windows?: TariffWindow[];
  clauses?: Clause[];
  /** totals of real bills, by month "2024-01" */
  billed?: { month: string; total: number }[];
}

/** What a switch of one kind costs and how long it lasts. */
export interface SwitchPrice {
  kind: string;
  perStage?: number;
  perKvar?: number;
  lifeSwitchings?: number;
  /** [W/kvar] */
  lossWPerKvar?: number;
}

/** A price book; absent prices are 0. Checked at the door, not used yet. */
export interface PriceBook {
  name?: string;
  /** true where the prices are made up */
  invented?: boolean;
  currency?: string;
  /** local date "2026-01-01" */
  validFrom?: string;
  /** local date "2026-12-31" */
  validTo?: string;
  perKvar?: number;
  perStage?: number;
  reactors?: { reactorPct: number; perKvar: number }[];
  installationFixed?: number;
  installationPerKvar?: number;
  fixed?: number;
  contingencyPct?: number;
  switches?: SwitchPrice[];
  cabinets?: { name: string; price: number }[];
  maintenancePerYear?: number;
  maintenancePerStage?: number;
  lossWPerKvar?: { plain?: number; reactor?: number };
  lossPricePerKwh?: number;
  capacitorLifeYears?: number;
  replacementFactor?: number;
}

/** Discounting; checked at the door, not used yet. */
export interface Finance {
  discountPct?: number;
  horizonYears?: number;
  billGrowthPct?: number;
  costGrowthPct?: number;
}

/** The catalogue is read by `layout`; its cabinets and switches are not used yet. */
export type Catalogue = CatalogueInput;
