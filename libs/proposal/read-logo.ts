import { deflateSync } from 'node:zlib';
import { logoProblem, MOST_LOGO_BYTES, type Raster } from './raster.js';
import { isJpeg, readJpeg } from './read-jpeg.js';
import { isPng, readPng } from './read-png.js';

/** A logo fit to be set into a paper. */
export interface Logo {
  width: number;
  height: number;
  /** a picture file written here, or a JPEG's own scans */
  bytes: Buffer;
}

/**
 * Reads a site's logo: what is drawn is decoded and written anew, what is no picture is left out.
 * @param bytes a PNG or JPEG file
 * @returns the logo
 * @throws InputProblem at the path `logo` where it is too large, damaged or something else
 */
export function readLogo(bytes: Uint8Array): Logo {
  if (bytes.length > MOST_LOGO_BYTES) {
    throw logoProblem('too-large', `a file of at most ${MOST_LOGO_BYTES} bytes`, `${bytes.length}`);
  }
  if (isPng(bytes)) {
    const raster = readPng(bytes);
    return { width: raster.width, height: raster.height, bytes: plainPng(raster) };
  }
  if (isJpeg(bytes)) {
    const { width, height, bytes: plain } = readJpeg(bytes);
    return { width, height, bytes: Buffer.from(plain) };
  }
  throw logoProblem('unknown-format', 'a PNG or JPEG file', bytes.length === 0 ? 'nothing' : 'something else');
}

/** A PNG of nothing but pixels, so that it is set into the paper as it stands. */
function plainPng({ width, height, rgb }: Raster): Buffer {
  const rows = Buffer.alloc(height * (1 + 3 * width));
  for (let row = 0; row < height; row++) {
    Buffer.from(rgb.buffer, rgb.byteOffset + row * 3 * width, 3 * width).copy(rows, row * (1 + 3 * width) + 1);
  }
  const head = Buffer.alloc(13);
  head.writeUInt32BE(width, 0);
  head.writeUInt32BE(height, 4);
  head.set([8, 2, 0, 0, 0], 8);
  return Buffer.concat([
    Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a]),
    chunk('IHDR', head),
    chunk('IDAT', deflateSync(rows, { level: 9 })),
    chunk('IEND', Buffer.alloc(0)),
  ]);
}

/** Its check sum is left 0: the paper takes the pixels alone. */
function chunk(kind: string, body: Buffer): Buffer {
  const whole = Buffer.alloc(12 + body.length);
  whole.writeUInt32BE(body.length, 0);
  whole.write(kind, 4, 'latin1');
  body.copy(whole, 8);
  return whole;
}
