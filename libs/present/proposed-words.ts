import type { BankOutcome, EstimateOutcome, Outcome, StageGroup } from '#libs/engine/index.js';
import { countWord } from './findings.js';
import { formatNumber, formatQuantity } from './format-number.js';
import { say } from './language.js';

/**
 * What is proposed or judged, in one sentence.
 * @param outcome the plan or judgement
 * @returns "eight stages, 261 kvar at 400 V, with 7 % reactors."
 */
export function proposedWords(outcome: Outcome): string {
  const isOwn = outcome.kind === 'assess' || outcome.result.money?.recommended === "keep today's bank";
  return bankWords(outcome, isOwn);
}

/**
 * What is proposed or judged without a record, in one sentence.
 * @param outcome the estimate
 * @returns "estimate: eight stages, 261 kvar at 400 V, with 7 % reactors."
 */
export function estimateWords(outcome: EstimateOutcome): string {
  return say`estimate: ${bankWords(outcome, outcome.kind === 'assess')}`;
}

function bankWords({ bank, result, site }: BankOutcome, isOwn: boolean): string {
  if (bank.groups.length === 0) {
    const said = (code: string): boolean => result.reasons.some((reason) => reason.code === code);
    if (said('layout.noCandidate')) return say`nothing.`;
    if (said('target.missed') || said('estimate.belowLower') || said('estimate.belowList')) return say`no bank.`;
    if (said('estimate.noNeed'))
      return say`no bank. By the estimate the site holds ${formatNumber(site.targetPowerFactor, 'given')} already.`;
    return say`no bank. The site holds ${formatNumber(site.targetPowerFactor, 'given')} already.`;
  }
  const stages = bank.groups.reduce((sum, { count }) => sum + count, 0);
  const own = isOwn ? say`the site’s own bank, ` : '';
  const kvar = say`${formatQuantity(result.bank.effectiveKvar, 'kvar')} at\u00a0${formatQuantity(site.nominalV, 'V', 'given')}`;
  return `${own}${countWord(stages)} ${stages === 1 ? say`stage` : say`stages`}, ${kvar}, ${reactorWords(bank.groups)}.`;
}

/**
 * The reactors of a bank.
 * @param groups the bank's groups
 * @returns "with 7 % reactors", "without reactors", "partly with 7 % reactors"
 */
export function reactorWords(groups: readonly StageGroup[]): string {
  const { ratios, isPartly } = ratiosOf(groups);
  if (ratios === '') return say`without reactors`;
  return isPartly ? say`partly with ${ratios} reactors` : say`with ${ratios} reactors`;
}

/** The ratios of all detuned groups, empty without any, and whether other groups are plain. */
function ratiosOf(groups: readonly StageGroup[]): { ratios: string; isPartly: boolean } {
  const ratios = [...new Set(groups.map(({ reactorPct }) => reactorPct))].sort((a, b) => a - b);
  const detuned = ratios.filter((ratio) => ratio > 0).map((ratio) => formatQuantity(ratio, '%', 'given'));
  return { ratios: detuned.join(say` and `), isPartly: detuned.length < ratios.length };
}

/**
 * A bank's name on a figure.
 * @param groups the bank's groups
 * @returns "7 % reactors", "No reactors"
 */
export function bankName(groups: readonly StageGroup[]): string {
  const { ratios, isPartly } = ratiosOf(groups);
  if (ratios === '') return say`No reactors`;
  return isPartly ? say`Partly ${ratios}\u00a0reactors` : say`${ratios}\u00a0reactors`;
}
