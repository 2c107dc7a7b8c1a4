/** Which limit tables and which discharge and conductor rules apply. */
export type RuleSet = 'iec' | 'ieee';

/** The engineering answer, mildest first. */
export type Verdict = 'clear' | 'watch' | 'avoid';

/** What a rule set says about capacitors, their discharge and their conductors. */
export interface CapacitorRules {
  /** standard named beside capacitor duties */
  source: string;
  /** U_nom/(1−p) against U_N, or null where the rule set has no such limit */
  continuousVoltageRatio: number | null;
  /** rms voltage against U_N */
  highestVoltageRatio: number;
  /** crest voltage against √2·U_N, or null */
  crestVoltageRatio: number | null;
  /** rms current against I_N */
  currentRatio: number;
  /** does the current limit grow with the capacitance of the corner */
  currentGrowsWithCapacitance: boolean;
  /** reactive power against Q_N, or null */
  reactivePowerRatio: number | null;
  /** peak inrush against I_N, or null */
  inrushRatio: number | null;
  /** conductors and disconnector against the bank's fundamental current */
  conductorRatio: number;
  conductorSource: string;
  dischargeSource: string;
  dischargeToV: number;
  /**
   * @param ratedV U_N [V]
   * @returns longest time to the discharged voltage [s]
   */
  dischargeWithinS(ratedV: number): number;
}

/** Capacitor rules by rule set, each named with its edition. */
export const CAPACITOR_RULES: Record<RuleSet, CapacitorRules> = {
  iec: {
    source: 'IEC 60831-1:2014',
    continuousVoltageRatio: 1,
    highestVoltageRatio: 1.1,
    crestVoltageRatio: null,
    currentRatio: 1.3,
    currentGrowsWithCapacitance: true,
    reactivePowerRatio: null,
    inrushRatio: 100,
    conductorRatio: 1.43,
    conductorSource: 'IEC 60831-1:2014',
    dischargeSource: 'IEC 60831-1:2014',
    dischargeToV: 75,
    dischargeWithinS: () => 180,
  },
  ieee: {
    source: 'IEEE 18-2012',
    continuousVoltageRatio: null,
    highestVoltageRatio: 1.1,
    crestVoltageRatio: 1.2,
    currentRatio: 1.35,
    currentGrowsWithCapacitance: false,
    reactivePowerRatio: 1.35,
    inrushRatio: null,
    conductorRatio: 1.35,
    conductorSource: 'NEC 460',
    dischargeSource: 'NEC 460',
    dischargeToV: 50,
    dischargeWithinS: (ratedV) => (ratedV <= 1000 ? 60 : 300),
  },
};

/** Overvoltage a capacitor may carry for a time (IEC 60831-1): ratio to U_N and how long. */
export const OVERVOLTAGE_DURATIONS: readonly { ratio: number; duration: string }[] = [
  { ratio: 1.0, duration: 'continuous' },
  { ratio: 1.1, duration: '8 h in every 24 h' },
  { ratio: 1.15, duration: '30 min in every 24 h' },
  { ratio: 1.2, duration: '5 min' },
  { ratio: 1.3, duration: '1 min' },
];

/** Ambient categories (IEC 60831-1): greatest, mean over 24 h, mean over a year [°C]. */
export const AMBIENT_CATEGORIES = {
  A: [40, 30, 20],
  B: [45, 35, 25],
  C: [50, 40, 30],
  D: [55, 45, 35],
} as const;

const SEVERITY: Record<Verdict, number> = { clear: 0, watch: 1, avoid: 2 };

/**
 * The graver of two verdicts; null (not judged) never outweighs a judgement.
 * @param a first
 * @param b second
 * @returns the graver
 */
export function graver<A extends Verdict | null>(a: A, b: Verdict | null): Verdict | A {
  if (b === null) return a;
  if (a === null) return b;
  return SEVERITY[b] > SEVERITY[a] ? b : a;
}
