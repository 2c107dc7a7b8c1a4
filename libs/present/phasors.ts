import type { Outcome } from '#libs/engine/index.js';
import type { Axis, Chart, Mark } from './chart.js';
import { formatNumber, formatQuantity, MINUS } from './format-number.js';
import { say } from './language.js';
import { formatMoment } from './local-stamp.js';
import { linearAxis } from './ticks.js';

/** One interval at the bus, before and after the bank. */
export interface Moment {
  beginS: number;
  kw: number;
  loadKvar: number;
  bankKvar: number;
}

/**
 * Currents of one interval against the voltage, drawn to the right: the load's lags, downwards; the capacitors' leads
 * by 90°, upwards; their sum is what the supply carries.
 * @param outcome the plan or judgement
 * @param moment which interval; the worst where absent
 * @returns chart with one scale for both directions, in ampere at nominal voltage
 */
export function phasors(outcome: Outcome, moment: Moment = worstMoment(outcome)): Chart {
  const perKva = 1000 / (Math.sqrt(3) * outcome.site.nominalV);
  const load: [number, number] = [moment.kw * perKva, -moment.loadKvar * perKva];
  const sum: [number, number] = [load[0], load[1] + moment.bankKvar * perKva];
  const stamp = formatMoment(outcome.zone, moment.beginS);
  const before = Math.hypot(...load);
  const after = Math.hypot(...sum);
  const amperes = (value: number) => formatQuantity(value, 'A');
  const reach = {
    left: Math.min(load[0], sum[0], 0),
    x: Math.max(before, after, 1),
    down: Math.min(load[1], sum[1], 0),
    up: Math.max(load[1], sum[1], 0),
  };
  return {
    id: 'phasors',
    finding:
      moment.bankKvar > 0
        ? say`The supply’s current falls from ${amperes(before)} to ${amperes(after)}`
        : say`No stage is connected at this moment`,
    caption: say`Currents at ${formatNumber(outcome.site.nominalV, 'given')} V in the interval from ${stamp}; voltage to the right, lagging downwards.`,
    sentence: say`Voltage U points right. The load’s current, ${amperes(before)}, ${angleWords(load)}.
        The capacitors’ current, ${amperes(moment.bankKvar * perKva)}, leads U by 90° and points up.
        Their sum, the supply’s current, is ${amperes(after)} and ${angleWords(sum)}.`,
    x: within(linearAxis(say`in phase`, 'A', { least: reach.left, most: reach.x }, 4), {
      // an exporting site's labels stand to the left of its arrows
      from: reach.left < 0 ? reach.left - 0.5 * reach.x : 0,
      to: reach.x * 1.3,
      // the letter U stands at the arrow’s end
      lastTick: reach.x * 1.12,
    }),
    y: within(linearAxis(say`lagging downwards`, 'A', { least: reach.down, most: reach.up }, 4), {
      from: reach.down * 1.12,
      to: reach.up + 0.06 * reach.x,
    }),
    equalScales: true,
    series: [],
    marks: arrows(load, sum, moment.bankKvar * perKva),
    table: phasorTable(moment, { load, sum }),
  };
}

/** The same axis between ends that need not be round. */
function within(axis: Axis, ends: { from: number; to: number; lastTick?: number }): Axis {
  const { from, to, lastTick = to } = ends;
  return { ...axis, from, to, ticks: axis.ticks.filter(({ at }) => at >= from && at <= lastTick) };
}

/** The worst interval, or the one of greatest need where none misses the target. */
function worstMoment(outcome: Outcome): Moment {
  const { series, result } = outcome;
  const worst = result.operation.worstIntervals[0];
  let at = worst === undefined ? 0 : series.beginS.indexOf(worst.beginS);
  if (worst === undefined) {
    for (let i = 1; i < series.needKvar.length; i++) if (series.needKvar[i]! > series.needKvar[at]!) at = i;
  }
  return {
    beginS: series.beginS[at]!,
    kw: series.busKw[at]!,
    loadKvar: series.busKvar[at]!,
    bankKvar: series.connectedKvar[at]!,
  };
}

function angleWords([x, y]: [number, number]): string {
  const degrees = (Math.atan2(y, x) * 180) / Math.PI;
  if (Math.abs(degrees) < 0.05) return say`is in phase with U`;
  const size = formatNumber(Math.abs(degrees));
  return degrees < 0 ? say`lags U, at ${MINUS}${size}°` : say`leads U, at ${size}°`;
}

function arrows(load: [number, number], sum: [number, number], bankA: number): Mark[] {
  const label = (name: string, [x, y]: [number, number], amperes: number) => ({
    name: `${name} ${formatQuantity(amperes, 'A')}`,
    x,
    y,
  });
  const ends = {
    load: label(say`load`, load, Math.hypot(...load)),
    bank: label(say`bank`, [load[0], (load[1] + sum[1]) / 2], bankA),
    sum: label(say`supply`, sum, Math.hypot(...sum)),
  };
  const outward = load[0] < 0 ? 'left' : 'right';
  const along = 1.2 * Math.max(Math.hypot(...load), Math.hypot(...sum), 1);
  const marks: Mark[] = [
    { kind: 'arrow', from: [0, 0], to: [along, 0], part: 'beyond' },
    { kind: 'label', x: along, y: 0, text: 'U', side: 'above', part: 'beyond' },
    { kind: 'arrow', from: [0, 0], to: load, part: 'site' },
  ];
  if (bankA > 0) {
    marks.push({ kind: 'arrow', from: load, to: sum, part: 'bank' });
    marks.push({ kind: 'label', x: ends.bank.x, y: ends.bank.y, text: ends.bank.name, side: outward, part: 'bank' });
    marks.push({ kind: 'arrow', from: [0, 0], to: sum, part: 'after' });
    marks.push({ kind: 'label', x: sum[0], y: sum[1], text: ends.sum.name, side: outward, part: 'after' });
  }
  marks.push({ kind: 'label', x: load[0], y: load[1], text: ends.load.name, side: 'below', part: 'site' });
  return marks;
}

function phasorTable(moment: Moment, ends: { load: [number, number]; sum: [number, number] }): Chart['table'] {
  const { kw, loadKvar, bankKvar } = moment;
  const parts = [
    { kw, kvar: loadKvar, amperes: Math.hypot(...ends.load) },
    { kw: 0, kvar: -bankKvar, amperes: ends.sum[1] - ends.load[1] },
    { kw, kvar: loadKvar - bankKvar, amperes: Math.hypot(...ends.sum) },
  ];
  const row = (name: string, value: (part: (typeof parts)[number]) => number | null) => [
    name,
    ...parts.map((part) => formatQuantity(value(part), '')),
  ];
  return {
    columns: ['', say`load`, say`bank`, say`supply`].map((head, at) => ({ head, right: at > 0 })),
    rows: [
      row('kW', (part) => part.kw),
      row(say`kvar, lagging`, (part) => part.kvar),
      row('kVA', (part) => Math.hypot(part.kw, part.kvar)),
      row('A', (part) => part.amperes),
      row('cos φ', (part) => (part.kw === 0 ? null : Math.abs(part.kw) / Math.hypot(part.kw, part.kvar))),
    ],
  };
}
