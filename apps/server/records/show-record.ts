import type { StoredRecord } from '#libs/store/stored-record.js';

/** A load record as the API shows it. */
export function showRecord(stored: StoredRecord) {
  const { id, siteId, revision, previousId, hash, summary, quality, createdAt } = stored;
  const file = {
    name: stored.fileName,
    sha256: stored.fileHash,
    bytes: stored.fileBytes,
    header: stored.fileHeader,
  };
  return { id, siteId, revision, previousId, hash, file, record: summary, quality, createdAt };
}
