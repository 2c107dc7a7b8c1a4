import { createHash } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import { CHAIN_START, type ChainEntry, chainFaults, nextEntry, type Sha256 } from './audit-chain.js';

const sha256: Sha256 = (content) => createHash('sha256').update(content).digest('hex');

function chainOf(length: number): ChainEntry[] {
  const entries: ChainEntry[] = [];
  for (let i = 1; i <= length; i++)
    entries.push(nextEntry(entries.at(-1) ?? CHAIN_START, { act: 'comment', i }, sha256));
  return entries;
}

describe('a chained log', () => {
  it('is whole as it was written', () => {
    expect(chainFaults(chainOf(20), sha256)).toEqual([]);
    expect(chainFaults([], sha256)).toEqual([]);
  });

  it('spells equal content equally, whatever the order of its keys', () => {
    expect(nextEntry(CHAIN_START, { b: 1, a: 2 }, sha256)).toEqual(nextEntry(CHAIN_START, { a: 2, b: 1 }, sha256));
  });

  it('has hashes anybody can work out: SHA-256 over number, hash before and content on lines of their own', () => {
    const [first] = chainOf(1);
    expect(first!.hash).toBe(sha256(`1\n${'0'.repeat(64)}\n{"act":"comment","i":1}`));
  });

  const changes: [what: string, change: (entries: ChainEntry[]) => ChainEntry[]][] = [
    ['without its first entry', (entries) => entries.slice(1)],
    ['without an entry in the middle', (entries) => entries.filter((_, at) => at !== 3)],
    ['with two entries in each other’s place', ([a, b, ...rest]) => [b!, a!, ...rest]],
    ['with an entry twice', ([a, ...rest]) => [a!, a!, ...rest]],
    [
      'with an entry that was written anew, hash and all',
      (entries) => entries.with(4, nextEntry(entries[3]!, { act: 'approve' }, sha256)),
    ],
  ];

  it.each(changes)('%s is found out', (_what, change) => {
    expect(chainFaults(change(chainOf(8)), sha256)).not.toEqual([]);
  });

  it('is found out at the entry where it was altered', () => {
    const entries = chainOf(8);
    const altered = entries.with(5, { ...entries[5]!, content: entries[5]!.content.replace('comment', 'commend') });
    expect(chainFaults(altered, sha256)).toEqual([{ sequence: 6, fault: 'content' }]);
  });
});
