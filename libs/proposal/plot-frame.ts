import type { Axis, Chart, Tick } from '#libs/present/chart.js';
import { placeOnAxis } from '#libs/present/ticks.js';
import { HAIR, INK, SOFT, STROKE } from './ink.js';
import type { Paper } from './paper.js';
import { BODY, type Style } from './typesetter.js';

/** A rectangle on the page: left, top, width, height [pt]. */
export interface Box {
  x: number;
  y: number;
  width: number;
  height: number;
}

export const AXIS: Style = { ...BODY, size: 8.4, ink: SOFT };
export const ON_CHART: Style = { ...BODY, size: 8.6 };

/** Where values stand on the page. */
export interface PlotFrame {
  /** what the whole chart may take */
  box: Box;
  plot: Box;
  atX(value: number): number;
  atY(value: number): number;
}

/** Room around the plot for what stands beside it [pt]. */
export interface Margins {
  top: number;
  right: number;
}

/**
 * Leaves room for the axes' texts and turns values into places.
 * @param box what the whole chart may take
 */
export function plotFrame(paper: Paper, chart: Chart, box: Box, margins: Margins): PlotFrame {
  const labels = chart.y.ticks.map(({ text }) => paper.type.width([text], AXIS));
  const left = Math.max(14, ...labels) + 7;
  const bottom = chart.x.label === '' ? 15 : 27;
  let plot = {
    x: box.x + left,
    y: box.y + margins.top,
    width: box.width - left - margins.right,
    height: box.height - margins.top - bottom,
  };
  if (chart.equalScales) plot = squared(chart, plot);
  return {
    box,
    plot,
    atX: (value) => plot.x + placeOnAxis(chart.x, value) * plot.width,
    atY: (value) => plot.y + plot.height - placeOnAxis(chart.y, value) * plot.height,
  };
}

/** Shrinks the plot so that one unit is one length both ways. */
function squared(chart: Chart, plot: Box): Box {
  const perUnit = Math.min(plot.width / (chart.x.to - chart.x.from), plot.height / (chart.y.to - chart.y.from));
  return { ...plot, width: perUnit * (chart.x.to - chart.x.from), height: perUnit * (chart.y.to - chart.y.from) };
}

/** Grid lines, axes and their texts. */
export function drawAxes(paper: Paper, chart: Chart, frame: PlotFrame): void {
  const { plot } = frame;
  const { doc, type } = paper;
  for (const tick of chart.y.ticks) {
    const y = frame.atY(tick.at);
    doc
      .lineWidth(STROKE.grid)
      .moveTo(plot.x, y)
      .lineTo(plot.x + plot.width, y)
      .stroke(HAIR);
  }
  for (const tick of thinned(paper, chart.y, (at) => frame.atY(at), 9)) {
    const width = type.width([tick.text], AXIS);
    type.put([tick.text], AXIS, plot.x - 5 - width, frame.atY(tick.at) + 2.8);
  }
  if (chart.y.unit !== '') {
    const width = type.width([chart.y.unit], AXIS);
    type.put([chart.y.unit], AXIS, plot.x - 5 - width, plot.y - 9);
  }
  drawBase(paper, chart, frame);
}

/** The horizontal axis: its line at zero where zero is in sight, strokes and texts below the plot. */
function drawBase(paper: Paper, chart: Chart, { box, plot, atX, atY }: PlotFrame): void {
  const { doc, type } = paper;
  const base = plot.y + plot.height;
  const zero = chart.y.scale === 'linear' && chart.y.from < 0 && chart.y.to > 0 ? atY(0) : base;
  doc
    .lineWidth(STROKE.tick)
    .moveTo(plot.x, zero)
    .lineTo(plot.x + plot.width, zero)
    .stroke(INK);
  const shown = new Set(thinned(paper, chart.x, atX, 0));
  for (const tick of chart.x.ticks) {
    const x = atX(tick.at);
    doc.lineWidth(tick.strong === true ? 1.6 : STROKE.tick);
    doc
      .moveTo(x, base)
      .lineTo(x, base + (tick.strong === true ? 5 : 3))
      .stroke(INK);
    if (!shown.has(tick)) continue;
    const style: Style = tick.strong === true ? { ...AXIS, ink: INK, weight: 'semibold' } : AXIS;
    const width = type.width([tick.text], style);
    type.put([tick.text], style, Math.min(x - width / 2, box.x + box.width - width), base + 13);
  }
  if (chart.x.label === '') return;
  const label = chart.x.unit === '' ? chart.x.label : `${chart.x.label}, ${chart.x.unit}`;
  type.put([label], AXIS, plot.x + plot.width / 2 - type.width([label], AXIS) / 2, base + 24);
}

/** Ticks whose texts do not touch; strong ones first, then in order. */
function thinned(paper: Paper, axis: Axis, place: (value: number) => number, height: number): Tick[] {
  const taken: { from: number; to: number }[] = [];
  const kept: Tick[] = [];
  const ordered = [...axis.ticks].sort((a, b) => Number(b.strong === true) - Number(a.strong === true));
  for (const tick of ordered) {
    const half = height > 0 ? height / 2 : paper.type.width([tick.text], AXIS) / 2 + 2.5;
    const at = place(tick.at);
    if (taken.some(({ from, to }) => at + half > from && at - half < to)) continue;
    taken.push({ from: at - half, to: at + half });
    kept.push(tick);
  }
  return kept;
}
