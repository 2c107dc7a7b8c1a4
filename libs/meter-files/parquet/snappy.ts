import { PageError } from './page-error.js';

const DAMAGED = 'a damaged Snappy stream';

/**
 * Inflates Snappy's raw format (google/snappy, format_description.txt): literals and copies of what was written before, every
 * length checked against the bytes there are, since the stream may say anything.
 * @param packed the stream
 * @param bytes size of the content
 * @throws PageError where the stream is damaged or of another size
 */
export function snappyInflated(packed: Uint8Array, bytes: number): Uint8Array {
  const content = new Uint8Array(bytes);
  let at = afterLength(packed, bytes);
  let to = 0;
  while (at < packed.length) {
    const { length, back, end } = elementAt(packed, at);
    at = end;
    if (length > bytes - to || back > to) throw new PageError(DAMAGED);
    if (back > 0) {
      // a copy may run into what it writes itself
      for (let i = to; i < to + length; i++) content[i] = content[i - back]!;
    } else {
      if (length > packed.length - at) throw new PageError(DAMAGED);
      content.set(packed.subarray(at, at + length), to);
      at += length;
    }
    to += length;
  }
  if (to !== bytes) throw new PageError(`a page of ${to} bytes instead of ${bytes}`);
  return content;
}

/** An element's length and how far back its copy begins, 0 for a literal, which stands at `end`. */
function elementAt(packed: Uint8Array, at: number): { length: number; back: number; end: number } {
  const tag = packed[at]!;
  const upper = tag >> 2;
  switch (tag & 3) {
    case 0: {
      const extra = Math.max(0, upper - 59);
      const length = 1 + (extra === 0 ? upper : littleEndian(packed, at + 1, extra));
      return { length, back: 0, end: at + 1 + extra };
    }
    case 1:
      return copied(4 + (upper & 7), (tag >> 5) * 256 + littleEndian(packed, at + 1, 1), at + 2);
    case 2:
      return copied(1 + upper, littleEndian(packed, at + 1, 2), at + 3);
    default:
      return copied(1 + upper, littleEndian(packed, at + 1, 4), at + 5);
  }
}

function copied(length: number, back: number, end: number) {
  if (back === 0) throw new PageError(DAMAGED);
  return { length, back, end };
}

/** The stream begins with the content's length, which has to be the page's. */
function afterLength(packed: Uint8Array, bytes: number): number {
  let length = 0;
  for (let at = 0; at < 5 && at < packed.length; at++) {
    length += (packed[at]! & 0x7f) * 2 ** (7 * at);
    if (packed[at]! >= 0x80) continue;
    if (length !== bytes) break;
    return at + 1;
  }
  throw new PageError(`a Snappy stream of ${length} bytes instead of ${bytes}`);
}

function littleEndian(packed: Uint8Array, at: number, count: number): number {
  let value = 0;
  for (let i = 0; i < count; i++) value += (packed[at + i] ?? 0) * 2 ** (8 * i);
  return value;
}
