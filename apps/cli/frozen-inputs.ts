import { createHash } from 'node:crypto';
import type { PlanInputs } from '#libs/contract/plan-content.js';
import { recordBytes } from '#libs/contract/record-hash.js';
import { ENGINE_VERSION, type LoadRecord } from '#libs/engine/index.js';

/** Site, record and zone of a judgement. */
export type Judgement = Pick<PlanInputs, 'kind' | 'site' | 'zone'> & { record: LoadRecord | null };

/**
 * Everything a judgement depends on, the record by its hash.
 * @param judgement what is judged, by this engine
 */
export function frozenInputs({ kind, site, zone, record }: Judgement): PlanInputs {
  return { kind, site, recordHash: record === null ? null : recordHashOf(record), zone, engineVersion: ENGINE_VERSION };
}

/**
 * SHA-256 of a record.
 * @param record as it was read
 * @returns 64 hexadecimal digits
 */
export function recordHashOf(record: LoadRecord): string {
  return sha256(recordBytes(record));
}

/**
 * SHA-256 of chunks, one after the other.
 * @param chunks texts in UTF-8, or bytes
 * @returns 64 hexadecimal digits
 */
export function sha256(chunks: Iterable<string | Uint8Array>): string {
  const hash = createHash('sha256');
  for (const chunk of chunks) hash.update(chunk);
  return hash.digest('hex');
}

/** SHA-256 of one text. */
export function textHash(text: string): string {
  return sha256([text]);
}
