import { localTime, type Outcome } from '#libs/engine/index.js';
import type { Chart, Mark, Series } from './chart.js';
import { formatNumber, formatQuantity } from './format-number.js';
import { say } from './language.js';
import { dayBeginS, formatClock, formatWeekday } from './local-stamp.js';
import { linearAxis } from './ticks.js';

/** Intervals of one local day, as a stretch of the series. */
interface DayOfRecord {
  beginS: number;
  endS: number;
  from: number;
  to: number;
}

/** A row of the table every so many hours. */
const LISTED_EVERY_S = 2 * 3600;

/**
 * The day that holds the worst interval: reactive power without and with the bank, and the stages connected.
 * @param outcome the plan or judgement
 * @returns chart by the site's clock; missing intervals are gaps
 */
export function worstDay(outcome: Outcome): Chart {
  const day = dayAround(outcome, worstBeginS(outcome));
  const columns = dayColumns(outcome, day);
  const name = formatWeekday(outcome.zone, day.beginS);
  const { least, most } = span(columns);
  return {
    id: 'worstDay',
    finding: finding(outcome, name),
    caption: say`${name}, by the site’s clock. Heavy: the load without the bank. Thin: with it. Dashed: needed. Grey: connected.`,
    sentence: say`On ${name} the load draws between ${formatQuantity(columns.least.load, 'kvar')} and
        ${formatQuantity(columns.most.load, 'kvar')}; with the bank between ${formatQuantity(columns.least.after, 'kvar')} and
        ${formatQuantity(columns.most.after, 'kvar')} are left.`,
    x: clockAxis(outcome, day),
    // room for the label above the highest point
    y: linearAxis(say`at the bus`, 'kvar', { least, most: most * 1.08 }),
    equalScales: false,
    series: daySeries(columns),
    marks: dayMarks(columns),
    table: dayTable(outcome, day),
  };
}

function worstBeginS(outcome: Outcome): number {
  const worst = outcome.result.operation.worstIntervals[0];
  if (worst !== undefined) return worst.beginS;
  const { beginS, needKvar, busKvar } = outcome.series;
  const measure = outcome.result.requirement.maxKvar > 1e-9 ? needKvar : busKvar;
  let at = 0;
  for (let i = 1; i < measure.length; i++) if (measure[i]! > measure[at]!) at = i;
  return beginS[at]!;
}

function dayAround(outcome: Outcome, momentS: number): DayOfRecord {
  const { zone, series } = outcome;
  const beginS = dayBeginS(zone, momentS);
  // noon of the next day is in the next day whatever the clocks do
  const endS = dayBeginS(zone, beginS + 36 * 3600);
  const from = series.beginS.findIndex((s) => s >= beginS);
  const after = series.beginS.findIndex((s) => s >= endS);
  return { beginS, endS, from, to: after < 0 ? series.beginS.length : after };
}

interface DayColumns {
  x: number[];
  load: number[];
  need: number[];
  after: number[];
  connected: number[];
  least: { load: number; after: number };
  most: { load: number; after: number };
}

/** One entry an interval, and NaN where intervals are missing, each value held to the next x. */
function dayColumns(outcome: Outcome, day: DayOfRecord): DayColumns {
  const { series, record } = outcome;
  const out: DayColumns = {
    x: [],
    load: [],
    need: [],
    after: [],
    connected: [],
    least: { load: Number.POSITIVE_INFINITY, after: Number.POSITIVE_INFINITY },
    most: { load: Number.NEGATIVE_INFINITY, after: Number.NEGATIVE_INFINITY },
  };
  const push = (x: number, [load, need, connected]: [number, number, number]) => {
    out.x.push(x);
    out.load.push(load);
    out.need.push(need);
    out.connected.push(connected);
    out.after.push(load - connected);
  };
  for (let i = day.from; i < day.to; i++) {
    const x = series.beginS[i]! - day.beginS;
    const expected = i === day.from ? x : series.beginS[i - 1]! - day.beginS + record.intervalS;
    if (x > expected) push(expected, [Number.NaN, Number.NaN, Number.NaN]);
    const load = series.busKvar[i]!;
    push(x, [load, series.needKvar[i]!, series.connectedKvar[i]!]);
    out.least.load = Math.min(out.least.load, load);
    out.most.load = Math.max(out.most.load, load);
    out.least.after = Math.min(out.least.after, out.after.at(-1)!);
    out.most.after = Math.max(out.most.after, out.after.at(-1)!);
  }
  const end = (out.x.at(-1) ?? 0) + record.intervalS;
  const last = out.x.length - 1;
  push(end, [out.load[last] ?? 0, out.need[last] ?? 0, out.connected[last] ?? 0]);
  return out;
}

function span(columns: DayColumns): { least: number; most: number } {
  const connected = Math.max(0, ...columns.connected.filter((kvar) => !Number.isNaN(kvar)));
  return {
    least: Math.min(0, columns.least.load, columns.least.after),
    most: Math.max(columns.most.load, columns.most.after, connected),
  };
}

function clockAxis(outcome: Outcome, day: DayOfRecord): Chart['x'] {
  const lengthS = day.endS - day.beginS;
  const ticks = [];
  for (let atS = 0; atS <= lengthS; atS += 3 * 3600) {
    const clock = atS === lengthS ? '24:00' : formatClock(localTime(outcome.zone, day.beginS + atS).secondOfDay);
    ticks.push({ at: atS, text: clock });
  }
  return { label: say`time of day`, unit: '', scale: 'linear', from: 0, to: lengthS, ticks };
}

function daySeries(columns: DayColumns): Series[] {
  const zero = columns.x.map(() => 0);
  return [
    { part: 'bank', shape: 'washStair', x: columns.x, y: columns.connected, base: zero },
    { part: 'need', shape: 'stair', x: columns.x, y: columns.need },
    { part: 'after', shape: 'stair', x: columns.x, y: columns.after },
    { part: 'site', shape: 'stair', x: columns.x, y: columns.load },
  ];
}

function dayMarks(columns: DayColumns): Mark[] {
  let at = 0;
  columns.load.forEach((kvar, i) => {
    if (kvar > (columns.load[at] ?? Number.NEGATIVE_INFINITY)) at = i;
  });
  const x = columns.x[at] ?? 0;
  const load = columns.load[at] ?? 0;
  return [{ kind: 'label', x, y: load, text: say`without ${formatNumber(load)}`, side: 'above', part: 'site' }];
}

function dayTable(outcome: Outcome, day: DayOfRecord): Chart['table'] {
  const { series, zone, record } = outcome;
  const rows: string[][] = [];
  let nextS = day.beginS;
  for (let i = day.from; i < day.to; i++) {
    if (series.beginS[i]! + record.intervalS <= nextS) continue;
    const kvar = (value: number) => formatNumber(value);
    rows.push([
      formatClock(localTime(zone, series.beginS[i]!).secondOfDay),
      formatNumber(series.busKw[i]!),
      kvar(series.busKvar[i]!),
      kvar(series.needKvar[i]!),
      kvar(series.connectedKvar[i]!),
      kvar(series.busKvar[i]! - series.connectedKvar[i]!),
    ]);
    nextS += LISTED_EVERY_S;
  }
  const heads = [say`begins`, say`load kW`, say`load kvar`, say`needed kvar`, say`connected kvar`, say`left kvar`];
  return { columns: heads.map((head, at) => ({ head, right: at > 0 })), rows };
}

function finding(outcome: Outcome, name: string): string {
  const worst = outcome.result.operation.worstIntervals[0];
  if (worst === undefined) return say`${name} has the greatest need, and the bank meets it`;
  return say`${name} is the worst day: ${formatQuantity(worst.shortfallKvar, 'kvar')} short of the target`;
}
