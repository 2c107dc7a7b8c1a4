import type {} from 'pdfkit';
import type { Verdict } from '#libs/engine/index.js';
import { INK, PAPER, STROKE } from './ink.js';

/** What a mark is drawn on: a document with pdfkit's path methods. */
type Doc = PDFKit.PDFDocument;

/**
 * Draws the mark of a verdict: an open ring, a lozenge with its left half filled, a filled square with one bar,
 * or a dash where nothing was judged. The more ink, the worse.
 * @param centre middle of the mark [pt]
 * @param radius half its width [pt]
 */
export function drawVerdictMark(
  doc: Doc,
  verdict: Verdict | null,
  centre: { x: number; y: number },
  radius = 3.6,
): void {
  const { x, y } = centre;
  doc.lineWidth(1.1);
  switch (verdict) {
    case null:
      doc
        .moveTo(x - radius, y)
        .lineTo(x + radius, y)
        .stroke(INK);
      return;
    case 'clear':
      doc.circle(x, y, radius * 0.92).stroke(INK);
      return;
    case 'watch': {
      const half = radius * 1.2;
      doc.polygon([x, y - half], [x - half, y], [x, y + half]).fill(INK);
      doc.polygon([x, y - half], [x + half, y], [x, y + half], [x - half, y]).stroke(INK);
      return;
    }
    case 'avoid':
      doc.rect(x - radius, y - radius, 2 * radius, 2 * radius).fill(INK);
      doc
        .lineWidth(1.2)
        .moveTo(x - radius * 0.72, y + radius * 0.72)
        .lineTo(x + radius * 0.72, y - radius * 0.72)
        .stroke(PAPER);
      return;
  }
}

/**
 * Fills a rectangle with lines at 45°, one every `pitch`.
 * @param box left, top, width, height [pt]
 */
export function hatch(doc: Doc, box: { x: number; y: number; width: number; height: number }, pitch = 3.6): void {
  const { x, y, width, height } = box;
  doc.save().rect(x, y, width, height).clip();
  doc.lineWidth(STROKE.load);
  for (let at = x - height - ((((x - height) % pitch) + pitch) % pitch); at < x + width; at += pitch) {
    doc.moveTo(at, y + height).lineTo(at + height, y);
  }
  doc.stroke(INK).restore();
}
