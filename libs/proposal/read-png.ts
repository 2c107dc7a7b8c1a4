import { inflateSync } from 'node:zlib';
import { logoProblem, MOST_LOGO_PIXELS, type Raster } from './raster.js';

const SIGNATURE = [0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a];

/** Samples of a pixel by colour type. */
const CHANNELS: Readonly<Record<number, number>> = { 0: 1, 2: 3, 3: 1, 4: 2, 6: 4 };

interface Head {
  width: number;
  height: number;
  bits: number;
  colour: number;
}

/**
 * Whether bytes begin as a PNG does.
 * @param bytes of a file
 */
export function isPng(bytes: Uint8Array): boolean {
  return SIGNATURE.every((byte, at) => bytes[at] === byte);
}

/**
 * A PNG laid on white: 8 bits a sample or less, not interlaced. No more is inflated than its own width and height ask for.
 * @param bytes the file
 * @returns its pixels
 * @throws InputProblem where it is damaged, of another kind, or holds more than it says
 */
export function readPng(bytes: Uint8Array): Raster {
  const { head, palette, alphas, data } = readChunks(bytes);
  const { width, height, bits, colour } = head;
  const rowBytes = Math.ceil((width * bits * CHANNELS[colour]!) / 8);
  const rows = unfiltered(inflated(data, height * (1 + rowBytes)), {
    rowBytes,
    height,
    step: Math.max(1, (bits * CHANNELS[colour]!) / 8),
  });
  const rgb = new Uint8Array(3 * width * height);
  const sample = (row: number, at: number): number => {
    if (bits === 8) return rows[row * rowBytes + at]!;
    const perByte = 8 / bits;
    const byte = rows[row * rowBytes + Math.floor(at / perByte)]!;
    return (byte >> (8 - bits * ((at % perByte) + 1))) & ((1 << bits) - 1);
  };
  const pixel = pixelOf({ colour, palette, alphas, full: (1 << bits) - 1 });
  for (let y = 0; y < height; y++) {
    for (let x = 0; x < width; x++) {
      const [r, g, b, a] = pixel((channel) => sample(y, x * CHANNELS[colour]! + channel));
      const at = 3 * (y * width + x);
      const onWhite = (value: number): number => Math.round((value * a + 255 * (255 - a)) / 255);
      rgb[at] = onWhite(r);
      rgb[at + 1] = onWhite(g);
      rgb[at + 2] = onWhite(b);
    }
  }
  return { width, height, rgb };
}

type Rgba = readonly [number, number, number, number];

interface Colours {
  colour: number;
  palette: Uint8Array;
  alphas: Uint8Array;
  full: number;
}

function pixelOf({ colour, palette, alphas, full }: Colours): (sample: (channel: number) => number) => Rgba {
  const scaled = (value: number): number => Math.round((255 * value) / full);
  switch (colour) {
    case 0:
      return (sample) => [scaled(sample(0)), scaled(sample(0)), scaled(sample(0)), 255];
    case 2:
      return (sample) => [sample(0), sample(1), sample(2), 255];
    case 4:
      return (sample) => [sample(0), sample(0), sample(0), sample(1)];
    case 6:
      return (sample) => [sample(0), sample(1), sample(2), sample(3)];
    default:
      return (sample) => {
        const index = sample(0);
        if (3 * index + 2 >= palette.length)
          throw logoProblem('unreadable', 'a whole PNG', 'a colour beyond its palette');
        return [palette[3 * index]!, palette[3 * index + 1]!, palette[3 * index + 2]!, alphas[index] ?? 255];
      };
  }
}

function readChunks(bytes: Uint8Array): { head: Head; palette: Uint8Array; alphas: Uint8Array; data: Uint8Array } {
  const parts: { [kind: string]: Uint8Array[] } = Object.create(null);
  let head: Head | null = null;
  for (const { kind, body } of chunks(bytes)) {
    if (kind === 'IHDR') head = readHead(body);
    parts[kind] ??= [];
    parts[kind].push(body);
  }
  if (head === null || parts.IDAT === undefined) throw damaged();
  const alphas = head.colour === 3 ? parts.tRNS?.[0] : undefined;
  return {
    head,
    palette: parts.PLTE?.[0] ?? new Uint8Array(),
    alphas: alphas ?? new Uint8Array(),
    data: Buffer.concat(parts.IDAT),
  };
}

function* chunks(bytes: Uint8Array): Generator<{ kind: string; body: Uint8Array }> {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  for (let at = SIGNATURE.length; at + 12 <= bytes.length; ) {
    const length = view.getUint32(at);
    if (at + 12 + length > bytes.length) throw damaged();
    const kind = String.fromCharCode(...bytes.subarray(at + 4, at + 8));
    if (kind === 'IEND') return;
    yield { kind, body: bytes.subarray(at + 8, at + 8 + length) };
    at += 12 + length;
  }
  throw damaged();
}

function damaged() {
  return logoProblem('unreadable', 'a whole PNG', 'a damaged one');
}

function readHead(body: Uint8Array): Head {
  if (body.length !== 13) throw damaged();
  const view = new DataView(body.buffer, body.byteOffset, body.byteLength);
  const head = { width: view.getUint32(0), height: view.getUint32(4), bits: body[8]!, colour: body[9]! };
  needPixels(head);
  const isKnown = CHANNELS[head.colour] !== undefined && [1, 2, 4, 8].includes(head.bits);
  const isWhole = head.bits === 8 || head.colour === 0 || head.colour === 3;
  if (!isKnown || !isWhole) throw logoProblem('not-supported-yet', 'at most 8 bits a sample', 'another depth');
  if (body[12] !== 0) throw logoProblem('not-supported-yet', 'a PNG that is not interlaced', 'an interlaced one');
  return head;
}

/**
 * Refuses a picture of no or too many pixels, by what it says of itself.
 * @param size width and height [pixels]
 * @throws InputProblem naming both
 */
export function needPixels({ width, height }: { width: number; height: number }): void {
  const pixels = width * height;
  if (pixels > 0 && pixels <= MOST_LOGO_PIXELS) return;
  throw logoProblem('too-large', `1 to ${MOST_LOGO_PIXELS} pixels`, `${width} × ${height}`);
}

function inflated(data: Uint8Array, size: number): Uint8Array {
  let whole: Uint8Array;
  try {
    whole = inflateSync(data, { maxOutputLength: size });
  } catch (error) {
    const isMore = error instanceof Error && 'code' in error && error.code === 'ERR_BUFFER_TOO_LARGE';
    throw isMore ? logoProblem('too-large', `${size} bytes of pixels, as its size says`, 'more') : damaged();
  }
  if (whole.length !== size) throw logoProblem('unreadable', `${size} bytes of pixels`, `${whole.length}`);
  return whole;
}

/** Rows after the filters of PNG (ISO/IEC 15948, clause 9) are taken back. */
function unfiltered(
  data: Uint8Array,
  { rowBytes, height, step }: { rowBytes: number; height: number; step: number },
): Uint8Array {
  const rows = new Uint8Array(rowBytes * height);
  for (let row = 0; row < height; row++) {
    const filter = data[row * (rowBytes + 1)]!;
    if (filter > 4) throw logoProblem('unreadable', 'a whole PNG', 'an unknown filter');
    for (let at = 0; at < rowBytes; at++) {
      const here = row * rowBytes + at;
      const left = at < step ? 0 : rows[here - step]!;
      const up = row === 0 ? 0 : rows[here - rowBytes]!;
      const corner = at < step || row === 0 ? 0 : rows[here - rowBytes - step]!;
      const guess = [0, left, up, (left + up) >> 1, paeth(left, up, corner)][filter]!;
      rows[here] = (data[row * (rowBytes + 1) + 1 + at]! + guess) & 255;
    }
  }
  return rows;
}

function paeth(left: number, up: number, corner: number): number {
  const guess = left + up - corner;
  const [a, b, c] = [Math.abs(guess - left), Math.abs(guess - up), Math.abs(guess - corner)];
  if (a <= b && a <= c) return left;
  return b <= c ? up : corner;
}
