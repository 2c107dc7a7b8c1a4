import type { CornerCase } from './corners.js';

/** Harmonic voltages of one bus. */
export interface BusFlow {
  /** V_h, phase value [V] */
  voltageV: Float64Array;
  /** THD of voltage, % of nominal */
  voltageDistortionPct: number;
}

/** Harmonic voltages and currents at one level in one corner, at the orders present; arrays are reused between visits. */
export interface Flow {
  /** index into the levels; 0 is the bank out */
  level: number;
  levelKvar: number;
  /** connected stages per group; the first of the count vectors with these flows */
  vector: Int32Array;
  /** per group, 1 where one of those count vectors has a stage of it in */
  connected: Uint8Array;
  corner: CornerCase;
  ordersH: Float64Array;
  /** V_h at the bank's bus, phase value [V] */
  voltageV: Float64Array;
  /** every bus, in the order of the network's names */
  buses: BusFlow[];
  /** current in the source path, per phase [A] */
  sourceA: Float64Array;
  /** current of the whole bank, per phase [A] */
  bankA: Float64Array;
  /** current of one stage of each group, per phase [A] */
  stageA: Float64Array[];
  /** THD of voltage at the bank's bus, % of nominal */
  voltageDistortionPct: number;
  /** total demand distortion of the source current, % of I_L; 0 where I_L is 0 */
  currentDistortionPct: number;
}
