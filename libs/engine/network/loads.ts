/** Named spectra; the magnitudes stand in spectra.ts. */
export const SPECTRUM_NAMES = [
  'six-pulse-ideal',
  'six-pulse',
  'drive-benchmark',
  'six-pulse-no-choke',
  'six-pulse-choke',
  'twelve-pulse',
  'active-front-end',
  'single-phase-electronic',
] as const;

export type SpectrumName = (typeof SPECTRUM_NAMES)[number];

/** A magnitude at one harmonic order. */
export interface OrderPct {
  orderH: number;
  /** [%] of the fundamental current (loads) or of nominal voltage (background) */
  pct: number;
  /** angle to a reference common to all loads, the supply’s own voltage say, where known [°]; those with angles add as phasors */
  angleDeg?: number;
  /** a triplen that flows in the neutral, and so not through the bank; absent where the bank sees it */
  sequence?: 'zero';
}

/** A load that injects harmonic current; `orders` wins where both stand. */
export interface DistortingLoad {
  name: string;
  /** bus it stands at, in a network of several; the first where absent */
  bus?: string;
  /** fundamental current per phase at the bus [A] */
  fundamentalA: number;
  spectrum?: SpectrumName;
  orders?: OrderPct[];
}

/** A load whose reactive power swings faster than a contactor's stages can follow. */
export interface FastLoad {
  name: string;
  /** swing of its reactive power [kvar] */
  swingKvar?: number;
  /** time of a swing [s] */
  swingS?: number;
}

/** What an instrument read on the working site; it is never summed with the sources. */
export interface MeasuredDistortion {
  /** holds the reading against the model, or scales the loads' currents until the model meets it; "check" where absent */
  use?: 'check' | 'fit';
  /** bus it was read at; the bank's where absent */
  place?: string;
  /** active power while it was read [kW] */
  loadKw?: number;
  /** kvar of the bank connected while it was read; 0 with the bank out [kvar] */
  bankKvar: number;
  /** local date "2026-01-31" */
  date?: string;
  /** harmonic voltages [% of nominal] */
  voltagePct?: OrderPct[];
  /** harmonic currents of the supply, per phase */
  currentA?: { orderH: number; a: number }[];
}

/** The loads as the site file gives them; an absent list means unknown, an empty one declares there is none. */
export interface LoadsInput {
  motorSharePct?: number;
  distorting?: DistortingLoad[];
  backgroundPct?: OrderPct[];
  dampingKw?: { max?: number; min?: number };
  summation?: 'exponent' | 'arithmetic';
  fast?: FastLoad[];
  measured?: MeasuredDistortion;
}

/** What the currents of all loads at one order are multiplied by. */
export interface OrderFactor {
  orderH: number;
  factor: number;
}

/** The loads with defaults filled in; null lists are unknown. */
export interface Loads {
  motorSharePct: number;
  distorting: DistortingLoad[] | null;
  backgroundPct: OrderPct[] | null;
  dampingKw: { max: number; min: number };
  summation: 'exponent' | 'arithmetic';
  /** fitted to a reading; 1 where absent */
  factors?: readonly OrderFactor[];
}
