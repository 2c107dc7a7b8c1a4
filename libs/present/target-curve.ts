import type { Chart } from './chart.js';
import { formatFixed, formatNumber, formatQuantity } from './format-number.js';
import { linearAxis } from './ticks.js';

/** Needed kvar at a row of targets, columns of equal length. */
export interface TargetSweep {
  powerFactors: number[];
  maxKvar: number[];
  p95Kvar: number[];
  p50Kvar: number[];
}

/** What is needed at the target itself. */
export interface TargetNeed {
  powerFactor: number;
  maxKvar: number;
  p95Kvar: number;
  p50Kvar: number;
}

/**
 * Needed kvar over the target power factor: what a point more costs, before it is asked for.
 * @param sweep need at a row of targets, ascending
 * @param at the target as it stands
 * @returns chart whose x axis is the target
 */
export function targetCurve(sweep: TargetSweep, at: TargetNeed): Chart {
  const { powerFactors, maxKvar, p95Kvar, p50Kvar } = sweep;
  const from = powerFactors[0]!;
  const to = powerFactors.at(-1)!;
  const target = formatNumber(at.powerFactor, 'given');
  const rows = powerFactors.map((factor, i) => [
    formatNumber(factor, 'given'),
    formatNumber(p95Kvar[i]!),
    formatNumber(maxKvar[i]!),
  ]);
  const line = (part: 'site' | 'after' | 'need', y: number[]) => ({ part, shape: 'line' as const, x: powerFactors, y });
  return {
    id: 'targetCurve',
    finding: `Holding ${target} takes ${formatQuantity(at.maxKvar, 'kvar')} at the most`,
    caption: 'Needed kvar over the target. Drag the handle, or type.',
    sentence:
      `Needed kvar rises with the target: ${formatQuantity(maxKvar[0]!, 'kvar')} at ${formatNumber(from, 'given')}, ` +
      `${formatQuantity(at.maxKvar, 'kvar')} at ${target}, ${formatQuantity(maxKvar.at(-1)!, 'kvar')} at ${formatNumber(to, 'given')}.`,
    x: {
      label: '',
      unit: '',
      scale: 'linear',
      from,
      to,
      ticks: powerFactors
        .filter((factor) => Math.abs(factor * 20 - Math.round(factor * 20)) < 1e-6)
        .map((factor) => ({ at: factor, text: formatFixed(factor, 2) })),
    },
    y: linearAxis('needed', 'kvar', { least: 0, most: maxKvar.at(-1)! }, 4),
    equalScales: false,
    series: [line('site', maxKvar), line('after', p95Kvar), line('need', p50Kvar)],
    marks: [
      { kind: 'disc', x: at.powerFactor, y: at.maxKvar, text: `maximum ${formatNumber(at.maxKvar)}`, side: 'left' },
      { kind: 'disc', x: at.powerFactor, y: at.p95Kvar, text: `P95 ${formatNumber(at.p95Kvar)}`, side: 'right' },
      {
        kind: 'disc',
        x: at.powerFactor,
        y: at.p50Kvar,
        text: `half the year ${formatNumber(at.p50Kvar)}`,
        side: 'left',
      },
    ],
    table: { columns: ['target', 'P95 kvar', 'maximum kvar'].map((head) => ({ head, right: true })), rows },
  };
}
