// Second method: the least of each window, looked through entry by entry.
import { describe, expect, it } from 'vitest';
import { chance } from '../../../test/support/chance.js';
import { runs, SEED } from '../../../test/support/soak.js';
import { leastOfLast } from './least-of-last.js';

describe(`the least of an entry and of those before it (seed ${SEED})`, () => {
  it('is that of the window', () => {
    const random = chance(SEED);
    for (let k = 0; k < runs(20, 200); k++) {
      const column = Float64Array.from({ length: random.whole(1, random.oneOf([40, 5000])) }, () =>
        random.whole(-9, 9),
      );
      const before = random.whole(0, 45);
      const wanted = Array.from(column, (_, i) => Math.min(...column.subarray(Math.max(i - before, 0), i + 1)));
      expect(Array.from(leastOfLast(column, before))).toEqual(wanted);
    }
  });

  it('is written into the column that is given, whatever it held', () => {
    const least = Float64Array.of(-5, -5, -5);
    expect(leastOfLast(Float64Array.of(3, 1, 2), 1, least)).toBe(least);
    expect([...least]).toEqual([3, 1, 1]);
  });
});
