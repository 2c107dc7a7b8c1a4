import type { Bank } from '../layout/bank.js';
import type { ChargeStage } from './charge.js';
import { AMBIENT_CATEGORIES } from './rules.js';
import type { BankPlace } from './site-facts.js';
import type { BankDemand } from './stage-demand.js';

/** Loss of the capacitors themselves; common practice, no source [W/kvar]. */
export const CAPACITOR_LOSS_W_PER_KVAR = { low: 0.2, high: 0.5 } as const;
/** Where neither the site nor the ambient category says how warm the enclosure may get; common practice [K]. */
export const CUSTOMARY_RISE_K = 10;
/** Air at sea level and 20 °C [kg/m³] and its specific heat [J/(kg·K)]. */
export const AIR = { densityKgPerM3: 1.2, heatJPerKgK: 1005, scaleM: 44_331, exponent: 4.256 } as const;

/** Heat of a cabinet with all stages in and the air that carries it away. */
export interface CabinetHeat {
  ratedKvar: number;
  /** discharge resistors of all stages at rated voltage [W] */
  resistorW: number;
  reactorW: number;
  lowW: number;
  highW: number;
  allowedRiseK: number;
  /** how the rise was come by */
  riseFrom: 'site' | 'category' | 'practice';
  altitudeM: number;
  /** air for the greater heat at the allowed rise [m³/h] */
  airFlowM3PerH: number;
}

/**
 * Heat of a bank's cabinet and the air it needs: P = q·Q_N + 3·Σn·U_N²/R + reactors, V̇ = 3600·P/(ρ·c·ΔT), ρ falling with
 * altitude as ρ₀·(1 − z/44331)^4.256.
 * @param bank the bank
 * @param charge its discharge resistors
 * @param demand loss of its reactors
 * @param place where it stands
 * @returns heat [W] and air [m³/h]
 * @source derived, practice
 */
export function cabinetHeat(
  bank: Bank,
  charge: readonly ChargeStage[],
  demand: BankDemand,
  place: BankPlace,
): CabinetHeat {
  const ratedKvar = bank.groups.reduce((sum, { count, ratedKvar: kvar }) => sum + count * kvar, 0);
  const resistorW = bank.groups.reduce((sum, { count, ratedV, dischargeOhm }, g) => {
    const phaseW = dischargeOhm === null ? (charge[g]!.dischargeLossW ?? 0) : (ratedV * ratedV) / dischargeOhm;
    return sum + 3 * count * phaseW;
  }, 0);
  const reactorW = demand.reactorLossW;
  const highW = CAPACITOR_LOSS_W_PER_KVAR.high * ratedKvar + resistorW + reactorW;
  const rise = allowedRise(bank, place);
  const altitudeM = Math.max(0, place.altitudeM ?? 0);
  const density = AIR.densityKgPerM3 * (1 - altitudeM / AIR.scaleM) ** AIR.exponent;
  return {
    ratedKvar,
    resistorW,
    reactorW,
    lowW: CAPACITOR_LOSS_W_PER_KVAR.low * ratedKvar + resistorW + reactorW,
    highW,
    ...rise,
    altitudeM,
    airFlowM3PerH: (3600 * highW) / (density * AIR.heatJPerKgK * rise.allowedRiseK),
  };
}

function allowedRise(bank: Bank, place: BankPlace): Pick<CabinetHeat, 'allowedRiseK' | 'riseFrom'> {
  if (place.allowedRiseK !== undefined) return { allowedRiseK: place.allowedRiseK, riseFrom: 'site' };
  const { ambientCategory } = bank;
  if (ambientCategory !== null && place.ambientMaxC !== undefined) {
    const rise = AMBIENT_CATEGORIES[ambientCategory][0] - place.ambientMaxC;
    if (rise > 0) return { allowedRiseK: rise, riseFrom: 'category' };
  }
  return { allowedRiseK: CUSTOMARY_RISE_K, riseFrom: 'practice' };
}
