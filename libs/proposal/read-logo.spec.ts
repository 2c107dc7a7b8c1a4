// Oracle: pictures put together here by the PNG specification (ISO/IEC 15948: filters of clause 9, chunks of clause 11)
// from pixels that are known, one filter and one kind of colour at a time.
import { deflateSync } from 'node:zlib';
import { describe, expect, it } from 'vitest';
import { InputProblem } from '#libs/engine/index.js';
import { jpegFile, type PngParts, pngFile } from '../../test/support/made-picture.js';
import { MOST_LOGO_BYTES, MOST_LOGO_PIXELS } from './raster.js';
import { readJpeg } from './read-jpeg.js';
import { readLogo } from './read-logo.js';
import { readPng } from './read-png.js';

function problemOf(read: () => unknown): { code: string; path: string | undefined } {
  try {
    read();
  } catch (error) {
    if (error instanceof InputProblem) return { code: error.problems[0]!.code, path: error.problems[0]!.path };
    throw error;
  }
  return { code: 'none', path: undefined };
}

const WIDTH = 5;
const HEIGHT = 4;
const PIXELS = Array.from({ length: WIDTH * HEIGHT }, (_, n) => [(n * 37) % 256, (n * 91 + 5) % 256, (n * 13) % 256]);

function bytesOf(picture: Partial<PngParts>): Uint8Array {
  return pngFile({ width: WIDTH, height: HEIGHT, bits: 8, colour: 2, samples: PIXELS.flat(), ...picture });
}

describe('a PNG', () => {
  it.each([0, 1, 2, 3, 4])('is read through filter %i', (filter) => {
    expect([...readPng(bytesOf({ filter })).rgb]).toEqual(PIXELS.flat());
  });

  it('of grey, with or without transparency, of a palette and of four bits is laid on white', () => {
    const grey = PIXELS.map(([value]) => value!);
    expect([...readPng(bytesOf({ colour: 0, samples: grey })).rgb]).toEqual(grey.flatMap((v) => [v, v, v]));
    const clear = readPng(bytesOf({ colour: 6, samples: PIXELS.flatMap((pixel) => [...pixel, 0]) }));
    expect([...clear.rgb]).toEqual(PIXELS.flat().map(() => 255));
    const half = readPng(bytesOf({ colour: 4, samples: grey.flatMap((value) => [value, 51]) }));
    expect(half.rgb[0]).toBe(Math.round((grey[0]! * 51 + 255 * 204) / 255));
    const palette = [10, 20, 30, 200, 100, 50];
    const indices = PIXELS.map((_, n) => n % 2);
    const drawn = readPng(bytesOf({ colour: 3, bits: 4, samples: indices, palette }));
    expect([...drawn.rgb]).toEqual(indices.flatMap((index) => palette.slice(3 * index, 3 * index + 3)));
  });

  it('that inflates to more than it says is refused before it does', () => {
    const bomb = bytesOf({ data: deflateSync(Buffer.alloc(30_000_000)) });
    expect(bomb.length).toBeLessThan(MOST_LOGO_BYTES);
    expect(problemOf(() => readLogo(bomb))).toEqual({ code: 'too-large', path: 'logo' });
  });

  it.each([
    ['of more pixels than a logo has', bytesOf({ width: 60_000, height: 60_000 }), 'too-large'],
    ['of no pixels', bytesOf({ width: 0 }), 'too-large'],
    ['that is interlaced', bytesOf({ interlaced: true }), 'not-supported-yet'],
    ['of 16 bits', bytesOf({ bits: 16 }), 'not-supported-yet'],
    ['cut short', bytesOf({}).subarray(0, 60), 'unreadable'],
    ['with too few rows', bytesOf({ data: deflateSync(Buffer.alloc(16)) }), 'unreadable'],
    [
      'with a colour beyond its palette',
      bytesOf({ colour: 3, samples: PIXELS.map(() => 9), palette: [1, 2, 3] }),
      'unreadable',
    ],
    ['of bytes that are no picture', Buffer.from('<svg/>'), 'unknown-format'],
    ['of nothing', new Uint8Array(), 'unknown-format'],
    ['larger than a logo', Buffer.alloc(MOST_LOGO_BYTES + 1), 'too-large'],
  ])('%s is refused with the reason', (_, bytes, code) => {
    expect(problemOf(() => readLogo(bytes))).toEqual({ code, path: 'logo' });
  });

  it('goes into the paper as pixels alone', () => {
    const written = readLogo(bytesOf({ text: 'where it was made' }));
    expect(written.bytes.includes('where it was made')).toBe(false);
    expect([...readPng(written.bytes).rgb]).toEqual(PIXELS.flat());
  });
});

describe('a JPEG', () => {
  it('keeps its size and scans, and loses what was written beside the picture', () => {
    const file = jpegFile({ width: 120, height: 40, comment: 'taken at the works' });
    expect(file.includes('taken at the works')).toBe(true);
    const { width, height, bytes } = readJpeg(file);
    expect([width, height]).toEqual([120, 40]);
    expect(Buffer.from(bytes).includes('taken at the works')).toBe(false);
    expect([...bytes.subarray(-4)]).toEqual([...file.subarray(-4)]);
  });

  it.each([
    ['of more pixels than a logo has', jpegFile({ width: 40_000, height: MOST_LOGO_PIXELS / 40_000 + 1 }), 'too-large'],
    ['of four colours', jpegFile({ samples: 4 }), 'not-supported-yet'],
    ['without its end', jpegFile({}).subarray(0, -2), 'unreadable'],
    ['without a frame', jpegFile({ frame: false }), 'unreadable'],
  ])('%s is refused with the reason', (_, bytes, code) => {
    expect(problemOf(() => readLogo(bytes))).toEqual({ code, path: 'logo' });
  });
});
