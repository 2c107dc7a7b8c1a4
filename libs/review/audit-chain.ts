import { canonicalJson } from '#libs/contract/canonical-json.js';

/** SHA-256 of a text in UTF-8 or of bytes, as 64 hexadecimal digits; the rims have one, this folder has none. */
export type Sha256 = (content: string | Uint8Array) => string;

/** One line of the log: its hash covers its place, the hash before it and its content. */
export interface ChainEntry {
  /** counts the entries from 1 */
  sequence: number;
  /** canonical JSON */
  content: string;
  /** 64 hexadecimal digits; of the first entry all 0 */
  previousHash: string;
  hash: string;
}

/** What stands before the first entry. */
export const CHAIN_START: Pick<ChainEntry, 'sequence' | 'hash'> = { sequence: 0, hash: '0'.repeat(64) };

/**
 * The next entry of a chain.
 * @param last sequence and hash of the entry before it, or `CHAIN_START`
 * @param content what it says, as plain data
 * @param sha256 of the rim
 */
export function nextEntry(last: Pick<ChainEntry, 'sequence' | 'hash'>, content: unknown, sha256: Sha256): ChainEntry {
  const entry = { sequence: last.sequence + 1, content: canonicalJson(content), previousHash: last.hash };
  return { ...entry, hash: hashOf(entry, sha256) };
}

/** What is wrong with an entry of a chain. */
export interface ChainFault {
  sequence: number;
  /** `order`: an entry is missing or out of place; `link`: it names another entry before it; `content`: it was altered */
  fault: 'order' | 'link' | 'content';
}

/**
 * Everything that does not hold in a chain.
 * @param entries in the order of their sequence
 * @param sha256 of the rim
 * @returns a fault for each entry that does not hold; none where the chain is whole
 */
export function chainFaults(entries: Iterable<ChainEntry>, sha256: Sha256): ChainFault[] {
  const faults: ChainFault[] = [];
  let last: Pick<ChainEntry, 'sequence' | 'hash'> = CHAIN_START;
  for (const entry of entries) {
    const { sequence } = entry;
    if (sequence !== last.sequence + 1) faults.push({ sequence, fault: 'order' });
    if (entry.previousHash !== last.hash) faults.push({ sequence, fault: 'link' });
    if (entry.hash !== hashOf(entry, sha256)) faults.push({ sequence, fault: 'content' });
    last = entry;
  }
  return faults;
}

function hashOf({ sequence, content, previousHash }: Omit<ChainEntry, 'hash'>, sha256: Sha256): string {
  return sha256(`${sequence}\n${previousHash}\n${content}`);
}
