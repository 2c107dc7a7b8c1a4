import { formatNumber } from '#libs/present/format-number.js';
import { linearAxis, placeOnAxis } from '#libs/present/ticks.js';
import { timeTicks } from '#libs/present/time-ticks.js';
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
  /** stretches of slots whose zeros are suspect */
  suspect: readonly (readonly [from: number, to: number])[];
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
  drawGaps(pen, picture, { fill: colour('--faint'), line: colour('--soft') });
  for (const strip of strips) drawStrip(pen, picture, strip, { soft: colour('--soft'), hair: colour('--hair') });
  drawSuspect(pen, picture, colour('--watch'));
  drawTimes(pen, picture, { soft: colour('--soft'), hair: colour('--hair') });
}

/** Where a stretch of slots lies in the picture, null where it is out of view. */
function placeOf(
  { view, width }: TracePicture,
  [from, to]: readonly [number, number],
): [x: number, wide: number] | null {
  if (to <= view.from || from >= view.to) return null;
  const perSlot = (width - LEFT) / (view.to - view.from);
  const left = LEFT + Math.max(0, from - view.from) * perSlot;
  const right = LEFT + Math.min(view.to - view.from, to - view.from) * perSlot;
  return [left, Math.max(1, right - left)];
}

/** What was not read: a quiet fill with strokes across, wide or narrow. */
function drawGaps(
  pen: CanvasRenderingContext2D,
  picture: TracePicture,
  { fill, line }: Record<'fill' | 'line', string>,
): void {
  const top = GAP - 6;
  const bottom = picture.height - BOTTOM;
  pen.lineWidth = 1;
  for (const gap of picture.trace.gaps) {
    const place = placeOf(picture, gap);
    if (place === null) continue;
    const [x, wide] = place;
    pen.fillStyle = fill;
    pen.fillRect(x, top, wide, bottom - top);
    pen.save();
    pen.beginPath();
    pen.rect(x, top, wide, bottom - top);
    pen.clip();
    pen.strokeStyle = line;
    pen.beginPath();
    for (let at = x - (bottom - top); at < x + wide; at += 9) {
      pen.moveTo(at, bottom);
      pen.lineTo(at + bottom - top, top);
    }
    pen.stroke();
    pen.restore();
    if (wide < 70) continue;
    pen.fillStyle = line;
    pen.textAlign = 'center';
    pen.fillText('no reading', x + wide / 2, top - 8);
  }
}

/** Suspect zeros carry a stroke along the foot of both strips. */
function drawSuspect(pen: CanvasRenderingContext2D, picture: TracePicture, colour: string): void {
  const middle = (picture.height - BOTTOM) / 2;
  pen.fillStyle = colour;
  for (const stretch of picture.suspect) {
    const place = placeOf(picture, stretch);
    if (place === null) continue;
    for (const y of [middle, picture.height - BOTTOM]) pen.fillRect(place[0], y - 1, place[1], 3);
  }
}

function drawStrip(
  pen: CanvasRenderingContext2D,
  picture: TracePicture,
  { column, unit, top, bottom, colour }: Strip,
  { soft, hair }: { soft: string; hair: string },
): void {
  const { view, width } = picture;
  const { least, most } = finite(column.extent(Math.floor(view.from), Math.ceil(view.to)));
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
  let isDown = false;
  for (let pixel = 0; pixel < across; pixel++) {
    const from = Math.floor(view.from + (pixel / across) * span);
    const to = Math.max(from + 1, Math.floor(view.from + ((pixel + 1) / across) * span));
    const found = column.extent(from, to);
    if (found.most < found.least) {
      isDown = false;
      continue;
    }
    if (isDown) pen.lineTo(LEFT + pixel, y(found.most));
    else pen.moveTo(LEFT + pixel, y(found.most));
    isDown = true;
    if (found.least !== found.most) pen.lineTo(LEFT + pixel, y(found.least));
  }
  pen.stroke();
}

/** A view without any reading has no extent of its own. */
function finite({ least, most }: { least: number; most: number }): { least: number; most: number } {
  return most < least ? { least: 0, most: 1 } : { least, most };
}

function drawTimes(
  pen: CanvasRenderingContext2D,
  picture: TracePicture,
  { soft, hair }: Record<'soft' | 'hair', string>,
): void {
  const { trace, view, width, height } = picture;
  const { firstS, intervalS, zone } = trace;
  const span = { fromS: firstS + view.from * intervalS, toS: firstS + view.to * intervalS };
  const across = width - LEFT;
  for (const { atS, text } of timeTicks(zone, span, Math.max(2, Math.floor(across / 76)))) {
    const x = LEFT + ((atS - span.fromS) / (span.toS - span.fromS)) * across;
    pen.fillStyle = hair;
    pen.fillRect(x, height - BOTTOM, 1, 5);
    pen.fillStyle = soft;
    pen.textAlign = x < LEFT + 30 ? 'left' : x > width - 30 ? 'right' : 'center';
    pen.fillText(text, x, height - 8);
  }
}
