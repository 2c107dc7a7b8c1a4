import type { ReactorTrial } from '#libs/engine/index.js';
import { engineName } from './engine-name.js';
import { formatNumber, formatQuantity, formatRange } from './format-number.js';
import { say, words } from './language.js';
import { verdictWords } from './verdict-words.js';

/** Names of the columns of `trialRows`. */
export const TRIAL_HEADS = words([
  'reactors, rating',
  'tuned',
  'peaks, order',
  'all stages',
  'current of a stage',
  'ripple left',
  'verdict',
  'why',
] as const);

/**
 * The same stages at each reactor ratio, and why each is or is not the bank's.
 * @param trials rows of a result
 * @returns a row of eight cells a ratio
 */
export function trialRows(trials: readonly ReactorTrial[]): string[][] {
  return trials.map((trial) => [
    trialName(trial),
    trial.tunedOrderH === null ? '–' : formatNumber(trial.tunedOrderH),
    peakWords(trial),
    formatQuantity(trial.effectiveKvar, 'kvar'),
    currentWords(trial),
    trial.rippleShare === null ? '–' : formatQuantity(100 * trial.rippleShare, '%'),
    verdictWords(trial.verdict),
    trialReason(trial),
  ]);
}

/**
 * What a row tried.
 * @returns "7 %, X/R 30, 480 V"
 */
export function trialName({ reactorPct, reactorQuality, ratedV, filter }: ReactorTrial): string {
  const ratio =
    reactorQuality === null ? say`none` : `${formatQuantity(reactorPct, '%')}, X/R ${formatNumber(reactorQuality)}`;
  return `${filter ? say`filter ` : ''}${ratio}, ${formatQuantity(ratedV, 'V')}`;
}

/**
 * Where the peaks of a row lie.
 * @returns a range of orders, "–" where there is none
 */
export function peakWords({ lowestPeakH, highestPeakH }: ReactorTrial): string {
  if (lowestPeakH === null || highestPeakH === null) return '–';
  return formatRange({ low: lowestPeakH, high: highestPeakH }, '', 'computed');
}

function currentWords({ stageA, stageRatio }: ReactorTrial): string {
  if (stageA === null) return '–';
  const share = stageRatio === null ? '' : `, ${formatQuantity(100 * stageRatio, '%', 'whole')}`;
  return `${formatQuantity(stageA, 'A')}${share}`;
}

/**
 * Why a ratio is or is not the bank's.
 * @returns a phrase
 */
export function trialReason(trial: ReactorTrial): string {
  const { why, worstDuty, worstRatio, nearPeakH, nearOrderH, rippleShare } = trial;
  const duty =
    worstDuty === null || worstRatio === null
      ? ''
      : `: ${engineName(worstDuty)}, ${formatQuantity(100 * worstRatio, '%', 'whole')}`;
  const words: Record<ReactorTrial['why'], string> = {
    chosen: say`the bank’s own`,
    overLimit: say`over a limit${duty}`,
    nearLimit: say`near a limit${duty}`,
    ripple: say`leaves ${formatQuantity(100 * (rippleShare ?? 0), '%', 'whole')} of the ripple signal`,
    nearPeak: say`a peak at order ${formatNumber(nearPeakH ?? 0)} beside order ${formatNumber(nearOrderH ?? 0)}`,
    openAnyway: say`left open by the data, as every ratio is`,
    givesLess: say`within limits, with less kvar from the same stages`,
    takesMore: say`within limits, at more kvar, reactor or voltage than needed`,
  };
  return words[why];
}
