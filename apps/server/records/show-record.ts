import type { StoredRecord } from '#libs/store/stored-record.js';

/** A load record as the API shows it. */
export function showRecord(stored: StoredRecord) {
  const { id, siteId, hash, summary, quality, createdAt } = stored;
  const file = { name: stored.fileName, sha256: stored.fileHash, bytes: stored.fileBytes };
  return { id, siteId, hash, file, record: summary, quality, createdAt };
}
