import { formatNumber } from '#libs/present/format-number.js';
import { formatMoment } from '#libs/present/local-stamp.js';
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
const GAP = 26;

/** A strip of the picture with one quantity. */
interface Strip {
  column: TracePyramid;
  unit: string;
  top: number;
  bottom: number;
  colour: string;
}

/** Draws a stretch of the record in two strips: per column of pixels the least and greatest value, so that no peak is lost. */
export function drawTrace(canvas: HTMLCanvasElement, picture: TracePicture): void {
  const { width, height, kw, kvar } = picture;
  const ratio = window.devicePixelRatio || 1;
  if (canvas.width !== Math.round(width * ratio)) canvas.width = Math.round(width * ratio);
  if (canvas.height !== Math.round(height * ratio)) canvas.height = Math.round(height * ratio);
  const pen = canvas.getContext('2d');
  if (pen === null) return;
  pen.setTransform(ratio, 0, 0, ratio, 0, 0);
  pen.clearRect(0, 0, width, height);
  const style = getComputedStyle(canvas);
  const colour = (name: string) => style.getPropertyValue(name).trim();
  pen.font = `12.5px ${style.fontFamily}`;
  pen.textBaseline = 'middle';
  const middle = (height - BOTTOM) / 2;
  const strips: Strip[] = [
    { column: kw, unit: 'kW', top: GAP - 6, bottom: middle, colour: colour('--ink') },
    { column: kvar, unit: 'kvar', top: middle + GAP, bottom: height - BOTTOM, colour: colour('--ink') },
  ];
  for (const strip of strips) drawStrip(pen, picture, strip, { soft: colour('--soft'), hair: colour('--hair') });
  drawTimes(pen, picture, colour('--soft'));
}

function drawStrip(
  pen: CanvasRenderingContext2D,
  picture: TracePicture,
  { column, unit, top, bottom, colour }: Strip,
  { soft, hair }: { soft: string; hair: string },
): void {
  const { view, width } = picture;
  const { least, most } = column.extent(Math.floor(view.from), Math.ceil(view.to));
  const axis = linearAxis('', unit, { least: Math.min(0, least), most: Math.max(most, 1e-9) }, 3);
  const y = (value: number) => bottom - placeOnAxis(axis, value) * (bottom - top);
  pen.textAlign = 'right';
  for (const tick of axis.ticks) {
    pen.fillStyle = soft;
    pen.fillText(formatNumber(tick.at, 'given'), LEFT - 8, y(tick.at));
    pen.fillStyle = tick.at === 0 ? colour : hair;
    pen.fillRect(LEFT, y(tick.at), width - LEFT, tick.at === 0 ? 1.2 : 0.6);
  }
  pen.fillStyle = soft;
  pen.fillText(unit, LEFT - 8, top - 13);
  const across = width - LEFT;
  const span = view.to - view.from;
  pen.strokeStyle = colour;
  pen.lineWidth = 1.2;
  pen.beginPath();
  for (let pixel = 0; pixel < across; pixel++) {
    const from = Math.floor(view.from + (pixel / across) * span);
    const to = Math.max(from + 1, Math.floor(view.from + ((pixel + 1) / across) * span));
    const found = column.extent(from, to);
    if (pixel === 0) pen.moveTo(LEFT, y(found.most));
    pen.lineTo(LEFT + pixel, y(found.most));
    if (found.least !== found.most) pen.lineTo(LEFT + pixel, y(found.least));
  }
  pen.stroke();
}

function drawTimes(pen: CanvasRenderingContext2D, { trace, view, width, height }: TracePicture, colour: string): void {
  pen.fillStyle = colour;
  const count = Math.max(2, Math.floor((width - LEFT) / 150));
  const last = trace.beginS.length - 1;
  for (let k = 0; k <= count; k++) {
    const index = Math.min(last, Math.round(view.from + ((view.to - view.from) * k) / count));
    pen.textAlign = k === 0 ? 'left' : k === count ? 'right' : 'center';
    pen.fillText(formatMoment(trace.zone, trace.beginS[index]!), LEFT + ((width - LEFT) * k) / count, height - 8);
  }
}
