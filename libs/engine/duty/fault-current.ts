import type { Loads } from '../network/loads.js';
import { strongestOhm } from '../network/network-check.js';
import type { NetworkModel } from '../network/network-model.js';
import type { Supply } from '../supply/supply.js';
import { pathImpedanceInto, type SupplyPath, supplyPath } from '../supply/supply-path.js';

/** Edition the equipment fault current is named after. */
export const FAULT_CURRENT_EDITION = 'IEC 60909-0:2016';

/** Locked-rotor over rated current, and efficiency times power factor, of a group of low-voltage motors. */
const MOTOR = { lockedRotorRatio: 5, efficiencyTimesFactor: 0.8 } as const;
/** Voltage factor of the network above 1 kV that feeds the transformers. */
const NETWORK_C_MAX = 1.1;
/** Voltages up to this above nominal count as a tolerance of +6 %. */
const NARROW_TOLERANCE = 1.06;

/** Fault currents that equipment is chosen by; not those that resonance is computed with. */
export interface FaultCurrent {
  /** voltage factors for the greatest and the least current */
  cMax: number;
  cMin: number;
  /** series impedance at the greatest fault level with the network's voltage factor, per phase [Ω] */
  rOhm: number;
  xOhm: number;
  /** at the least fault level [Ω] */
  weakestOhm: number;
  motorKw: number;
  /** what motors add [kA] */
  motorKa: number;
  /** initial symmetrical current, motors included [kA] */
  greatestKa: number;
  /** factor of the peak */
  kappa: number;
  peakKa: number;
  /** heat of the decaying part over 1 s, as a share of the alternating part's */
  decayShare: number;
  /** constant current that heats as much in 1 s [kA] */
  thermalKa: number;
  /** two-phase, at the least fault level [kA] */
  leastKa: number;
}

/**
 * Greatest and least fault current at the bank's bus: I″ = c·U/(√3·|c_Q·Z_Q + Z_T|) + c·5·I_rM, κ = 1.02 + 0.98·e^(−3R/X),
 * i_p = κ·√2·I″, I_th = I″·√(m + 1) over 1 s, as far from any generator; the transformer's u_k is taken less its tolerance, in place of the correction factor K_T. In a network of
 * several buses c·U/(√3·|Z|) of the strongest standing, the network's own factor left out: an upper bound.
 * @param supply settled supply
 * @param loads settled loads; the motors' share of the damping load counts, and the network's motors
 * @param site bus voltages [V], least fault level at the bus [MVA], frequency [Hz]
 * @param model the network without the bank
 * @returns currents [kA] and what they are made of
 * @source iec-60909-0
 */
export function faultCurrent(
  supply: Supply,
  loads: Loads,
  site: { nominalV: number; highestV: number; shortCircuitMinMva: number; frequencyHz: number },
  model: NetworkModel,
): FaultCurrent {
  const { nominalV, highestV } = site;
  const narrow = nominalV <= 1000 && highestV <= NARROW_TOLERANCE * nominalV * (1 + 1e-9);
  const cMax = narrow ? 1.05 : 1.1;
  const cMin = narrow || nominalV > 1000 ? 0.95 : 0.9;
  const [rOhm, xOhm] = strongest(supply, nominalV, cMax, model);
  const weakestOhm = nominalV ** 2 / (site.shortCircuitMinMva * 1e6);
  const listedKw = model.nodal?.topology.motorKw.reduce((sum, kw) => sum + kw, 0) ?? 0;
  const motorKw = listedKw + (loads.motorSharePct / 100) * loads.dampingKw.max;
  const motorKa = (cMax * MOTOR.lockedRotorRatio * motorKw) / (Math.sqrt(3) * nominalV * MOTOR.efficiencyTimesFactor);
  const greatestKa = (cMax * nominalV) / (Math.sqrt(3) * Math.hypot(rOhm, xOhm)) / 1000 + motorKa;
  const kappa = 1.02 + 0.98 * Math.exp((-3 * rOhm) / xOhm);
  const decayShare = decayHeatShare(kappa, site.frequencyHz);
  return {
    cMax,
    cMin,
    rOhm,
    xOhm,
    weakestOhm,
    motorKw,
    motorKa,
    greatestKa,
    kappa,
    peakKa: kappa * Math.SQRT2 * greatestKa,
    decayShare,
    thermalKa: greatestKa * Math.sqrt(decayShare + 1),
    leastKa: (cMin * nominalV) / (2 * weakestOhm) / 1000,
  };
}

/** Short-time ratings are stated for this long [s]. */
const SHORT_TIME_S = 1;

// m = (e^(4·f·T·ln(κ−1)) − 1)/(2·f·T·ln(κ−1)), 2 where nothing decays.
function decayHeatShare(kappa: number, frequencyHz: number): number {
  const exponent = 2 * frequencyHz * SHORT_TIME_S * Math.log(Math.min(1, kappa - 1));
  return exponent === 0 ? 2 : Math.expm1(2 * exponent) / exponent;
}

function strongest(supply: Supply, nominalV: number, cMax: number, model: NetworkModel): [number, number] {
  if (model.nodal !== null) {
    const { rOhm, xOhm } = strongestOhm(model);
    return [rOhm, xOhm];
  }
  const z = new Float64Array(2);
  const path = supplyPath(supply, nominalV, supply.faultLevelMva.max, 'least');
  const c = path.transformers.length > 0 ? NETWORK_C_MAX : cMax;
  const source = { rOhm: c * path.source.rOhm, xOhm: c * path.source.xOhm };
  pathImpedanceInto({ ...path, source } satisfies SupplyPath, 1, z);
  return [z[0]!, z[1]!];
}
