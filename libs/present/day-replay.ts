import {
  type Control,
  controllerView,
  localTime,
  type Outcome,
  type Study,
  stagesThrough,
  switchedBank,
} from '#libs/engine/index.js';
import type { ChartTable } from './chart.js';
import { formatNumber } from './format-number.js';
import { dayBeginS, formatClock, formatWeekday } from './local-stamp.js';

/** A stretch of time in which one stage is in, as intervals of the day. */
export interface StageRun {
  from: number;
  to: number;
}

/** One day with its stages, as data; columns of one entry an interval. */
export interface DayReplay {
  id: string;
  finding: string;
  caption: string;
  sentence: string;
  beginS: number;
  /** seconds since the day's beginning [s] */
  atS: number[];
  lengthS: number;
  intervalS: number;
  clocks: string[];
  loadKw: number[];
  loadKvar: number[];
  needKvar: number[];
  connectedKvar: number[];
  /** blocks from below: each stage that is in, in order of its connection */
  stacks: { stage: number; kvar: number }[][];
  stages: { kvar: number; runs: StageRun[]; switchings: number }[];
  table: ChartTable;
}

/**
 * A day replayed with its stages switching in.
 * @param outcome the plan or judgement
 * @param study the site and record it was made on
 * @param momentS a moment of the day [s]
 * @returns the day by the site's clock
 */
export function dayReplay(outcome: Outcome, study: Study, momentS: number): DayReplay {
  const { zone, series, record } = outcome;
  const beginS = dayBeginS(zone, momentS);
  const endS = dayBeginS(zone, beginS + 36 * 3600);
  const from = firstAt(series.beginS, beginS);
  const to = firstAt(series.beginS, endS);
  const stagesIn = stagesOf(outcome, study, outcome.result.control, { from, to });
  const part = (column: Float64Array) => Array.from(column.subarray(from, to));
  const atS = part(series.beginS).map((s) => s - beginS);
  const name = formatWeekday(zone, beginS);
  const clocks = part(series.beginS).map((s) => formatClock(localTime(zone, s).secondOfDay));
  const replay = {
    ...{ beginS, atS, clocks, lengthS: endS - beginS, intervalS: record.intervalS },
    loadKw: part(series.busKw),
    loadKvar: part(series.busKvar),
    needKvar: part(series.needKvar),
    connectedKvar: part(series.connectedKvar),
    stacks: stacksOf(stagesIn, outcome),
    stages: outcome.result.bank.stages.map(({ effectiveKvar }, stage) => ({
      kvar: effectiveKvar,
      ...runsOf(stagesIn.map((column) => column[stage]!)),
    })),
  };
  const switched = replay.stages.reduce((sum, { switchings }) => sum + switchings, 0);
  return {
    id: 'dayReplay',
    finding: `${name}, replayed`,
    caption: 'Heavy line: the load’s kvar. Dashed: what the target needs. Blocks: stages in, numbered as above.',
    sentence:
      `On ${name} the stages are switched ${formatNumber(switched, 'whole')} times; the load reaches ` +
      `${formatNumber(Math.max(0, ...replay.loadKvar))} kvar and the bank ${formatNumber(Math.max(0, ...replay.connectedKvar))} kvar.`,
    ...replay,
    table: tableOf(replay),
  };
}

function firstAt(beginS: Float64Array, s: number): number {
  let low = 0;
  let high = beginS.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (beginS[middle]! < s) low = middle + 1;
    else high = middle;
  }
  return low;
}

function stagesOf(
  outcome: Outcome,
  study: Study,
  control: Control,
  stretch: { from: number; to: number },
): Uint8Array[] {
  const bank = switchedBank(outcome.bank, outcome.site.nominalV);
  const all = stagesThrough(bank, control, controllerView(study, control.setPointPowerFactor), stretch);
  const fixed = outcome.bank.groups.flatMap((group) => Array.from({ length: group.count }, () => group.fixed));
  return Array.from({ length: stretch.to - stretch.from }, (_, i) =>
    all.slice(i * bank.stageCount, (i + 1) * bank.stageCount).map((on, stage) => (fixed[stage] ? 1 : on)),
  );
}

/** The stage longest in lies lowest. */
function stacksOf(stagesIn: readonly Uint8Array[], { result }: Outcome): DayReplay['stacks'] {
  let order: number[] = [];
  return stagesIn.map((column) => {
    const left = order.filter((stage) => column[stage] === 1);
    const joined = [...column.keys()].filter((stage) => column[stage] === 1 && !left.includes(stage));
    order = [...left, ...joined];
    return order.map((stage) => ({ stage, kvar: result.bank.stages[stage]!.effectiveKvar }));
  });
}

function runsOf(on: readonly number[]): { runs: StageRun[]; switchings: number } {
  const runs: StageRun[] = [];
  let switchings = 0;
  on.forEach((now, i) => {
    const before = i === 0 ? now : on[i - 1]!;
    if (now !== before) switchings++;
    if (now === 1 && (i === 0 || before === 0)) runs.push({ from: i, to: i + 1 });
    else if (now === 1) runs[runs.length - 1]!.to = i + 1;
  });
  return { runs, switchings };
}

function tableOf(replay: Pick<DayReplay, 'clocks' | 'loadKvar' | 'needKvar' | 'connectedKvar' | 'stacks'>): ChartTable {
  return {
    columns: ['begins', 'load kvar', 'needed kvar', 'connected kvar', 'stages in'].map((head, at) => ({
      head,
      right: at > 0 && at < 4,
    })),
    rows: replay.clocks.map((clock, i) => [
      clock,
      formatNumber(replay.loadKvar[i]!),
      formatNumber(replay.needKvar[i]!),
      formatNumber(replay.connectedKvar[i]!),
      replay.stacks[i]!.map(({ stage }) => stage + 1)
        .sort((a, b) => a - b)
        .join(', '),
    ]),
  };
}
