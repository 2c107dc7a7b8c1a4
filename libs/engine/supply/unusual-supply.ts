import { type Remark, remark } from '../problem.js';
import type { Supply } from './supply.js';

/** Least short-circuit impedance of two-winding transformers up to a rating [kVA, %], IEC 60076-5, table 1. */
const LEAST_IMPEDANCE: readonly (readonly [upToKva: number, pct: number])[] = [
  [630, 4],
  [1250, 5],
  [2500, 6],
  [6300, 7],
  [25_000, 8],
  [40_000, 10],
  [63_000, 11],
  [Number.POSITIVE_INFINITY, 12.5],
];
/** Small dry types lie below the table's least, high-impedance units above it; beyond this band a digit is wrong more often. */
const IMPEDANCE_BAND = { low: 0.6, high: 3 };
/** Low voltage ends here [V]. */
const LOW_VOLTAGE_V = 1000;
/** Breakers and busbars of low voltage are built up to this rated current [A] and this breaking current [kA]. */
const MOST_RATED_A = 6300;
const MOST_BREAKING_KA = 150;
/** 40 kA at 145 kV; what feeds a site's own transformers lies below [MVA]. */
const MOST_FAULT_LEVEL_MVA = 10_000;

/**
 * What of a supply is unlike what is built: more often a slip of the keyboard than an odd site.
 * @param supply settled supply
 * @param nominalV U of the bus its transformers feed [V]
 * @returns one remark a field
 * @source method-plausibility, iec-60076-5
 */
export function unusualSupply(supply: Supply, nominalV: number): Remark[] {
  return [
    ...supply.transformers.flatMap((_, at) => unusualTransformer(supply, at, nominalV)),
    ...unusualFaultLevel(supply, nominalV),
  ];
}

function unusualTransformer({ transformers }: Supply, at: number, nominalV: number): Remark[] {
  const { ratedKva, impedancePct, loadLossKw, noLoadLossKw } = transformers[at]!;
  const path = `supply.transformers[${at}]`;
  const found: Remark[] = [];
  const [, tablePct] = LEAST_IMPEDANCE.find(([upToKva]) => ratedKva <= upToKva)!;
  const [lowPct, highPct] = [IMPEDANCE_BAND.low * tablePct, IMPEDANCE_BAND.high * tablePct];
  if (impedancePct < lowPct || impedancePct > highPct) {
    found.push(
      remark(
        'supply.impedanceUnusual',
        { number: at + 1, impedancePct, ratedKva, tablePct, lowPct, highPct },
        { path: `${path}.impedancePct`, source: 'practice' },
      ),
    );
  }
  const ratedA = (ratedKva * 1000) / (Math.sqrt(3) * nominalV);
  if (nominalV <= LOW_VOLTAGE_V && ratedA > MOST_RATED_A) {
    found.push(
      remark(
        'supply.ratingUnusual',
        { number: at + 1, ratedKva, nominalV, ratedA, mostA: MOST_RATED_A },
        { path: `${path}.ratedKva`, source: 'practice' },
      ),
    );
  }
  if (loadLossKw > 0 && noLoadLossKw >= loadLossKw) {
    const place = { path: `${path}.noLoadLossKw`, source: 'practice' };
    found.push(remark('supply.lossesUnusual', { number: at + 1, noLoadLossKw, loadLossKw }, place));
  }
  return found;
}

function unusualFaultLevel({ transformers, faultLevelMva }: Supply, nominalV: number): Remark[] {
  const { max: maxMva } = faultLevelMva;
  const place = { path: 'supply.faultLevelMva.max', source: 'practice' };
  if (transformers.length === 0) {
    const faultKa = (1000 * maxMva) / (Math.sqrt(3) * nominalV);
    if (nominalV > LOW_VOLTAGE_V || faultKa <= MOST_BREAKING_KA) return [];
    return [remark('supply.busFaultUnusual', { maxMva, nominalV, faultKa, mostKa: MOST_BREAKING_KA }, place)];
  }
  // their own short-circuit powers, fed by a supply of no impedance
  const ownMva = transformers.reduce((sum, { ratedKva, impedancePct }) => sum + ratedKva / (10 * impedancePct), 0);
  if (maxMva < ownMva) return [remark('supply.faultLevelLow', { maxMva, ownMva }, place)];
  if (maxMva <= MOST_FAULT_LEVEL_MVA) return [];
  return [remark('supply.faultLevelHigh', { maxMva, mostMva: MOST_FAULT_LEVEL_MVA }, place)];
}
