import { InputProblem, type ProblemCode } from '#libs/engine/index.js';

/** A logo is a small drawing; larger files are photographs or something else [bytes]. */
export const MOST_LOGO_BYTES = 262_144;
/** Enough for 600 dots an inch at the size a logo is printed. */
export const MOST_LOGO_PIXELS = 2_000_000;

/** A picture of opaque pixels. */
export interface Raster {
  width: number;
  height: number;
  /** three bytes a pixel, rows from the top */
  rgb: Uint8Array;
}

/**
 * A problem with the logo that was given.
 * @param code what kind of problem
 * @param expected what a logo has to be
 * @param found what it is
 * @returns the problem at the path `logo`
 */
export function logoProblem(code: ProblemCode, expected: string, found: string): InputProblem {
  return new InputProblem([{ code, path: 'logo', expected, found }]);
}
