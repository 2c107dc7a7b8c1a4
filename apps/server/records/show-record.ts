import { checkAgainstSupply, type Site } from '#libs/engine/index.js';
import { remarkInWords } from '#libs/present/remark-words.js';
import type { StoredRecord } from '#libs/store/stored-record.js';

/**
 * A load record as the API shows it.
 * @param stored the record
 * @param site as it stands now; its transformers are held against the record's peak
 */
export function showRecord(stored: StoredRecord, site: Site) {
  const { id, siteId, revision, previousId, hash, summary, quality, createdAt } = stored;
  const file = {
    name: stored.fileName,
    sha256: stored.fileHash,
    bytes: stored.fileBytes,
    header: stored.fileHeader,
  };
  const againstSupply = checkAgainstSupply(summary, site).map(remarkInWords);
  return { id, siteId, revision, previousId, hash, file, record: summary, quality, againstSupply, createdAt };
}
