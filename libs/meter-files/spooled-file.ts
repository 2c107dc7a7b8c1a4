import { randomUUID } from 'node:crypto';
import { type FileHandle, open, unlink } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { InputProblem } from '#libs/engine/index.js';
import type { MeterBytes } from './meter-bytes.js';

/** A larger file of these formats is no meter file [bytes]. */
export const MOST_SPOOLED_BYTES = 536_870_912;
/** So much is kept in memory; what is larger goes to a temporary file [bytes]. */
const IN_MEMORY_BYTES = 8_388_608;
const READ_BYTES = 262_144;

/**
 * A file kept to be read from any place, for formats whose directory stands at the end. The temporary file has no name
 * once it is open, so that nothing is left of it however the process ends.
 */
export class SpooledFile {
  readonly sizeBytes: number;
  readonly #memory: Uint8Array | null;
  readonly #handle: FileHandle | null;

  private constructor(sizeBytes: number, memory: Uint8Array | null, handle: FileHandle | null) {
    this.sizeBytes = sizeBytes;
    this.#memory = memory;
    this.#handle = handle;
  }

  /**
   * Takes a source to its end.
   * @param source the file
   * @returns the file, to be closed
   * @throws InputProblem where it is larger than any such file
   */
  static async from(source: MeterBytes): Promise<SpooledFile> {
    const parts: Uint8Array[] = [];
    let handle: FileHandle | null = null;
    let sizeBytes = 0;
    try {
      for (let chunk = await source.next(); chunk !== null; chunk = await source.next()) {
        refuseBeyond(sizeBytes + chunk.length);
        if (handle === null && sizeBytes + chunk.length > IN_MEMORY_BYTES) {
          handle = await openTemporary();
          for (const part of parts.splice(0)) await handle.appendFile(part);
        }
        if (handle === null) parts.push(new Uint8Array(chunk));
        else await handle.appendFile(chunk);
        sizeBytes += chunk.length;
      }
    } catch (error) {
      await handle?.close();
      throw error;
    }
    return new SpooledFile(sizeBytes, handle === null ? Buffer.concat(parts) : null, handle);
  }

  /**
   * Bytes from a place on; fewer where the file ends before.
   * @param position first byte
   * @param length how many
   */
  async read(position: number, length: number): Promise<Uint8Array> {
    const from = Math.max(0, position);
    const size = Math.max(0, Math.min(length, this.sizeBytes - from));
    if (this.#memory !== null) return this.#memory.subarray(from, from + size);
    const bytes = new Uint8Array(size);
    let at = 0;
    while (at < size) {
      const { bytesRead } = await this.#handle!.read(bytes, at, size - at, from + at);
      if (bytesRead === 0) break;
      at += bytesRead;
    }
    return bytes.subarray(0, at);
  }

  /**
   * A part of the file in chunks.
   * @param position first byte
   * @param length how many
   */
  async *chunks(position: number, length: number): AsyncGenerator<Uint8Array> {
    const end = Math.min(position + length, this.sizeBytes);
    for (let at = position; at < end; at += READ_BYTES) yield await this.read(at, Math.min(READ_BYTES, end - at));
  }

  /** Lets go of the temporary file. */
  async close(): Promise<void> {
    await this.#handle?.close();
  }
}

async function openTemporary(): Promise<FileHandle> {
  const path = join(tmpdir(), `varwright-${randomUUID()}`);
  const handle = await open(path, 'wx+', 0o600);
  await unlink(path);
  return handle;
}

function refuseBeyond(sizeBytes: number): void {
  if (sizeBytes <= MOST_SPOOLED_BYTES) return;
  const expected = `a file of at most ${MOST_SPOOLED_BYTES} bytes`;
  throw new InputProblem([{ code: 'too-large', expected, found: 'a larger one' }]);
}
