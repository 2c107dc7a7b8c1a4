import type {} from 'pdfkit';
import { INK, PAPER, STROKE } from './ink.js';

type Doc = PDFKit.PDFDocument;
type Point = { x: number; y: number };

/** Trade symbols, our own drawing; each hangs from `at` downwards and says where it ends. */

/** The grid: a hatched square. @returns its lower edge [pt] */
export function drawGrid(doc: Doc, at: Point): number {
  const side = 15;
  const left = at.x - side / 2;
  doc.save().rect(left, at.y, side, side).clip().lineWidth(STROKE.tick);
  for (let shift = -side; shift < side; shift += 5)
    doc.moveTo(left + shift, at.y + side).lineTo(left + shift + side, at.y);
  doc.stroke(INK).restore();
  doc.lineWidth(STROKE.load).rect(left, at.y, side, side).stroke(INK);
  return at.y + side;
}

/** A two-winding transformer: two rings. @returns its lower edge [pt] */
export function drawTransformer(doc: Doc, at: Point): number {
  const radius = 9;
  doc.lineWidth(STROKE.load);
  doc.circle(at.x, at.y + radius, radius).stroke(INK);
  doc.circle(at.x, at.y + 2.35 * radius, radius).stroke(INK);
  return at.y + 3.35 * radius;
}

/** A straight conductor; dashed where it was not entered. */
export function drawConductor(doc: Doc, from: Point, to: Point, dashed = false): void {
  doc.save().lineWidth(STROKE.load);
  if (dashed) doc.dash(2.4, { space: 1.8 });
  doc.moveTo(from.x, from.y).lineTo(to.x, to.y).stroke(INK).restore();
}

/** A breaker not entered: a dashed box with a cross. @returns its lower edge [pt] */
export function drawBreaker(doc: Doc, at: Point): number {
  const half = 4.5;
  const middle = at.y + half;
  doc.save().lineWidth(STROKE.tick).dash(2, { space: 1.6 });
  doc
    .rect(at.x - half, at.y, 2 * half, 2 * half)
    .fillAndStroke(PAPER, INK)
    .undash();
  doc.moveTo(at.x - 2.4, middle - 2.4).lineTo(at.x + 2.4, middle + 2.4);
  doc.moveTo(at.x - 2.4, middle + 2.4).lineTo(at.x + 2.4, middle - 2.4);
  doc.stroke(INK).restore();
  return at.y + 2 * half;
}

/** A current transformer not entered: a dashed ring around the conductor. */
export function drawCurrentTransformer(doc: Doc, at: Point): void {
  doc.save().lineWidth(STROKE.tick).dash(2, { space: 1.6 }).circle(at.x, at.y, 4.5).stroke(INK).restore();
}

/** The meter: a square beside the conductor with its tap. @returns its right edge [pt] */
export function drawMeter(doc: Doc, at: Point): number {
  doc
    .lineWidth(STROKE.tick)
    .moveTo(at.x, at.y)
    .lineTo(at.x + 12, at.y)
    .stroke(INK);
  doc
    .lineWidth(STROKE.load)
    .rect(at.x + 12, at.y - 6, 15, 12)
    .stroke(INK);
  return at.x + 27;
}

/** A motor: a ring; its letter is set as text. @returns its lower edge [pt] */
export function drawMotor(doc: Doc, at: Point): number {
  doc
    .lineWidth(STROKE.load)
    .circle(at.x, at.y + 9, 9)
    .stroke(INK);
  return at.y + 18;
}

/** A converter: a square cut in two, a wave above, two strokes below. @returns its lower edge [pt] */
export function drawConverter(doc: Doc, at: Point): number {
  const side = 18;
  const left = at.x - side / 2;
  doc.lineWidth(STROKE.load).rect(left, at.y, side, side).stroke(INK);
  doc
    .lineWidth(STROKE.tick)
    .moveTo(left, at.y + side)
    .lineTo(left + side, at.y)
    .stroke(INK);
  const wave = { x: left + 3, y: at.y + 5 };
  doc.moveTo(wave.x, wave.y).bezierCurveTo(wave.x + 1.5, wave.y - 4, wave.x + 2.5, wave.y - 1, wave.x + 3, wave.y);
  doc.bezierCurveTo(wave.x + 3.5, wave.y + 1, wave.x + 4.5, wave.y + 4, wave.x + 6, wave.y).stroke(INK);
  doc.moveTo(left + 10, at.y + 12).lineTo(left + 15.5, at.y + 12);
  doc
    .moveTo(left + 10, at.y + 14.2)
    .lineTo(left + 15.5, at.y + 14.2)
    .stroke(INK);
  return at.y + side;
}

/** Any other load: an arrow head. @returns its lower edge [pt] */
export function drawLoad(doc: Doc, at: Point): number {
  doc.polygon([at.x - 4, at.y], [at.x + 4, at.y], [at.x, at.y + 11]).fill(INK);
  return at.y + 11;
}

/** What a stage consists of. */
export interface StageParts {
  detuned: boolean;
  switched: boolean;
}

/** A stage: switch, reactor where there is one, capacitor; heavy, since it is the bank. @returns its lower edge [pt] */
export function drawStage(doc: Doc, at: Point, parts: StageParts): number {
  let y = at.y;
  doc.lineWidth(STROKE.load);
  if (parts.switched) {
    doc.moveTo(at.x, y).lineTo(at.x, y + 3);
    doc
      .moveTo(at.x - 4, y + 4.5)
      .lineTo(at.x, y + 13)
      .lineTo(at.x, y + 15)
      .stroke(INK);
  } else
    doc
      .moveTo(at.x, y)
      .lineTo(at.x, y + 15)
      .stroke(INK);
  y += 15;
  for (let bow = 0; bow < (parts.detuned ? 3 : 0); bow++) {
    doc
      .moveTo(at.x, y)
      .bezierCurveTo(at.x + 5, y, at.x + 5, y + 5, at.x, y + 5)
      .stroke(INK);
    y += 5;
  }
  if (!parts.detuned) {
    doc
      .moveTo(at.x, y)
      .lineTo(at.x, y + 5)
      .stroke(INK);
    y += 5;
  }
  doc
    .moveTo(at.x, y)
    .lineTo(at.x, y + 3)
    .stroke(INK);
  doc
    .lineWidth(STROKE.heavy)
    .moveTo(at.x - 6, y + 3)
    .lineTo(at.x + 6, y + 3);
  doc
    .moveTo(at.x - 6, y + 6.6)
    .lineTo(at.x + 6, y + 6.6)
    .stroke(INK);
  doc
    .lineWidth(STROKE.load)
    .moveTo(at.x, y + 6.6)
    .lineTo(at.x, y + 10)
    .stroke(INK);
  return y + 10;
}
