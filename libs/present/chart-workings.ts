import {
  type Figure,
  hoursFigures,
  marginFigures,
  momentFigures,
  type Outcome,
  practiceFigure,
  rivalFigures,
} from '#libs/engine/index.js';
import type { DayReplay } from './day-replay.js';
import { labelOf, workingOf } from './figure-words.js';
import { formatNumber, formatQuantity } from './format-number.js';
import { formatMoment } from './local-stamp.js';
import { PRACTICE_A_YEAR } from './stage-switchings.js';

const AT_A_MOMENT: Readonly<Record<string, string>> = {
  neededKvar: 'needed at the bus for the target',
  connectedKvar: 'connected by the bank',
  leftKvar: 'left for the supply',
  loadA: 'current of the load',
  bankA: 'current of the bank',
  supplyA: 'current of the supply',
  loadFactor: 'cos φ of the load',
  supplyFactor: 'cos φ of the supply',
};

const OF_THE_DAY = ['neededKvar', 'connectedKvar', 'leftKvar'];

/**
 * Workings of one interval: what the replayed day and the phasors show of it.
 * @param outcome the plan or judgement
 * @param replay the day
 * @param at index of the interval among the valid ones of the record
 * @returns figures in words, those of the day and those of the currents
 */
export function momentWorkings(
  outcome: Outcome,
  replay: Pick<DayReplay, 'beginS' | 'atS' | 'stacks'>,
  at: number,
): { day: Figure[]; currents: Figure[] } {
  const beginS = outcome.series.beginS[at]!;
  const stack = replay.stacks[replay.atS.indexOf(beginS - replay.beginS)] ?? [];
  const stamp = formatMoment(outcome.zone, beginS);
  const found = momentFigures(
    outcome,
    at,
    stack.map(({ kvar }) => kvar),
  ).map((figure) => {
    const name = figure.id.split('.').at(-1)!;
    return { name, figure: worded(figure, `${AT_A_MOMENT[name]}, ${stamp}`) };
  });
  const isOfDay = ({ name }: { name: string }) => OF_THE_DAY.includes(name);
  return {
    day: found.filter(isOfDay).map(({ figure }) => figure),
    currents: found.filter((one) => !isOfDay(one)).map(({ figure }) => figure),
  };
}

/**
 * Workings of the hours at each level, of those levels that are drawn.
 * @param outcome the plan or judgement
 * @param drawn names of the bars
 * @returns figures in words, the share of the record with some stage in first
 */
export function hoursWorkings(outcome: Outcome, drawn: ReadonlySet<string>): Figure[] {
  const levels = outcome.result.operation.hoursAtLevel;
  const [share, ...hours] = hoursFigures(outcome);
  const shown = hours.filter((_, k) => drawn.has(formatNumber(levels[k]!.levelKvar)));
  const nameOf = (figure: Figure) => {
    const { levelKvar } = levels[hours.indexOf(figure)]!;
    return `time with ${formatQuantity(levelKvar, 'kvar')} in`;
  };
  return [
    worded(share!, 'share of the record with some stage in'),
    ...shown.reverse().map((figure) => worded(figure, nameOf(figure))),
  ];
}

/**
 * Working of the line that practice draws for a stage’s switchings.
 * @param outcome the plan or judgement
 * @returns a figure in words
 */
export function practiceWorking(outcome: Outcome): Figure {
  return worded(practiceFigure(outcome, PRACTICE_A_YEAR), 'switchings of a stage that practice counts as many');
}

/**
 * Workings of one row of a margin map.
 * @param margins of the bank
 * @param levelKvar the row; its nearest lower level where there is none, the greatest where null [kvar]
 * @param prefix begins the name of a bank that stands beside
 * @returns a figure an order, in words
 */
export function marginWorkings(margins: Outcome['margins'], levelKvar: number | null, prefix = ''): Figure[] {
  const { levelsKvar, ordersH } = margins;
  const level =
    levelKvar === null ? levelsKvar.length - 1 : levelsKvar.findLastIndex((kvar) => kvar <= levelKvar + 1e-6);
  return marginFigures(margins, Math.max(0, level)).map((figure, k) => ({
    ...worded(
      figure,
      `order ${formatNumber(ordersH[k]!, 'given')} with ${formatQuantity(levelsKvar[Math.max(0, level)]!, 'kvar')} in, share of its limit`,
    ),
    id: `${prefix}${figure.id}`,
  }));
}

/**
 * Workings of the bank that stands beside for comparison: its resonance, and the row of its map nearest to a limit.
 * @param outcome the plan or judgement
 * @param rival the other bank
 * @returns figures in words
 */
export function rivalWorkings(
  outcome: Outcome,
  rival: NonNullable<Outcome['rival']>,
): { impedance: Figure[]; margins: Figure[] } {
  const { sharePct, levelsKvar } = rival.margins;
  const greatest = sharePct.map((row) => Math.max(0, ...row));
  const worst = greatest.indexOf(Math.max(...greatest));
  return {
    impedance: rivalFigures(outcome, rival.bank).map((figure) =>
      worded(figure, labelOf('network.parallelOrderClosedFormH', [])),
    ),
    margins: marginWorkings(rival.margins, levelsKvar[worst] ?? null, 'rival.'),
  };
}

function worded(figure: Figure, label: string): Figure {
  return { ...figure, label, working: workingOf(figure) };
}
