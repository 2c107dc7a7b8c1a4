import { InputProblem, Stopped, type Watch } from '#libs/engine/index.js';

/** Enough to recognise a format by. */
const HEAD_BYTES = 65_536;

export type Encoding = 'utf-8' | 'utf-16le' | 'utf-16be';

/**
 * The bytes of a meter file with the first of them looked at ahead.
 * What comes out agrees with ASCII byte by byte: UTF-16 is turned into UTF-8, other codes pass as they are.
 */
export class MeterBytes {
  /** the first bytes, at most 64 KiB, without a byte order mark */
  readonly head: Uint8Array;
  readonly encoding: Encoding;
  readonly #progress: Progress;
  readonly #chunks: AsyncGenerator<Uint8Array>;
  readonly #raw: AsyncGenerator<Uint8Array>;

  private constructor(
    head: Uint8Array,
    encoding: Encoding,
    source: { chunks: AsyncGenerator<Uint8Array>; raw: AsyncGenerator<Uint8Array>; progress: Progress },
  ) {
    this.head = head.subarray(0, HEAD_BYTES);
    this.encoding = encoding;
    this.#chunks = source.chunks;
    this.#raw = source.raw;
    this.#progress = source.progress;
  }

  /**
   * Reads the first bytes of a source.
   * @param source the file in chunks of any size
   * @param options watch and size, for progress and stopping
   * @returns the source with its head
   */
  static async open(
    source: AsyncIterable<Uint8Array>,
    options: { watch?: Watch; sizeBytes?: number } = {},
  ): Promise<MeterBytes> {
    const progress: Progress = { share: null, watch: options.watch };
    const raw = watched(source, progress, options.sizeBytes);
    const start = await firstOf(raw);
    const encoding = isBinary(start) ? 'utf-8' : encodingOf(start);
    if (encoding === 'utf-8') {
      const head = withoutMark(start);
      return new MeterBytes(head, encoding, { chunks: again(head, raw), raw, progress });
    }
    const decoded = decodedChunks(again(start, raw), encoding);
    const head = (await decoded.next()).value ?? new Uint8Array(0);
    return new MeterBytes(head, encoding, { chunks: again(head, decoded), raw, progress });
  }

  /**
   * Says that most of the work comes after the last byte, so that the progress of reading them stops short of the end.
   * @param share of the whole work, 0 … 1
   */
  isShareOfWork(share: number): void {
    this.#progress.share = share;
  }

  /**
   * The next chunk; it may be overwritten by whoever made it once the one after it is asked for.
   * @returns bytes, or null at the end of the file
   */
  async next(): Promise<Uint8Array | null> {
    this.#progress.share ??= 1;
    const step = await this.#chunks.next();
    if (!step.done) return step.value;
    this.#progress.watch?.report(this.#progress.share);
    return null;
  }

  /** Lets the source close what it holds, where reading ends before its end. */
  async close(): Promise<void> {
    await this.#chunks.return(undefined);
    // Chunks that were never asked for have not begun, so that their end does not reach the source.
    await this.#raw.return(undefined);
  }
}

/** Who hears of the progress, and the share of the work that reading the bytes is, once the format is known. */
interface Progress {
  share: number | null;
  watch: Watch | undefined;
}

async function* watched(
  source: AsyncIterable<Uint8Array>,
  progress: Progress,
  sizeBytes: number | undefined,
): AsyncGenerator<Uint8Array> {
  const { watch } = progress;
  let readBytes = 0;
  for await (const chunk of source) {
    if (watch?.stopped()) throw new Stopped('the reading was stopped');
    yield chunk;
    readBytes += chunk.length;
    if (sizeBytes && progress.share !== null) watch?.report(progress.share * Math.min(1, readBytes / sizeBytes));
  }
}

async function firstOf(raw: AsyncGenerator<Uint8Array>): Promise<Uint8Array> {
  const chunks: Uint8Array[] = [];
  let size = 0;
  while (size < HEAD_BYTES) {
    const step = await raw.next();
    if (step.done) break;
    // a copy: `slice` of a Buffer would share its memory
    chunks.push(new Uint8Array(step.value));
    size += step.value.length;
  }
  const all = new Uint8Array(size);
  let at = 0;
  for (const chunk of chunks) {
    all.set(chunk, at);
    at += chunk.length;
  }
  return all;
}

/** First bytes of ZIP archives, compound files and Parquet: none of them is text, whatever their zeros look like. */
const BINARY_STARTS = [
  [0x50, 0x4b, 0x03, 0x04],
  [0xd0, 0xcf, 0x11, 0xe0],
  [0x50, 0x41, 0x52, 0x31],
  [0x50, 0x41, 0x52, 0x45],
];

function isBinary(head: Uint8Array): boolean {
  return BINARY_STARTS.some((start) => start.every((byte, index) => head[index] === byte));
}

/** A byte order mark says it; without one, ASCII text in UTF-16 has a NUL in every other byte. */
function encodingOf(head: Uint8Array): Encoding {
  if (head[0] === 0xff && head[1] === 0xfe) return 'utf-16le';
  if (head[0] === 0xfe && head[1] === 0xff) return 'utf-16be';
  const look = Math.min(head.length - (head.length % 2), 512);
  let even = 0;
  let odd = 0;
  for (let i = 0; i < look; i += 2) {
    if (head[i] === 0) even++;
    if (head[i + 1] === 0) odd++;
  }
  if (odd > 0.4 * look && even === 0) return 'utf-16le';
  if (even > 0.4 * look && odd === 0) return 'utf-16be';
  return 'utf-8';
}

function withoutMark(head: Uint8Array): Uint8Array {
  return head[0] === 0xef && head[1] === 0xbb && head[2] === 0xbf ? head.subarray(3) : head;
}

async function* decodedChunks(raw: AsyncGenerator<Uint8Array>, encoding: Encoding): AsyncGenerator<Uint8Array> {
  const decoder = new TextDecoder(encoding, { fatal: true });
  const encoder = new TextEncoder();
  // where the text of the chunks before ends
  const place = { row: 1, column: 1 };
  const taken = (chunk: Uint8Array | null): string => {
    try {
      return chunk === null ? decoder.decode() : decoder.decode(chunk, { stream: true });
    } catch {
      movePast(soundText(chunk, encoding), place);
      const problem = {
        code: 'unreadable',
        ...place,
        expected: 'text in UTF-16',
        found: 'bytes that are none',
      } as const;
      throw new InputProblem([problem]);
    }
  };
  for await (const chunk of raw) {
    const text = taken(chunk);
    movePast(text, place);
    const bytes = encoder.encode(text);
    if (bytes.length > 0) yield bytes;
  }
  taken(null);
}

function movePast(text: string, place: { row: number; column: number }): void {
  let from = 0;
  for (let at = text.indexOf('\n'); at >= 0; at = text.indexOf('\n', from)) {
    place.row++;
    place.column = 1;
    from = at + 1;
  }
  place.column += text.length - from;
}

/**
 * The text of a chunk before its first bytes that are none of an encoding.
 * @param bytes the chunk; null where the file ends within a letter
 * @param encoding a label that `TextDecoder` knows
 */
export function soundText(bytes: Uint8Array | null, encoding: string): string {
  if (bytes === null) return '';
  const [sound = ''] = new TextDecoder(encoding).decode(bytes).split('\ufffd', 1);
  return sound;
}

async function* again(head: Uint8Array, rest: AsyncGenerator<Uint8Array>): AsyncGenerator<Uint8Array> {
  try {
    if (head.length > 0) yield head;
    yield* rest;
  } finally {
    await rest.return(undefined);
  }
}
