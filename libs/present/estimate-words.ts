import type { EstimateOutcome } from '#libs/engine/index.js';
import { formatNumber, formatQuantity } from './format-number.js';
import { say } from './language.js';
import { formatMonth } from './local-stamp.js';

/**
 * What an estimate stands on.
 * @param outcome the estimate
 * @returns "12 bills, January 2025 to December 2025, and an equipment list of 3 entries"
 */
export function estimateSpan({ result }: EstimateOutcome): string {
  const { months, equipment } = result.estimate;
  const [first, last] = [months[0], months.at(-1)];
  const parts: string[] = [];
  if (first !== undefined && last !== undefined) {
    const span =
      months.length === 1 ? formatMonth(first.month) : say`${formatMonth(first.month)} to ${formatMonth(last.month)}`;
    parts.push(`${months.length} ${months.length === 1 ? say`bill` : say`bills`}, ${span}`);
  }
  if (equipment !== null) {
    const count = equipment.rows.length;
    parts.push(say`an equipment list of ${count} ${count === 1 ? say`entry` : say`entries`}`);
  }
  return parts.join(say`, and `);
}

/**
 * The deciding figures of an estimate, label and value; the same words wherever they are shown.
 * @param outcome the estimate
 * @returns pairs in the order of the job
 */
export function estimateFigures({ result, site }: EstimateOutcome): [label: string, value: string][] {
  const { lowerKvar, upperKvar, listKvar, sizedKvar, months } = result.requirement;
  const factors = months.map(({ powerFactorLagging }) => powerFactorLagging);
  const distortion = result.duties.find(({ name, verdict }) => name === 'voltage distortion' && verdict !== null);
  return [
    ...(lowerKvar === null
      ? []
      : [[say`needed, lower bound`, formatQuantity(lowerKvar, 'kvar')] satisfies [string, string]]),
    ...(upperKvar === null
      ? []
      : [[say`needed, upper bound`, formatQuantity(upperKvar, 'kvar')] satisfies [string, string]]),
    ...(listKvar === null
      ? []
      : [[say`needed by the list`, formatQuantity(listKvar, 'kvar')] satisfies [string, string]]),
    [say`sized by`, formatQuantity(sizedKvar, 'kvar')],
    [say`effective`, formatQuantity(result.bank.effectiveKvar, 'kvar')],
    [say`target`, formatNumber(site.targetPowerFactor, 'given')],
    [say`lowest month before`, factors.length === 0 ? '–' : formatNumber(Math.min(...factors))],
    [say`voltage distortion`, distortion === undefined ? '–' : formatQuantity(distortion.value, '%')],
    [say`its limit`, distortion === undefined ? '–' : formatQuantity(distortion.limit, '%', 'given')],
  ];
}
