import type { EstimateResult, Figure, Result } from '#libs/engine/index.js';

/** Figures a wrong bank would show in first; a reviewer works some of them out by hand. */
const DECISIVE = [
  'requirement.maxKvar',
  'bank.effectiveKvar',
  'bank.voltageRisePct',
  'network.shortCircuitMva',
  'network.shortCircuitMinMva',
  'network.parallelOrderClosedFormH',
  'operation.lowestMonthPowerFactor',
  'devices.greatestFaultKa',
];

/**
 * The few numbers a plan turns on, for a reviewer to check by hand.
 * @param result of a plan or an assessment, in words
 * @returns figures in the order of the list, those the result has
 */
export function decisiveFigures({ figures }: Pick<Result | EstimateResult, 'figures'>): Figure[] {
  const found = DECISIVE.flatMap((id) => figures.filter((figure) => figure.id === id).slice(0, 1));
  // Without a bank or a need none of them may stand; then the first figures there are.
  return found.length > 0 ? found : figures.slice(0, 3);
}
