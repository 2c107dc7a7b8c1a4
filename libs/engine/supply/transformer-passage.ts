import type { Supply } from './supply.js';

/** Transformers between a primary meter and the bus: shunt at the primary, one series impedance per unit. */
export interface TransformerPassage {
  /** ΣS_r, base of the per-unit values [kVA] */
  baseKva: number;
  noLoadKw: number;
  noLoadKvar: number;
  rPu: number;
  xPu: number;
}

/** Active and reactive power, import and lagging > 0. */
export interface Power {
  activeKw: number;
  reactiveKvar: number;
}

/**
 * Several transformers as one: shunts add, series impedances in parallel (complex) on base ΣS_r.
 * Q₀ = √((i₀·S_r)² − P₀²), 0 where negative; r = P_k/S_r, z = u_k as given, x = √(z² − r²).
 * @param supply settled supply with at least one transformer
 * @returns the combined passage
 * @source method-requirement
 */
export function transformerPassage(supply: Supply): TransformerPassage {
  const baseKva = supply.transformers.reduce((sum, t) => sum + t.ratedKva, 0);
  let noLoadKw = 0;
  let noLoadKvar = 0;
  let g = 0;
  let b = 0;
  for (const t of supply.transformers) {
    noLoadKw += t.noLoadLossKw;
    const magnetisingKva = (t.noLoadCurrentPct / 100) * t.ratedKva;
    noLoadKvar += Math.sqrt(Math.max(0, magnetisingKva ** 2 - t.noLoadLossKw ** 2));
    const scale = baseKva / t.ratedKva;
    const r = (t.loadLossKw / t.ratedKva) * scale;
    const z = (t.impedancePct / 100) * scale;
    const x = Math.sqrt(z * z - r * r);
    g += r / (z * z);
    b += x / (z * z);
  }
  const square = g * g + b * b;
  return { baseKva, noLoadKw, noLoadKvar, rPu: g / square, xPu: b / square };
}

/**
 * Power at the bus from power at a primary meter, V₁ = 1: S₂ = S₁ − (r + jx)·|S₁|² per unit, S₁ = meter − (P₀ + jQ₀).
 * @param passage combined transformers
 * @param activeKw at the meter [kW]
 * @param reactiveKvar at the meter [kvar]
 * @returns at the bus
 * @source method-requirement
 */
export function busFromPrimary(passage: TransformerPassage, activeKw: number, reactiveKvar: number): Power {
  const p = (activeKw - passage.noLoadKw) / passage.baseKva;
  const q = (reactiveKvar - passage.noLoadKvar) / passage.baseKva;
  const square = p * p + q * q;
  return {
    activeKw: (p - passage.rPu * square) * passage.baseKva,
    reactiveKvar: (q - passage.xPu * square) * passage.baseKva,
  };
}

/** Power at the primary meter with the bus voltage that goes with it. */
export interface PrimaryPower extends Power {
  /** |V₂| per unit of nominal */
  busVoltagePu: number;
}

/**
 * Power at a primary meter from power at the bus: the larger root of
 * |V₂|⁴ + (2(rP + xQ) − 1)·|V₂|² + z²(P² + Q²) = 0, then S₁ = S₂ + (r + jx)·|S₂|²/|V₂|².
 * @param passage combined transformers
 * @param activeKw at the bus [kW]
 * @param reactiveKvar at the bus [kvar]
 * @returns at the meter, or null where no real root exists: the load cannot be carried
 * @source method-requirement
 */
export function primaryFromBus(
  passage: TransformerPassage,
  activeKw: number,
  reactiveKvar: number,
): PrimaryPower | null {
  const { rPu, xPu, baseKva } = passage;
  const p = activeKw / baseKva;
  const q = reactiveKvar / baseKva;
  const square = p * p + q * q;
  const half = 0.5 - (rPu * p + xPu * q);
  const root = half * half - (rPu * rPu + xPu * xPu) * square;
  if (root < 0 || half <= 0) return null;
  const voltageSquare = half + Math.sqrt(root);
  const currentSquare = square / voltageSquare;
  return {
    activeKw: (p + rPu * currentSquare) * baseKva + passage.noLoadKw,
    reactiveKvar: (q + xPu * currentSquare) * baseKva + passage.noLoadKvar,
    busVoltagePu: Math.sqrt(voltageSquare),
  };
}
