import { logoProblem } from './raster.js';
import { needPixels } from './read-png.js';

/** A JPEG without what is no picture: its segments, width and height. */
export interface PlainJpeg {
  width: number;
  height: number;
  bytes: Uint8Array;
}

const START = 0xd8;
const END = 0xd9;
const SCAN = 0xda;
/** Frames that PDF readers decode: baseline, extended, progressive. */
const FRAMES = [0xc0, 0xc1, 0xc2];
const OTHER_FRAMES = [0xc3, 0xc5, 0xc6, 0xc7, 0xc9, 0xca, 0xcb, 0xcd, 0xce, 0xcf];
/** Adobe's segment says how colours are to be read; all other application segments are left out. */
const ADOBE = 0xee;

/**
 * Whether bytes begin as a JPEG does.
 * @param bytes of a file
 */
export function isJpeg(bytes: Uint8Array): boolean {
  return bytes[0] === 0xff && bytes[1] === START && bytes[2] === 0xff;
}

/**
 * A JPEG of grey or three colours, its place, camera and comments left out.
 * @param bytes the file
 * @returns the picture with its size
 * @throws InputProblem where it is damaged, of four colours, or too large
 */
export function readJpeg(bytes: Uint8Array): PlainJpeg {
  const kept: Uint8Array[] = [bytes.subarray(0, 2)];
  let size: PictureSize | null = null;
  for (const { marker, at, segment } of segments(bytes)) {
    if (OTHER_FRAMES.includes(marker))
      throw logoProblem('not-supported-yet', 'a baseline or progressive JPEG', 'another');
    if (FRAMES.includes(marker)) size = onlySize(size, segment);
    if (marker === SCAN) {
      if (size === null || !endsWhole(bytes)) break;
      return { ...size, bytes: Buffer.concat([...kept, bytes.subarray(at)]) };
    }
    if (!isBeside(marker)) kept.push(segment);
  }
  throw damaged();
}

interface PictureSize {
  width: number;
  height: number;
}

/** Segments up to the first scan; what follows it has no lengths. */
function* segments(bytes: Uint8Array): Generator<{ marker: number; at: number; segment: Uint8Array }> {
  for (let at = 2; at + 4 <= bytes.length; ) {
    const length = 2 + (bytes[at + 2]! << 8) + bytes[at + 3]!;
    if (bytes[at] !== 0xff || length < 4 || at + length > bytes.length) throw damaged();
    yield { marker: bytes[at + 1]!, at, segment: bytes.subarray(at, at + length) };
    at += length;
  }
}

/** What programs write beside the picture: application segments and comments. */
function isBeside(marker: number): boolean {
  return (marker >= 0xe0 && marker <= 0xef && marker !== ADOBE) || marker === 0xfe;
}

function onlySize(known: PictureSize | null, segment: Uint8Array): PictureSize {
  if (known !== null) throw damaged();
  return frameSize(segment);
}

function damaged() {
  return logoProblem('unreadable', 'a whole JPEG', 'a damaged one');
}

function frameSize(segment: Uint8Array): PictureSize {
  if (segment.length < 10) throw damaged();
  const size = { height: (segment[5]! << 8) + segment[6]!, width: (segment[7]! << 8) + segment[8]! };
  const samples = segment[9]!;
  needPixels(size);
  if (segment[4] !== 8 || (samples !== 1 && samples !== 3)) {
    throw logoProblem('not-supported-yet', 'a JPEG of 8 bits, grey or of three colours', 'another');
  }
  return size;
}

function endsWhole(bytes: Uint8Array): boolean {
  return bytes.at(-2) === 0xff && bytes.at(-1) === END;
}
