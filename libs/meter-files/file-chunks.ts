import { type FileHandle, open } from 'node:fs/promises';

const CHUNK_BYTES = 262_144;

/**
 * The bytes of a file in two buffers that take turns: while one is being used the other is being filled. A chunk holds
 * until the one after it is asked for, so a file of any size takes up no more than the two.
 * @param file its path, or the file opened; it is closed at the end, and where nobody wants the rest
 * @throws Error of the system where it can't be read
 */
export async function* fileChunks(file: string | FileHandle): AsyncGenerator<Uint8Array> {
  const handle = typeof file === 'string' ? await open(file, 'r') : file;
  const read = async (into: Uint8Array) => into.subarray(0, (await handle.read(into, 0, into.length, null)).bytesRead);
  try {
    let spare: Uint8Array = new Uint8Array(CHUNK_BYTES);
    let coming = read(new Uint8Array(CHUNK_BYTES));
    for (;;) {
      const chunk = await coming;
      if (chunk.length === 0) return;
      coming = read(spare);
      // whoever is slow to ask for it must not be told of a failure as if nobody had been listening
      coming.catch(() => undefined);
      spare = new Uint8Array(chunk.buffer, 0, CHUNK_BYTES);
      yield chunk;
    }
  } finally {
    await handle.close();
  }
}
