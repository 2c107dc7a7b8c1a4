import type { StageGroup } from './bank.js';
import type { KvarBasis } from './catalogue.js';

/** Reactances of one stage at the fundamental, per phase, star equivalent [Ω]. */
export interface StageOhm {
  /** X_C = U_N²/Q_N */
  capacitiveOhm: number;
  /** X_L = p·X_C */
  inductiveOhm: number;
  /** R_L = p·X_C / quality, from nominal values */
  resistanceOhm: number;
}

/**
 * Reactances of a stage: X_C = U_N²/Q_N, X_L = p·X_C, R_L = X_L/quality.
 * @param group nameplate of the stage
 * @returns reactances at the fundamental [Ω]
 * @source method-bank
 */
export function stageOhm(group: StageGroup): StageOhm {
  const capacitiveOhm = (group.ratedV * group.ratedV) / (group.ratedKvar * 1000);
  const inductiveOhm = (group.reactorPct / 100) * capacitiveOhm;
  return { capacitiveOhm, inductiveOhm, resistanceOhm: inductiveOhm / group.reactorQuality };
}

/**
 * Reactive power of a stage on a bus: Q = U²/(X_C·(1−p)).
 * @param group nameplate of the stage, 0 ≤ p < 1
 * @param busV U, line to line [V]
 * @returns Q [kvar]
 * @source method-bank
 */
export function effectiveKvar(group: StageGroup, busV: number): number {
  return (busV * busV) / (stageOhm(group).capacitiveOhm * (1 - group.reactorPct / 100)) / 1000;
}

/**
 * The nameplate a size of a catalogue stands for. A detuned stage ordered by its output at nominal bus voltage has
 * Q_N = Q·(1−p)·(U_N/U)²; a plain one, and any size by nameplate, is Q_N itself.
 * @param kvar the catalogue's size [kvar]
 * @param build rated and bus voltage [V], reactor ratio [%]
 * @param basis what the size says
 * @returns Q_N [kvar]
 * @source method-bank
 */
export function nameplateKvar(
  kvar: number,
  { ratedV, nominalV, reactorPct }: { ratedV: number; nominalV: number; reactorPct: number },
  basis: KvarBasis,
): number {
  if (basis === 'rated' || reactorPct === 0) return kvar;
  return kvar * (1 - reactorPct / 100) * (ratedV / nominalV) ** 2;
}

/**
 * Voltage on a stage's capacitor: U_C = U/(1−p).
 * @param reactorPct p [%]
 * @param busV U, line to line [V]
 * @returns U_C [V]
 * @source method-bank
 */
export function capacitorV(reactorPct: number, busV: number): number {
  return busV / (1 - reactorPct / 100);
}

/**
 * Order at which reactor and capacitor cancel: h = 1/√p.
 * @param reactorPct p [%]
 * @returns tuned order, or null for a plain stage
 * @source method-bank
 */
export function tunedOrderH(reactorPct: number): number | null {
  return reactorPct > 0 ? 1 / Math.sqrt(reactorPct / 100) : null;
}

/**
 * Reactor ratio of a tuned order: p = 100/n².
 * @param orderH tuned order n > 1
 * @returns p [%]
 * @source method-bank
 */
export function reactorPctOfTuned(orderH: number): number {
  return 100 / (orderH * orderH);
}

/**
 * Rated current of a stage: I_N = Q_N/(√3·U_N).
 * @param group nameplate of the stage
 * @returns I_N [A]
 * @source iec-60831-1
 */
export function ratedA(group: StageGroup): number {
  return (group.ratedKvar * 1000) / (Math.sqrt(3) * group.ratedV);
}

/**
 * Capacitance of one phase of the delta: C = Q_N/(3·ω·U_N²).
 * @param group nameplate of the stage
 * @param frequencyHz f [Hz]
 * @returns C [µF]
 * @source iec-60831-1
 */
export function deltaCapacitanceUf(group: StageGroup, frequencyHz: number): number {
  return ((group.ratedKvar * 1000) / (3 * 2 * Math.PI * frequencyHz * group.ratedV * group.ratedV)) * 1e6;
}
