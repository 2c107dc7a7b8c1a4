import { formatNumber } from '#libs/present/format-number.js';
import { linearAxis, placeOnAxis } from '#libs/present/ticks.js';
import type { Trace } from '../desk/look.js';
import type { TracePyramid } from './trace-pyramid.js';

/** The stretch of intervals that is shown; ends may lie between intervals. */
export interface TraceView {
  from: number;
  to: number;
}

/** What is drawn, and how large. */
export interface TracePicture {
  trace: Trace;
  kw: TracePyramid;
  kvar: TracePyramid;
  view: TraceView;
  width: number;
  height: number;
}

const LEFT = 44;
const BOTTOM = 22;
const TOP = 18;

/** Draws a stretch of the record: per column of pixels the least and greatest value, so that no peak is lost. */
export function drawTrace(canvas: HTMLCanvasElement, picture: TracePicture): void {
  const { width, height, kw, kvar, view } = picture;
  const ratio = window.devicePixelRatio || 1;
  if (canvas.width !== Math.round(width * ratio)) canvas.width = Math.round(width * ratio);
  if (canvas.height !== Math.round(height * ratio)) canvas.height = Math.round(height * ratio);
  const pen = canvas.getContext('2d');
  if (pen === null) return;
  pen.setTransform(ratio, 0, 0, ratio, 0, 0);
  pen.clearRect(0, 0, width, height);
  const style = getComputedStyle(canvas);
  const colour = (name: string) => style.getPropertyValue(name).trim();
  const all = [kw, kvar].map((column) => column.extent(Math.floor(view.from), Math.ceil(view.to)));
  const axis = linearAxis('', '', {
    least: Math.min(0, ...all.map(({ least }) => least)),
    most: Math.max(...all.map(({ most }) => most)),
  });
  const y = (value: number) => height - BOTTOM - placeOnAxis(axis, value) * (height - BOTTOM - TOP);
  pen.font = `12.5px ${style.fontFamily}`;
  pen.textBaseline = 'middle';
  pen.textAlign = 'right';
  for (const tick of axis.ticks) {
    pen.fillStyle = colour('--soft');
    pen.fillText(formatNumber(tick.at, 'given'), LEFT - 8, y(tick.at));
    pen.fillStyle = colour(tick.at === 0 ? '--ink' : '--hair');
    pen.fillRect(LEFT, y(tick.at), width - LEFT, tick.at === 0 ? 1.2 : 0.6);
  }
  pen.fillStyle = colour('--soft');
  pen.fillText('kW, kvar', LEFT + 6, 7);
  drawColumn(pen, picture, { column: kvar, y, colour: colour('--bank'), wide: 1.3 });
  drawColumn(pen, picture, { column: kw, y, colour: colour('--ink'), wide: 1.6 });
  drawTimes(pen, picture, colour('--soft'));
}

function drawColumn(
  pen: CanvasRenderingContext2D,
  { view, width }: TracePicture,
  { column, y, colour, wide }: { column: TracePyramid; y: (value: number) => number; colour: string; wide: number },
): void {
  const across = width - LEFT;
  const span = view.to - view.from;
  pen.strokeStyle = colour;
  pen.lineWidth = wide;
  pen.beginPath();
  for (let pixel = 0; pixel < across; pixel++) {
    const from = view.from + (pixel / across) * span;
    const to = view.from + ((pixel + 1) / across) * span;
    const { least, most } = column.extent(Math.floor(from), Math.max(Math.floor(from) + 1, Math.floor(to)));
    if (pixel === 0) pen.moveTo(LEFT, y(most));
    pen.lineTo(LEFT + pixel, y(most));
    if (least !== most) pen.lineTo(LEFT + pixel, y(least));
  }
  pen.stroke();
}

function drawTimes(pen: CanvasRenderingContext2D, { trace, view, width, height }: TracePicture, colour: string): void {
  pen.fillStyle = colour;
  const count = Math.max(2, Math.floor((width - LEFT) / 150));
  const last = trace.beginS.length - 1;
  for (let k = 0; k <= count; k++) {
    const index = Math.min(last, Math.round(view.from + ((view.to - view.from) * k) / count));
    const stamp = new Date(trace.beginS[index]! * 1000).toISOString();
    pen.textAlign = k === 0 ? 'left' : k === count ? 'right' : 'center';
    pen.fillText(stamp.slice(0, 16).replace('T', ' '), LEFT + ((width - LEFT) * k) / count, height - 8);
  }
}
