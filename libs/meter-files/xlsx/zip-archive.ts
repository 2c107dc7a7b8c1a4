import { pipeline, Readable } from 'node:stream';
import { constants, crc32, createInflateRaw, inflateRawSync } from 'node:zlib';
import { type Entry, fromRandomAccessReaderPromise, RandomAccessReader, type ZipFile } from 'yauzl';
import { InputProblem } from '#libs/engine/index.js';
import { damaged } from '../sheet/read-sheet-text.js';
import type { SpooledFile } from '../spooled-file.js';

/** A workbook of any size has fewer parts. */
const MOST_ENTRIES = 2000;
/** Larger than the longest sheet written with every attribute there is [bytes]. */
const MOST_INFLATED_BYTES = 1_073_741_824;
/** Sheets of numbers shrink to a tenth, of zeros to a hundredth; no more than this beyond the first few MB. */
const MOST_RATIO = 250;
const RATIO_FREE_BYTES = 4_194_304;
const INFLATE_CHUNK_BYTES = 65_536;
const STORED = 0;
const DEFLATED = 8;
/** What an archive begins with: a file, the end of an empty one, or the mark of one in pieces (APPNOTE 6.3.10, 4.3 and 8.5). */
const ARCHIVE_STARTS = ['PK\u0003\u0004', 'PK\u0005\u0006', 'PK\u0007\u0008'];
const START_BYTES = 4;
/** Smaller than an empty archive is none [bytes]. */
const LEAST_ARCHIVE_BYTES = 22;
/** So much of a packed part is looked at for how it begins, more of it only where the little before said nothing [bytes]. */
const LOOKS_BYTES = [16, 64, 256, 1024];

/** The parts of a ZIP archive (APPNOTE 6.3.10, as far as ECMA-376 part 2 allows it), each bounded by what it says and by what it gives. */
export class ZipArchive {
  readonly names: readonly string[];
  readonly #zip: ZipFile;
  readonly #file: SpooledFile;
  readonly #entries: ReadonlyMap<string, Entry>;

  private constructor(file: SpooledFile, zip: ZipFile, entries: ReadonlyMap<string, Entry>) {
    this.#file = file;
    this.#zip = zip;
    this.#entries = entries;
    this.names = [...entries.values()].map(({ fileName }) => fileName);
  }

  /**
   * Reads the directory.
   * @param file the archive
   * @throws InputProblem where it is damaged, holds more than any workbook, or another archive
   */
  static async open(file: SpooledFile): Promise<ZipArchive> {
    const zip = await ofArchive('archive', () =>
      fromRandomAccessReaderPromise(new SpoolReader(file), file.sizeBytes, {
        validateEntrySizes: false,
        autoClose: false,
      }),
    );
    if (zip.entryCount > MOST_ENTRIES) refuseEntries(zip.entryCount);
    const entries = new Map<string, Entry>();
    await ofArchive('archive', async () => {
      for await (const entry of zip.eachEntry()) {
        const key = entry.fileName.toLowerCase();
        if (entries.has(key)) throw damaged(entry.fileName, 'one part of a name', 'two of the same name');
        entries.set(key, entry);
      }
    });
    const archive = new ZipArchive(file, zip, entries);
    for (const entry of entries.values()) await archive.#refuseNested(entry);
    return archive;
  }

  /** A part that is an archive itself is refused by its name, read or not: nobody sees what it holds. */
  async #refuseNested(entry: Entry): Promise<void> {
    const { fileName, compressedSize, uncompressedSize } = entry;
    if (uncompressedSize < LEAST_ARCHIVE_BYTES || entry.isEncrypted()) return;
    const { fileDataStart } = await ofArchive(fileName, () =>
      this.#zip.readLocalFileHeaderPromise(entry, { minimal: true }),
    );
    const packed = await this.#file.read(fileDataStart, Math.min(compressedSize, LOOKS_BYTES.at(-1)!));
    const start = Buffer.from(startOf(packed, entry.compressionMethod)).toString('latin1', 0, START_BYTES);
    if (ARCHIVE_STARTS.includes(start)) throw damaged(fileName, 'a part that is no archive itself', 'a nested archive');
  }

  /** Whether there is such a part, whatever the case of its letters. */
  has(name: string): boolean {
    return this.#entries.has(name.toLowerCase());
  }

  /** Size of a part in the archive [bytes]. */
  packedBytes(name: string): number {
    return this.#entries.get(name.toLowerCase())?.compressedSize ?? 0;
  }

  /**
   * A part's content.
   * @param name of the part
   * @param onRead hears how many packed bytes have been read
   * @throws InputProblem where the part is missing, damaged, or not what the directory says of it
   */
  async *part(name: string, onRead: (bytes: number) => void = () => {}): AsyncGenerator<Uint8Array> {
    const entry = this.#entries.get(name.toLowerCase());
    if (entry === undefined) throw damaged(name, 'a part of the workbook', 'none of this name');
    refuseEntry(entry);
    const { fileDataStart } = await ofArchive(name, () =>
      this.#zip.readLocalFileHeaderPromise(entry, { minimal: true }),
    );
    const raw = counted(this.#file.chunks(fileDataStart, entry.compressedSize), onRead);
    const content = entry.compressionMethod === STORED ? raw : inflated(raw);
    let seenBytes = 0;
    let sum = 0;
    try {
      for await (const chunk of content) {
        seenBytes += chunk.length;
        if (seenBytes > entry.uncompressedSize) refuseLie(entry, `more than ${entry.uncompressedSize}`);
        sum = crc32(chunk, sum);
        yield chunk;
      }
    } catch (error) {
      throw isZlibError(error) ? damaged(name, 'a part that can be inflated', 'damaged or cut off data') : error;
    }
    if (seenBytes !== entry.uncompressedSize) refuseLie(entry, String(seenBytes));
    if (sum !== entry.crc32) throw damaged(name, 'a part with the check sum of the directory', 'another one');
  }
}

/** The first bytes of a part; none where they can't be told, which is said once the part is read. */
function startOf(packed: Uint8Array, method: number): Uint8Array {
  if (method === STORED) return packed;
  if (method !== DEFLATED) return new Uint8Array(0);
  let start: Uint8Array = new Uint8Array(0);
  for (const bytes of LOOKS_BYTES) {
    if (start.length >= START_BYTES) break;
    try {
      start = inflateRawSync(packed.subarray(0, bytes), { finishFlush: constants.Z_SYNC_FLUSH });
    } catch {
      break;
    }
  }
  return start;
}

function refuseEntry(entry: Entry): void {
  const { fileName, compressedSize, uncompressedSize, compressionMethod } = entry;
  if (entry.isEncrypted()) throw damaged(fileName, 'a part without a password', 'an encrypted one');
  if (compressionMethod !== STORED && compressionMethod !== DEFLATED) {
    throw damaged(fileName, 'a part that is stored or deflated', `compression method ${compressionMethod}`);
  }
  if (uncompressedSize > MOST_INFLATED_BYTES) {
    const expected = `at most ${MOST_INFLATED_BYTES} bytes in a part`;
    throw new InputProblem([{ code: 'too-large', path: fileName, expected, found: `${uncompressedSize}` }]);
  }
  if (uncompressedSize > RATIO_FREE_BYTES && uncompressedSize > MOST_RATIO * compressedSize) {
    const expected = `a part at most ${MOST_RATIO} times as large as it is packed`;
    const found = `${uncompressedSize} bytes out of ${compressedSize}`;
    throw new InputProblem([{ code: 'too-large', path: fileName, expected, found }]);
  }
}

function refuseLie({ fileName, uncompressedSize }: Entry, found: string): never {
  throw damaged(fileName, `a part of ${uncompressedSize} bytes, as the directory says`, `${found} bytes`);
}

function refuseEntries(count: number): never {
  const expected = `at most ${MOST_ENTRIES} parts in a workbook`;
  throw new InputProblem([{ code: 'too-large', expected, found: String(count) }]);
}

async function* counted(chunks: AsyncGenerator<Uint8Array>, onRead: (bytes: number) => void) {
  let bytes = 0;
  for await (const chunk of chunks) {
    yield chunk;
    bytes += chunk.length;
    onRead(bytes);
  }
}

function inflated(raw: AsyncGenerator<Uint8Array>): AsyncIterable<Uint8Array> {
  const inflate = createInflateRaw({ chunkSize: INFLATE_CHUNK_BYTES });
  // a failure reaches whoever reads; nobody listens here
  pipeline(Readable.from(raw, { objectMode: false, highWaterMark: INFLATE_CHUNK_BYTES }), inflate, () => {});
  return inflate;
}

function isZlibError(error: unknown): boolean {
  const code = error instanceof Error ? (error as NodeJS.ErrnoException).code : undefined;
  return code !== undefined && (code.startsWith('Z_') || code === 'ERR_STREAM_PREMATURE_CLOSE');
}

/** What the ZIP package says of an archive is said of the file. */
async function ofArchive<T>(path: string, work: () => Promise<T>): Promise<T> {
  try {
    return await work();
  } catch (error) {
    if (error instanceof InputProblem) throw error;
    throw damaged(path, 'a whole ZIP archive, as every .xlsx file is one', 'one that is cut off or damaged');
  }
}

/** Lets the ZIP package read the spooled file. */
class SpoolReader extends RandomAccessReader {
  readonly #file: SpooledFile;

  constructor(file: SpooledFile) {
    super();
    this.#file = file;
  }

  // biome-ignore lint/complexity/useMaxParams: the package's own signature
  override read(
    buffer: Buffer,
    offset: number,
    length: number,
    position: number,
    callback: (error: Error | null) => void,
  ): void {
    this.#file.read(position, length).then(
      (bytes) => {
        buffer.set(bytes, offset);
        callback(bytes.length < length ? new Error('the end of the file') : null);
      },
      (error: Error) => callback(error),
    );
  }
}
