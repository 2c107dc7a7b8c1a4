/** A transformer as its nameplate and test sheet give it. */
export interface Transformer {
  /** bus it feeds, in a network of several */
  bus?: string;
  /** [kVA] */
  ratedKva: number;
  /** short-circuit impedance u_k [%] of the rating */
  impedancePct: number;
  /** tolerance on u_k [%]; 0 with a test certificate */
  impedanceTolerancePct?: number;
  /** loss at rated current [kW] */
  loadLossKw?: number;
  /** loss at no load [kW] */
  noLoadLossKw?: number;
  /** magnetising current [%] of rated current */
  noLoadCurrentPct?: number;
}

/** A transformer with defaults filled in; where it stands is the network's matter. */
export type SettledTransformer = Required<Omit<Transformer, 'bus'>>;

/** Fault level at the transformer's primary, or at the bus where no transformer is given [MVA]. */
export interface FaultLevel {
  max: number;
  min?: number;
}

/** The supply as the site file gives it. */
export interface SupplyInput {
  faultLevelMva: FaultLevel;
  rOverX?: number;
  /** exponent k of R ∝ h^k */
  resistanceExponent?: number;
  /** ripple-control frequency of the network [Hz] */
  rippleHz?: number | null;
  arrangement?: 'parallel' | 'separate';
  transformers?: Transformer[];
  /** how the system is earthed */
  earthing?: Earthing;
  /** photovoltaic plant behind the same meter [kW] */
  photovoltaicKw?: number;
}

/** Kinds of system earthing. */
export const EARTHINGS = ['TN-S', 'TN-C', 'TN-C-S', 'TT', 'IT'] as const;

export type Earthing = (typeof EARTHINGS)[number];

/** The supply with every default filled in. */
export interface Supply {
  faultLevelMva: Required<FaultLevel>;
  rOverX: number;
  resistanceExponent: number;
  rippleHz: number | null;
  transformers: SettledTransformer[];
}
