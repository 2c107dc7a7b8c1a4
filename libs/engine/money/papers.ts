import type { CatalogueInput } from '../layout/catalogue.js';

/** A tariff as money.md's schema has it; validated at the door, not priced yet. */
export interface Tariff {
  name?: string;
  clauses?: { name: string; kind: string }[];
}

/** A price book; validated at the door, not used yet. */
export interface PriceBook {
  name?: string;
  currency?: string;
}

/** Discounting; validated at the door, not used yet. */
export interface Finance {
  discountPct?: number;
  horizonYears?: number;
}

/** The catalogue is read by `layout`; its cabinets and switches are not used yet. */
export type Catalogue = CatalogueInput;
