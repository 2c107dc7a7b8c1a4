import { resistanceGrowth } from '../quantity/resistance-growth.js';
import { pathImpedanceInto } from '../supply/supply-path.js';
import type { NetworkCase } from './corners.js';

/** A circuit without any loss has no admittance at its resonance; with this much in its place results stay numbers [S]. */
export const LEAST_SIEMENS = 1e-12;

/** A complex column over orders, real and imaginary parts apart; length n. */
export interface ComplexColumn {
  re: Float64Array;
  im: Float64Array;
}

/** The network without the bank, tabled over orders: what does not depend on the bank is computed once. */
export interface NetworkTable {
  ordersH: Float64Array;
  /** Z_s(h), source and transformers [Ω] */
  source: ComplexColumn;
  /** Y₀(h) = 1/Z₀(h): source path and damping load in parallel [S] */
  bus: ComplexColumn;
}

/** What the damping load is made of. */
export interface DampingModel {
  nominalV: number;
  motorSharePct: number;
}

/** Motor reactance at the fundamental as a share of U²/P, and its resistance as a share of that reactance. */
const MOTOR_REACTANCE_SHARE = 1 / 6;
const MOTOR_RESISTANCE_SHARE = 0.3;

/**
 * Tables Z_s(h) and Y₀(h) of the network without the bank. Damping load P_d: motors P_m = share·P_d with
 * X_m = (1/6)·U²/P_m and R_m = 0.3·X_m growing as h^k; the rest R = U²/((1−share)·P_d), constant, in parallel.
 * @param network supply path and damping
 * @param model bus voltage and motor share
 * @param ordersH orders h ≥ 1, length n
 * @returns tables of length n
 * @source method-network
 */
export function networkTable(network: NetworkCase, model: DampingModel, ordersH: Float64Array): NetworkTable {
  const n = ordersH.length;
  const table: NetworkTable = {
    ordersH,
    source: { re: new Float64Array(n), im: new Float64Array(n) },
    bus: { re: new Float64Array(n), im: new Float64Array(n) },
  };
  const z = new Float64Array(2);
  const baseOhmKw = (model.nominalV * model.nominalV) / 1000;
  const motorKw = (model.motorSharePct / 100) * network.dampingKw;
  const restSiemens = (network.dampingKw - motorKw) / baseOhmKw;
  const motorOhm = motorKw > 0 ? (MOTOR_REACTANCE_SHARE * baseOhmKw) / motorKw : 0;
  for (let i = 0; i < n; i++) {
    const h = ordersH[i]!;
    pathImpedanceInto(network.path, h, z);
    const square = z[0]! * z[0]! + z[1]! * z[1]!;
    let g = z[0]! / square + restSiemens;
    let b = -z[1]! / square;
    if (motorOhm > 0) {
      const r = MOTOR_RESISTANCE_SHARE * motorOhm * resistanceGrowth(h, network.path.resistanceExponent);
      const x = motorOhm * h;
      const motorSquare = r * r + x * x;
      g += r / motorSquare;
      b -= x / motorSquare;
    }
    table.source.re[i] = z[0]!;
    table.source.im[i] = z[1]!;
    table.bus.re[i] = g;
    table.bus.im[i] = b;
  }
  return table;
}
