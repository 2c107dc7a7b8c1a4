import type { Axis, Chart } from '#libs/present/chart.js';
import { placeOnAxis } from '#libs/present/ticks.js';

/** Where a chart's field lies in its picture, and how values become places. */
export interface PlotBox {
  width: number;
  height: number;
  left: number;
  right: number;
  top: number;
  bottom: number;
  x(value: number): number;
  y(value: number): number;
}

/** Width of a text at the size of an axis label; near enough to keep labels clear of each other. */
export function textWidth(text: string): number {
  return 6.1 * text.length;
}

/**
 * The box of a chart at a width.
 * @param chart what is drawn
 * @param width of the picture
 * @param height of the picture; with one scale for both axes it follows from the width
 */
export function plotBox(chart: Chart, width: number, height: number): PlotBox {
  const labels = chart.y.ticks.map(({ text }) => textWidth(text));
  const left = chart.equalScales ? 4 : Math.max(22, ...labels) + 10;
  const hasLevels = chart.marks.some(({ kind }) => kind === 'level');
  const right = width - (hasLevels ? 92 : 10);
  const top = chart.marks.some(({ kind }) => kind === 'tick') ? 34 : 22;
  const span = right - left;
  const inner = chart.equalScales ? (span * (chart.y.to - chart.y.from)) / (chart.x.to - chart.x.from) : 0;
  const whole = chart.equalScales ? Math.round(inner + top + 12) : height;
  const bottom = whole - (chart.equalScales ? 6 : chart.x.label === '' ? 24 : 40);
  const place = (axis: Axis, from: number, to: number) => (value: number) =>
    from + placeOnAxis(axis, value) * (to - from);
  return {
    ...{ width, height: whole, left, right, top, bottom },
    x: place(chart.x, left, right),
    y: place(chart.y, bottom, top),
  };
}

/** The path of a row of points; NaN leaves a gap; a stair holds each value to the next x. */
export function linePath(box: PlotBox, xs: ArrayLike<number>, ys: ArrayLike<number>, isStair = false): string {
  const parts: string[] = [];
  let isOpen = false;
  for (let i = 0; i < xs.length; i++) {
    if (Number.isNaN(ys[i])) {
      isOpen = false;
      continue;
    }
    const x = box.x(xs[i]!).toFixed(1);
    const y = box.y(ys[i]!).toFixed(1);
    if (isOpen && isStair) parts.push(`H${x}V${y}`);
    else parts.push(`${isOpen ? 'L' : 'M'}${x} ${y}`);
    isOpen = true;
  }
  return parts.join('');
}

/** The path of a filled stretch between a row of points and its base. */
export function washPath(
  box: PlotBox,
  {
    x: xs,
    y: ys,
    base,
    isStair,
  }: { x: ArrayLike<number>; y: ArrayLike<number>; base?: ArrayLike<number>; isStair: boolean },
): string {
  const paths: string[] = [];
  let from = 0;
  while (from < xs.length) {
    if (Number.isNaN(ys[from])) {
      from++;
      continue;
    }
    let to = from;
    while (to < xs.length && !Number.isNaN(ys[to])) to++;
    paths.push(stretchPath(box, { xs, ys, base, isStair, from, to }));
    from = to;
  }
  return paths.join('');
}

interface Stretch {
  xs: ArrayLike<number>;
  ys: ArrayLike<number>;
  base: ArrayLike<number> | undefined;
  isStair: boolean;
  from: number;
  to: number;
}

function stretchPath(box: PlotBox, { xs, ys, base, isStair, from, to }: Stretch): string {
  const upper: string[] = [];
  const lower: string[] = [];
  for (let i = from; i < to; i++) {
    const x = box.x(xs[i]!).toFixed(1);
    const y = box.y(ys[i]!).toFixed(1);
    upper.push(i === from ? `M${x} ${y}` : isStair ? `H${x}V${y}` : `L${x} ${y}`);
    const floor = base === undefined ? box.bottom : box.y(base[i]!);
    lower.push(`L${x} ${floor.toFixed(1)}`);
  }
  return `${upper.join('')}${lower.reverse().join('')}Z`;
}
