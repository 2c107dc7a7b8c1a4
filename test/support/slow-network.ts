import { Complex } from './complex.js';

/** A stage's nameplate. */
export interface SlowStage {
  ratedKvar: number;
  ratedV: number;
  reactorPct: number;
  reactorQuality: number;
}

/** One network in one corner, as the nameplates give it. */
export interface SlowNetwork {
  nominalV: number;
  faultLevelMva: number;
  rOverX: number;
  /** k of R ∝ h^k */
  exponent: number;
  /** impedance with its tolerance already in it */
  transformers: { ratedKva: number; impedancePct: number; loadLossKw: number }[];
  motorSharePct: number;
  dampingKw: number;
  capacitanceFactor: number;
  inductanceFactor: number;
  /** every connected stage, one entry each or one with how many */
  stages: { stage: SlowStage; count: number }[];
}

/**
 * Impedance from the ideal source to the bus.
 * @param network nameplates
 * @param h order
 * @returns Z_s(h) [Ω]
 */
export function sourceImpedance(network: SlowNetwork, h: number): Complex {
  const z = network.nominalV ** 2 / (network.faultLevelMva * 1e6);
  const x = z / Math.sqrt(1 + network.rOverX ** 2);
  const feeder = new Complex(network.rOverX * x * h ** network.exponent, x * h);
  if (network.transformers.length === 0) return feeder;
  const admittance = network.transformers.reduce((sum, { ratedKva, impedancePct, loadLossKw }) => {
    const baseOhm = network.nominalV ** 2 / (ratedKva * 1000);
    const r = (loadLossKw / ratedKva) * baseOhm;
    const zt = (impedancePct / 100) * baseOhm;
    return sum.plus(new Complex(r * h ** network.exponent, Math.sqrt(zt ** 2 - r ** 2) * h).inverse());
  }, new Complex(0));
  return feeder.plus(admittance.inverse());
}

/**
 * Admittance of one stage.
 * @param network corner and exponent
 * @param stage nameplate
 * @param h order
 * @returns y(h) [S]
 */
export function admittanceOfStage(
  network: Pick<SlowNetwork, 'exponent' | 'capacitanceFactor' | 'inductanceFactor'>,
  stage: SlowStage,
  h: number,
): Complex {
  const xc = stage.ratedV ** 2 / (stage.ratedKvar * 1000);
  const xl = (stage.reactorPct / 100) * xc;
  const r = xl === 0 ? 0 : (xl / stage.reactorQuality) * h ** network.exponent;
  return new Complex(r, h * xl * network.inductanceFactor - xc / network.capacitanceFactor / h).inverse();
}

/**
 * Admittance of the whole bank.
 * @param network nameplates
 * @param h order
 * @returns Y_bank(h) [S]
 */
export function bankAdmittance(network: SlowNetwork, h: number): Complex {
  return network.stages.reduce(
    (sum, { stage, count }) => sum.plus(admittanceOfStage(network, stage, h).times(count)),
    new Complex(0),
  );
}

/**
 * Admittance of the damping load.
 * @param network nameplates
 * @param h order
 * @returns Y_d(h) [S]
 */
export function dampingAdmittance(network: SlowNetwork, h: number): Complex {
  const motorW = 10 * network.motorSharePct * network.dampingKw;
  const rest = new Complex((1000 * network.dampingKw - motorW) / network.nominalV ** 2);
  if (motorW === 0) return rest;
  const x = network.nominalV ** 2 / motorW / 6;
  return rest.plus(new Complex(0.3 * x * h ** network.exponent, x * h).inverse());
}

/**
 * Impedance seen at the bus.
 * @param network nameplates
 * @param h order
 * @returns Z(h) [Ω]
 */
export function busImpedance(network: SlowNetwork, h: number): Complex {
  return sourceImpedance(network, h)
    .inverse()
    .plus(dampingAdmittance(network, h))
    .plus(bankAdmittance(network, h))
    .inverse();
}
