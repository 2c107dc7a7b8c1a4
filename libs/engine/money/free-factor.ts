import type { Clause, Scale, Tariff } from './papers.js';
import { scalePct } from './scale.js';

/** A power factor and the clause that charges for less. */
export interface FreeFactor {
  /** of the clause */
  name: string;
  powerFactor: number;
}

/** Whole points are counted a point further down at the latest. */
const ONE_POINT_BELOW = 0.0101;

/**
 * The greatest power factor below which a tariff charges: the ends of its scales, and 1/√(1 + r²) for kvar and kvarh that
 * are free up to a ratio r of the active. Clauses for leading kvar and free expressions are passed over.
 * @param tariff the tariff
 * @returns the factor and its clause, or null where nothing is charged
 * @source method-money
 */
export function freeFactor(tariff: Tariff): FreeFactor | null {
  const found = (tariff.clauses ?? []).flatMap((clause): FreeFactor[] => {
    const powerFactor = clause.reactive === 'leading' ? null : freeFactorOf(clause);
    return powerFactor === null ? [] : [{ name: clause.name, powerFactor }];
  });
  return found.reduce<FreeFactor | null>(
    (most, one) => (most === null || one.powerFactor > most.powerFactor ? one : most),
    null,
  );
}

function freeFactorOf(clause: Clause): number | null {
  switch (clause.kind) {
    case 'kvarhBeyondRatio':
      return ofRatios(
        clause.tiers?.map(({ aboveRatio, pricePerUnit }) => [aboveRatio, pricePerUnit]) ?? [
          [clause.freeRatio ?? 0, clause.pricePerUnit ?? 0],
        ],
      );
    case 'kvarBeyondRatio':
      return ofRatios([[clause.ratio, clause.pricePerUnit]]);
    case 'energyByFactor':
    case 'percent':
      return ofScale(clause.scale);
    case 'demand':
      return clause.scale === undefined ? null : ofScale(clause.scale);
    default:
      return null;
  }
}

function ofRatios(ratios: readonly (readonly [ratio: number, price: number])[]): number | null {
  const charged = ratios.filter(([, price]) => price > 0).map(([ratio]) => ratio);
  return charged.length === 0 ? null : 1 / Math.hypot(1, Math.min(...charged));
}

function ofScale(scale: Scale): number | null {
  const pct = scalePct(scale);
  const begins = edges(scale).filter((factor) => factor <= 1 && pct(factor) <= 0 && pct(factor - ONE_POINT_BELOW) > 0);
  return begins.length === 0 ? null : Math.max(...begins);
}

function edges(scale: Scale): number[] {
  if (scale.form === 'steps') return scale.steps.map(({ from }) => from);
  return [scale.reference, ...(scale.form === 'points' ? (scale.below ?? []).map(({ downTo }) => downTo) : [])];
}
