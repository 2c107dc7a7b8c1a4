import { type Outcome, type RequirementMonth, type Study } from '#libs/engine/index.js';
import type { Chart, ChartTable } from '#libs/present/chart.js';
import {
  hoursWorkings,
  marginWorkings,
  momentWorkings,
  practiceWorking,
  rivalWorkings,
} from '#libs/present/chart-workings.js';
import { dayReplay } from '#libs/present/day-replay.js';
import { decimateColumns } from '#libs/present/decimate.js';
import { durationCurve } from '#libs/present/duration-curve.js';
import { dutyBars } from '#libs/present/duty-bars.js';
import { formatNumber, formatQuantity } from '#libs/present/format-number.js';
import { hoursAtLevel } from '#libs/present/hours-at-level.js';
import { impedanceOverOrder } from '#libs/present/impedance-over-order.js';
import { dayBeginS, formatMonth } from '#libs/present/local-stamp.js';
import { marginMap } from '#libs/present/margin-map.js';
import { phasors } from '#libs/present/phasors.js';
import { powerFactorByMonth } from '#libs/present/power-factor-by-month.js';
import { bankName } from '#libs/present/proposed-words.js';
import { bothRatings, singleLine } from '#libs/present/single-line.js';
import { stageSwitchings } from '#libs/present/stage-switchings.js';
import { type TargetSweep, targetCurve } from '#libs/present/target-curve.js';
import { placeOnAxis } from '#libs/present/ticks.js';
import { yearMap } from '#libs/present/year-map.js';
import type { Station } from '../address.js';
import type { Looked } from './compute-look.js';
import type { Picks, StationCharts } from './look.js';

/** Columns a line is thinned to: twice the pixels of the widest chart. */
const COLUMNS = 1400;

/**
 * The charts of one station.
 * @param looked outcome and study
 * @param station the open one
 * @param picks what the reader picked
 * @param sweep need over the target
 */
export function stationCharts(looked: Looked, station: Station, picks: Picks, sweep: () => TargetSweep): StationCharts {
  switch (station) {
    case 'record':
      return { record: { year: recordYear(looked.study) } };
    case 'supply':
      return { supply: { singleLine: singleLine(looked.outcome) } };
    case 'need':
      return { need: needCharts(looked, sweep()) };
    case 'bank':
      return { bank: bankCharts(looked, picks) };
    case 'network':
      return { network: networkCharts(looked.outcome, picks) };
    case 'money':
    case 'proposal':
      return {};
  }
}

function needCharts({ outcome, study }: Looked, sweep: TargetSweep): NonNullable<StationCharts['need']> {
  const { maxKvar, p95Kvar, p50Kvar } = outcome.result.requirement;
  const at = { powerFactor: outcome.site.targetPowerFactor, maxKvar, p95Kvar, p50Kvar };
  const top = outcome.result.bank.levelsKvar.at(-1) ?? 0;
  return {
    target: targetCurve(sweep, at),
    duration: thinned(durationCurve(outcome)),
    year: yearMap({
      id: 'needYear',
      measure: 'Needed kvar, highest of each hour',
      unit: 'kvar',
      caption: 'The record by hour. Rows are hours of the day, columns are days; the months below share the columns.',
      beginS: study.record.beginS,
      intervalS: study.record.intervalS,
      values: study.needKvar,
      zone: study.zone,
      beyond: top > 0 ? top : null,
      finding: ({ beyondHours }) => needFinding(outcome, beyondHours, top),
      table: monthTable(outcome.result.requirement.months),
    }),
  };
}

function needFinding(outcome: Outcome, beyondHours: number, top: number): string {
  const months = outcome.result.requirement.months;
  const most = months.reduce((a, b) => (b.neededKvar > a.neededKvar ? b : a), months[0]!);
  if (top > 0 && beyondHours > 0) return `In ${formatNumber(beyondHours, 'given')} hours the need lies beyond the bank`;
  return `${formatMonth(most.month)} needs most, ${formatQuantity(most.neededKvar, 'kvar')}`;
}

/** Months under the columns of a year map. */
function monthTable(months: readonly RequirementMonth[]): ChartTable {
  return {
    columns: ['month', 'MWh', 'Mvarh', 'factor', 'kvar'].map((head, at) => ({ head, right: at > 0 })),
    rows: months.map((month) => [
      formatMonth(month.month),
      formatNumber(month.activeKwh / 1000),
      formatNumber(month.laggingKvarh / 1000),
      month.powerFactorLagging === null ? '–' : formatNumber(month.powerFactorLagging),
      formatNumber(month.neededKvar),
    ]),
  };
}

function recordYear(study: Study): NonNullable<StationCharts['record']>['year'] {
  return yearMap({
    id: 'recordYear',
    measure: 'Active power, highest of each hour',
    unit: 'kW',
    caption: 'The record by hour, as metered. Rows are hours of the day, columns are days.',
    beginS: study.record.beginS,
    intervalS: study.record.intervalS,
    values: study.record.activeKw,
    zone: study.zone,
    beyond: null,
    finding: ({ most, gapPct }) =>
      `Up to ${formatQuantity(most, 'kW')}${gapPct > 0 ? `; ${formatQuantity(gapPct, '%')} of the hours have no reading` : ', no hour without a reading'}`,
    table: monthTable(study.requirement.months),
  });
}

function bankCharts({ outcome, study }: Looked, picks: Picks): NonNullable<StationCharts['bank']> {
  const momentS = picks.momentS ?? outcome.result.operation.worstIntervals[0]?.beginS ?? dayOfMost(outcome);
  const replay = dayReplay(outcome, study, momentS);
  const beginS = dayBeginS(outcome.zone, momentS);
  const { beginS: column, busKw, busKvar, connectedKvar } = outcome.series;
  const at = Math.max(
    0,
    column.findLastIndex((s) => s <= (picks.cursorS === null ? momentS : beginS + picks.cursorS)),
  );
  const moment = { beginS: column[at]!, kw: busKw[at]!, loadKvar: busKvar[at]!, bankKvar: connectedKvar[at]! };
  const hours = hoursAtLevel(outcome);
  const { day, currents } = momentWorkings(outcome, replay, at);
  return {
    replay,
    phasors: phasors(outcome, moment),
    switchings: stageSwitchings(outcome),
    hours,
    workings: {
      day,
      currents,
      switchings: outcome.bank.groups.length === 0 ? [] : [practiceWorking(outcome)],
      hours: hoursWorkings(outcome, new Set(hours.bars.map(({ name }) => name))),
    },
    months: powerFactorByMonth(outcome),
    names: outcome.bank.groups.map((group) => bothRatings(outcome, group)),
  };
}

function dayOfMost({ series }: Outcome): number {
  let at = 0;
  for (let i = 1; i < series.needKvar.length; i++) if (series.needKvar[i]! > series.needKvar[at]!) at = i;
  return series.beginS[at]!;
}

function networkCharts(outcome: Outcome, picks: Picks): NonNullable<StationCharts['network']> {
  const hasBank = outcome.bank.groups.length > 0;
  const own = hasBank ? bankName(outcome.bank.groups) : 'No bank';
  const figure = impedanceOverOrder(outcome, outcome.bank, own);
  const levelKvar = picks.levelKvar ?? undefined;
  const duties = dutyBars(outcome.result.duties);
  const levelsKvar = outcome.margins.levelsKvar;
  const margins = marginMap(outcome.margins, own);
  const line = formatQuantity(picks.levelKvar ?? levelsKvar.at(-1) ?? 0, 'kvar');
  const explained = (chart: Chart, words: string): Chart => ({
    ...thinned(chart),
    ...(hasBank ? {} : { finding: 'Impedance at the bus without a bank' }),
    caption: `${chart.caption} Band: all levels. Line: ${words}. Dashed: no bank. Ticks: each level’s peak, heavy near an order present.`,
  });
  const common = { margins, duties, levelsKvar, marginWorkings: marginWorkings(outcome.margins, picks.levelKvar) };
  if (outcome.rival === null) {
    return { ...common, impedance: explained(figure.chart(undefined, levelKvar), line), rival: null };
  }
  const { bank, verdict, margins: other } = outcome.rival;
  const name = bankName(bank.groups);
  const second = impedanceOverOrder(outcome, bank, name);
  const scale = {
    leastOhm: Math.min(figure.scale.leastOhm, second.scale.leastOhm),
    mostOhm: Math.max(figure.scale.mostOhm, second.scale.mostOhm),
  };
  return {
    ...common,
    impedance: explained(figure.chart(scale, levelKvar), line),
    rival: {
      name,
      verdict,
      impedance: explained(second.chart(scale), 'all stages in'),
      margins: marginMap(other, name),
      workings: rivalWorkings(outcome, outcome.rival),
    },
  };
}

/** A chart whose long lines hold no more points than can be seen. */
function thinned(chart: Chart): Chart {
  const series = chart.series.map((one) => {
    if (one.x.length <= 2 * COLUMNS) return one;
    const place = Float64Array.from(one.x, (x) => placeOnAxis(chart.x, x) * COLUMNS);
    const kept = decimateColumns(place, one.y);
    const pick = (column: ArrayLike<number>) => Float64Array.from(kept, (i) => column[i]!);
    return { ...one, x: pick(one.x), y: pick(one.y), ...(one.base === undefined ? {} : { base: pick(one.base) }) };
  });
  return { ...chart, series };
}
