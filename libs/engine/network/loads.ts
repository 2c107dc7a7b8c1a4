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
  /** angle to a reference common to the loads of a bus, where known [°]; those with angles add as phasors */
  angleDeg?: number;
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

/** The loads as the site file gives them; an absent list means unknown, an empty one declares there is none. */
export interface LoadsInput {
  motorSharePct?: number;
  distorting?: DistortingLoad[];
  backgroundPct?: OrderPct[];
  dampingKw?: { max?: number; min?: number };
  summation?: 'exponent' | 'arithmetic';
}

/** The loads with defaults filled in; null lists are unknown. */
export interface Loads {
  motorSharePct: number;
  distorting: DistortingLoad[] | null;
  backgroundPct: OrderPct[] | null;
  dampingKw: { max: number; min: number };
  summation: 'exponent' | 'arithmetic';
}
