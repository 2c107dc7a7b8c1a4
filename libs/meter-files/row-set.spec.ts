import { describe, expect, it } from 'vitest';
import { Chance } from '../../test/support/mutate-file.js';
import { RowSet } from './row-set.js';

describe('a set of rows', () => {
  it('holds what a plain set holds, whatever is added and taken away', () => {
    const chance = new Chance(7);
    const rows = new RowSet();
    const plain = new Set<number>();
    for (let n = 0; n < 4000; n++) {
      const row = chance.below(20_000);
      const removed = chance.below(3) === 0;
      if (removed) rows.delete(row);
      else rows.add(row);
      if (removed) plain.delete(row);
      else plain.add(row);
    }
    expect(rows.size).toBe(plain.size);
    expect([...rows]).toEqual([...plain].sort((a, b) => a - b));
    expect(Array.from({ length: 25_000 }, (_, row) => rows.has(row) === plain.has(row))).not.toContain(false);
  });
});
