import type { BankOutcome, EstimateOutcome, Outcome, StageGroup } from '#libs/engine/index.js';
import { countWord } from './findings.js';
import { formatNumber, formatQuantity, GAP } from './format-number.js';

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
  return `estimate: ${bankWords(outcome, outcome.kind === 'assess')}`;
}

function bankWords({ bank, result, site }: BankOutcome, isOwn: boolean): string {
  if (bank.groups.length === 0) {
    const said = (code: string): boolean => result.reasons.some((reason) => reason.code === code);
    if (said('layout.noCandidate')) return 'nothing.';
    if (said('target.missed') || said('estimate.belowLower') || said('estimate.belowList')) return 'no bank.';
    if (said('estimate.noNeed'))
      return `no bank. By the estimate the site holds ${formatNumber(site.targetPowerFactor, 'given')} already.`;
    return `no bank. The site holds ${formatNumber(site.targetPowerFactor, 'given')} already.`;
  }
  const stages = bank.groups.reduce((sum, { count }) => sum + count, 0);
  const own = isOwn ? 'the site’s own bank, ' : '';
  const kvar = `${formatQuantity(result.bank.effectiveKvar, 'kvar')} at${GAP}${formatQuantity(site.nominalV, 'V', 'given')}`;
  return `${own}${countWord(stages)} ${stages === 1 ? 'stage' : 'stages'}, ${kvar}, ${reactorWords(bank.groups)}.`;
}

/**
 * The reactors of a bank.
 * @param groups the bank's groups
 * @returns "with 7 % reactors", "without reactors", "partly with 7 % reactors"
 */
export function reactorWords(groups: readonly StageGroup[]): string {
  const ratios = [...new Set(groups.map(({ reactorPct }) => reactorPct))].sort((a, b) => a - b);
  const detuned = ratios.filter((ratio) => ratio > 0).map((ratio) => formatQuantity(ratio, '%', 'given'));
  if (detuned.length === 0) return 'without reactors';
  return `${detuned.length < ratios.length ? 'partly ' : ''}with ${detuned.join(' and ')} reactors`;
}

/**
 * A bank's name on a figure.
 * @param groups the bank's groups
 * @returns "7 % reactors", "No reactors"
 */
export function bankName(groups: readonly StageGroup[]): string {
  const words = reactorWords(groups).replace(/^(partly )?with /, '$1');
  return words === 'without reactors' ? 'No reactors' : words.charAt(0).toUpperCase() + words.slice(1);
}
