import { readStamp } from '../time/stamp-text.js';

/** Stamp, season flag, active import and export, and the reactive energy of the four quadrants. */
export const QUADRANT_CELLS = 8;

/** Lines that are looked at to recognise the format. */
const LOOK_LINES = 20;
const NUMBER = /^\d{1,12}(?:[.,]\d{1,6})?$/;

/**
 * Whether a file begins with rows of stamp; 0 or 1; AI; AE; R1; R2; R3; R4, without a header.
 * @param head the first bytes of the file
 */
export function isQuadrantRows(head: Uint8Array): boolean {
  const text = new TextDecoder('latin1').decode(head.subarray(0, 8192));
  const lines = text.split(/\r\n|\n|\r/);
  // the last one may be cut
  const whole = head.length > 8192 || !/[\r\n]$/.test(text) ? lines.slice(0, -1) : lines;
  const filled = whole.filter((line) => line.trim() !== '').slice(0, LOOK_LINES);
  return filled.length >= 2 && filled.every(isQuadrantLine);
}

function isQuadrantLine(line: string): boolean {
  const cells = line.split(';').map((cell) => cell.trim());
  if (cells.length === QUADRANT_CELLS + 1 && cells.at(-1) === '') cells.pop();
  const [stamp = '', season = '', ...energies] = cells;
  if (cells.length !== QUADRANT_CELLS || !/^[01]$/.test(season) || !energies.every((cell) => NUMBER.test(cell)))
    return false;
  const read = readStamp(stamp);
  return read !== null && read.dateKey !== null && read.clockS !== null;
}
