import type { EstimateResult, Result, Verdict } from '#libs/engine/index.js';
import { formatNumber, formatQuantity } from './format-number.js';
import { words } from './language.js';
import { verdictWords } from './verdict-words.js';

/** What one revision came to, in the numbers that decide. */
export interface RevisionNumbers {
  /** need that is passed in 1 % of the record, or what an estimate is sized by [kvar] */
  neededKvar: number;
  effectiveKvar: number;
  stages: number;
  lowestPowerFactor: number | null;
  voltageDistortionPct: number | null;
  switchings: number | null;
  savingPerYear: number | null;
  verdict: Verdict;
}

/**
 * The deciding numbers of a result.
 * @param result plan or judgement
 * @returns numbers, null where the result has none
 */
export function revisionNumbers(result: Result | EstimateResult): RevisionNumbers {
  const { bank, duties, verdict } = result;
  const distortion = duties.find(({ name }) => name === 'voltage distortion');
  const common = {
    effectiveKvar: bank.effectiveKvar,
    stages: bank.stages.length,
    voltageDistortionPct: distortion?.value ?? null,
    verdict,
  };
  if (result.record === null) {
    const { sizedKvar } = result.requirement;
    return { ...common, neededKvar: sizedKvar, lowestPowerFactor: null, switchings: null, savingPerYear: null };
  }
  const { requirement, operation, money } = result;
  const factors = operation.months.flatMap(({ powerFactorLagging: factor }) => (factor === null ? [] : [factor]));
  return {
    ...common,
    neededKvar: requirement.p99Kvar,
    lowestPowerFactor: factors.length === 0 ? null : Math.min(...factors),
    switchings: operation.totalSwitchings,
    savingPerYear: money?.savingRange?.headlinePerYear ?? money?.savingPerYear ?? null,
  };
}

/** Heads of the columns of `revisionCells`. */
export const REVISION_HEADS = words([
  'needed, 99\u00a0%',
  'effective',
  'stages',
  'lowest month',
  'voltage distortion',
  'switchings',
  'saved a year',
  'verdict',
] as const);

/**
 * A revision's numbers as printed.
 * @param numbers of a revision
 * @returns one cell a head
 */
export function revisionCells(numbers: RevisionNumbers): string[] {
  const { switchings, savingPerYear } = numbers;
  return [
    formatQuantity(numbers.neededKvar, 'kvar'),
    formatQuantity(numbers.effectiveKvar, 'kvar'),
    formatNumber(numbers.stages, 'whole'),
    formatQuantity(numbers.lowestPowerFactor, ''),
    formatQuantity(numbers.voltageDistortionPct, '%'),
    switchings === null ? '–' : formatNumber(switchings, 'whole'),
    savingPerYear === null ? '–' : formatNumber(savingPerYear, 'whole'),
    verdictWords(numbers.verdict),
  ];
}
