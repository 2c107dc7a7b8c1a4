import type { Axis, Tick } from './chart.js';
import { formatNumber } from './format-number.js';

/**
 * Round steps over a span: 1, 2 or 5 times a power of ten.
 * @param from lower end
 * @param to upper end, above `from`
 * @param most greatest number of steps wanted
 * @returns the step
 */
export function niceStep(from: number, to: number, most: number): number {
  const raw = (to - from) / Math.max(most, 1);
  const power = 10 ** Math.floor(Math.log10(raw));
  const step = [1, 2, 5, 10].find((factor) => factor * power >= raw * (1 - 1e-9)) ?? 10;
  return step * power;
}

/**
 * A linear axis from 0 (or below) up to a round end.
 * @param label what it shows
 * @param unit its unit
 * @param values least and greatest value shown
 * @param most greatest number of steps wanted
 * @returns axis with ticks at round steps
 */
export function linearAxis(label: string, unit: string, values: { least: number; most: number }, steps = 5): Axis {
  const least = Math.min(values.least, 0);
  const most = values.most > least ? values.most : least + 1;
  const step = niceStep(least, most, steps);
  const from = Math.floor(least / step + 1e-9) * step;
  const to = Math.ceil(most / step - 1e-9) * step;
  const ticks: Tick[] = [];
  for (let n = Math.round(from / step); n <= Math.round(to / step); n++) {
    ticks.push({ at: n * step, text: formatNumber(n * step, 'given') });
  }
  return { label, unit, scale: 'linear', from, to, ticks };
}

/**
 * A logarithmic axis that holds a span, with ticks at 1, 2 and 5 of each decade.
 * @param label what it shows
 * @param unit its unit
 * @param values least and greatest value, both above 0
 * @returns axis with round ends
 */
export function logAxis(label: string, unit: string, values: { least: number; most: number }): Axis {
  const stops = decades(values.least, values.most);
  const from = stops.findLast((stop) => stop <= values.least * (1 + 1e-9)) ?? values.least;
  const to = stops.find((stop) => stop >= values.most * (1 - 1e-9)) ?? values.most;
  const ticks = stops
    .filter((stop) => stop >= from && stop <= to)
    .map((at) => ({ at, text: formatNumber(at, 'given') }));
  return { label, unit, scale: 'log', from, to, ticks };
}

function decades(least: number, most: number): number[] {
  const stops: number[] = [];
  for (let power = Math.floor(Math.log10(least)); power <= Math.ceil(Math.log10(most)); power++) {
    for (const factor of [1, 2, 5]) stops.push(Number(`${factor}e${power}`));
  }
  return stops;
}

/**
 * Place of a value on an axis.
 * @param axis the axis
 * @param value in the axis' unit
 * @returns 0 at the axis' lower end, 1 at its upper end
 */
export function placeOnAxis(axis: Axis, value: number): number {
  if (axis.scale === 'log') return Math.log(value / axis.from) / Math.log(axis.to / axis.from);
  return (value - axis.from) / (axis.to - axis.from);
}
