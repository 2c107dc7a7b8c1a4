import type { ReactorTrial } from '#libs/engine/index.js';
import { engineName } from './engine-name.js';
import { formatNumber, formatQuantity, formatRange } from './format-number.js';
import { say } from './language.js';
import { verdictWords } from './verdict-words.js';

/** One column of the table, with the room it takes beside the others. */
interface TrialColumn {
  head: string;
  share: number;
  cell: (trial: ReactorTrial) => string;
}

/** The same stages at each reactor ratio, and why each is or is not the bank's. */
export interface TrialTable {
  columns: Pick<TrialColumn, 'head' | 'share'>[];
  /** a row of cells a ratio */
  rows: string[][];
}

/**
 * Every ratio that was tried, as a table; what it costs and what it leaves of a ripple signal where these are known.
 * @param trials rows of a result
 * @param currency of the prices, '' where it is not named
 */
export function trialTable(trials: readonly ReactorTrial[], currency: string): TrialTable {
  const columns: TrialColumn[] = [
    { head: say`reactors, rating`, share: 20, cell: trialName },
    {
      head: say`tuned`,
      share: 9,
      cell: ({ tunedOrderH }) => (tunedOrderH === null ? '–' : formatNumber(tunedOrderH)),
    },
    { head: say`peaks, order`, share: 14, cell: peakWords },
    { head: say`all stages`, share: 12, cell: ({ effectiveKvar }) => formatQuantity(effectiveKvar, 'kvar') },
    { head: say`current of a stage`, share: 15, cell: currentWords },
  ];
  if (trials.some(({ rippleShare }) => rippleShare !== null))
    columns.push({ head: say`ripple left`, share: 9, cell: rippleWords });
  if (trials.some((trial) => capitalIn(trial) !== null))
    columns.push({ head: currency === '' ? say`costs new` : say`costs new, ${currency}`, share: 11, cell: costWords });
  columns.push({ head: say`verdict`, share: 15, cell: ({ verdict }) => verdictWords(verdict) });
  columns.push({ head: say`why`, share: 31, cell: trialReason });
  return { columns, rows: trials.map((trial) => columns.map(({ cell }) => cell(trial))) };
}

/**
 * What the bank of a row costs new.
 * @returns null where the prices do not say; a result that an earlier engine gave has none in its rows
 */
export function capitalIn({ capital }: Partial<ReactorTrial>): number | null {
  return capital ?? null;
}

function costWords(trial: ReactorTrial): string {
  const capital = capitalIn(trial);
  return capital === null ? '–' : formatNumber(capital, 'whole');
}

function rippleWords({ rippleShare }: ReactorTrial): string {
  return rippleShare === null ? '–' : formatQuantity(100 * rippleShare, '%');
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
