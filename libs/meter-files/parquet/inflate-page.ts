import { brotliDecompressSync, gunzipSync } from 'node:zlib';
import { PageError } from './page-error.js';
import { snappyInflated } from './snappy.js';

/** Codecs of the format that are read; the others are refused by name. */
export const CODECS: readonly string[] = ['UNCOMPRESSED', 'SNAPPY', 'GZIP', 'BROTLI'];

/**
 * The content of a page.
 * @param packed as it stands in the file
 * @param codec one of those that are read
 * @param bytes size that the header states
 * @throws PageError where it is damaged or of another size
 */
export function inflatePage(packed: Uint8Array, codec: string, bytes: number): Uint8Array {
  const content = contentOf(packed, codec, bytes);
  if (content.length === bytes) return content;
  throw new PageError(`a page of ${content.length} bytes instead of ${bytes}`);
}

function contentOf(packed: Uint8Array, codec: string, bytes: number): Uint8Array {
  if (codec === 'UNCOMPRESSED') return packed;
  if (codec === 'SNAPPY') return snappyInflated(packed, bytes);
  try {
    const limit = { maxOutputLength: Math.max(1, bytes) };
    return codec === 'GZIP' ? gunzipSync(packed, limit) : brotliDecompressSync(packed, limit);
  } catch {
    throw new PageError(`a page that is no ${codec}, or larger than ${bytes} bytes`);
  }
}
