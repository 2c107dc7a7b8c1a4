import { type Figure, figure } from './figure.js';
import type { Outcome } from './outcome.js';

const YEAR_S = 365 * 86_400;

/**
 * Hours of the record at each level, and the share of it in which some stage is in.
 * @param outcome the plan or judgement
 * @returns figures, the share first
 * @source method-figures
 */
export function hoursFigures({ result }: Outcome): Figure[] {
  const { hoursAtLevel } = result.operation;
  const { intervals, intervalS } = result.record;
  const source = 'method, operation';
  const all = (intervals * intervalS) / 3600;
  const out = hoursAtLevel[0]?.hours ?? 0;
  const share = figure(
    'operation.shareConnectedPct',
    { value: 100 * (1 - out / all), unit: '%' },
    { formula: '100 · (1 − h_0 / h)', source },
    [
      ['h_0', out, 'h'],
      ['h', all, 'h'],
    ],
  );
  const levels = hoursAtLevel.map(({ hours }, k) =>
    figure(`operation.hoursAtLevel[${k}].hours`, { value: hours, unit: 'h' }, { formula: 'n · T / 3600', source }, [
      ['n', Math.round((hours * 3600) / intervalS), ''],
      ['T', intervalS, 's'],
    ]),
  );
  return [share, ...levels];
}

/**
 * Switchings of a stage over the record that practice counts as many.
 * @param outcome the plan or judgement
 * @param practicePerYear switchings a stage and year
 * @returns a figure
 * @source method-figures
 */
export function practiceFigure({ result }: Outcome, practicePerYear: number): Figure {
  const { beginS, endS } = result.record;
  return figure(
    'operation.practiceSwitchings',
    { value: (practicePerYear * (endS - beginS)) / YEAR_S, unit: '' },
    { formula: 's_a · (t_e − t_b) / 31536000', source: 'common practice' },
    [
      ['s_a', practicePerYear, ''],
      ['t_b', beginS, 's'],
      ['t_e', endS, 's'],
    ],
  );
}
