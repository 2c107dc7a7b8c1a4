import { deflateSync } from 'node:zlib';

/** A PNG to be put together; `data` stands for its rows where given. */
export interface PngParts {
  width: number;
  height: number;
  bits: number;
  colour: number;
  samples: readonly number[];
  filter?: number;
  palette?: readonly number[];
  interlaced?: boolean;
  data?: Uint8Array;
  text?: string;
}

const CHANNELS: Record<number, number> = { 0: 1, 2: 3, 3: 1, 4: 2, 6: 4 };

/** A PNG of known samples, every row through one filter; invented. */
export function pngFile(parts: PngParts): Buffer {
  const { width, height, bits, colour, palette, interlaced, data, text } = parts;
  const head = Buffer.alloc(13);
  head.writeUInt32BE(width, 0);
  head.writeUInt32BE(height, 4);
  head.set([bits, colour, 0, 0, interlaced === true ? 1 : 0], 8);
  return Buffer.concat([
    Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a]),
    chunk('IHDR', head),
    ...(text === undefined ? [] : [chunk('tEXt', Buffer.from(`Comment\0${text}`))]),
    ...(palette === undefined ? [] : [chunk('PLTE', Buffer.from(palette))]),
    chunk('IDAT', data ?? deflateSync(filteredRows(parts))),
    chunk('IEND', Buffer.alloc(0)),
  ]);
}

function filteredRows({ width, height, bits, colour, samples, filter = 0 }: PngParts): Buffer {
  const perRow = width * CHANNELS[colour]!;
  if (bits > 8 || width > 1000) return Buffer.alloc(1);
  const rowBytes = Math.ceil((perRow * bits) / 8);
  const step = Math.max(1, (CHANNELS[colour]! * bits) / 8);
  const rows = Array.from({ length: height }, (_, y) =>
    packed(samples.slice(y * perRow, (y + 1) * perRow), bits, rowBytes),
  );
  return Buffer.concat(
    rows.map((row, y) => {
      const up = rows[y - 1] ?? Buffer.alloc(rowBytes);
      const out = row.map((value, at) => {
        const [a, b, c] = [row[at - step] ?? 0, up[at]!, up[at - step] ?? 0];
        const order = [a, b, c].sort((p, q) => Math.abs(a + b - c - p) - Math.abs(a + b - c - q));
        return (value - [0, a, b, Math.floor((a + b) / 2), order[0]!][filter]!) & 255;
      });
      return Buffer.concat([Buffer.from([filter]), out]);
    }),
  );
}

function packed(samples: readonly number[], bits: number, rowBytes: number): Buffer {
  const row = Buffer.alloc(rowBytes);
  samples.forEach((sample, at) => {
    const bit = at * bits;
    row[bit >> 3]! |= sample << (8 - bits - (bit % 8));
  });
  return row;
}

function chunk(kind: string, body: Uint8Array): Buffer {
  const head = Buffer.alloc(8);
  head.writeUInt32BE(body.length, 0);
  head.write(kind, 4, 'latin1');
  return Buffer.concat([head, body, Buffer.alloc(4)]);
}

/** The segments of a JPEG around made-up scans: enough for whatever reads sizes and no pixels. */
export function jpegFile({ width = 8, height = 8, samples = 3, frame = true, comment = 'none' }): Buffer {
  const segment = (marker: number, body: Uint8Array) => {
    const head = Buffer.from([0xff, marker, 0, 0]);
    head.writeUInt16BE(body.length + 2, 2);
    return Buffer.concat([head, body]);
  };
  const size = Buffer.alloc(6);
  size[0] = 8;
  size.writeUInt16BE(height, 1);
  size.writeUInt16BE(width, 3);
  size[5] = samples;
  const parts = Array.from({ length: samples }, (_, at) => [at + 1, 0x11, 0]).flat();
  return Buffer.concat([
    Buffer.from([0xff, 0xd8]),
    segment(0xe1, Buffer.from(`Exif\0\0${comment}`)),
    segment(0xfe, Buffer.from(comment)),
    segment(0xdb, Buffer.alloc(65, 1)),
    ...(frame ? [segment(0xc0, Buffer.concat([size, Buffer.from(parts)]))] : []),
    segment(0xda, Buffer.from([1, 1, 0, 0, 63, 0])),
    Buffer.from([0x12, 0x34, 0xff, 0xd9]),
  ]);
}
