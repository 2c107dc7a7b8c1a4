import { describe, expect, it } from 'vitest';
import { chance } from '../../../test/support/chance.js';
import { runs, SEED } from '../../../test/support/soak.js';
import { LeastSwitchings, leastMoves } from './least-moves.js';

const moves = (low: number[], high: number[]) =>
  leastMoves(Float64Array.from(low), Float64Array.from(high), 0, low.length);

describe('the least moves between two columns', () => {
  it.each([
    ['nothing, where one value suits all', [0, 1, 2], [5, 3, 4], []],
    ['one rise from the lowest upper end', [0, 6], [4, 9], [2]],
    ['a rise and a fall', [0, 6, 0], [4, 9, 1], [2, 5]],
    ['a rise in two steps as one', [0, 6, 8], [4, 9, 9], [4]],
    ['a fall that a wide place interrupts as one', [6, 0, 0], [9, 9, 2], [4]],
  ])('are %s', (_, low, high, expected) => {
    expect(moves(low, high)).toEqual(expected);
  });

  it(`come to no more than any path moves, step by step of its stages (seed ${SEED})`, () => {
    const random = chance(SEED);
    for (let k = 0; k < runs(200, 4000); k++) {
      const stepKvar = random.oneOf([10, 25, 50]);
      const widthKvar = random.between(0, 60);
      const path: number[] = [0];
      for (let i = 1; i < 40; i++) path.push(Math.max(0, path[i - 1]! + stepKvar * random.whole(-2, 2)));
      const low = path.map((kvar) => kvar - random.between(0, widthKvar));
      const high = path.map((kvar) => kvar + random.between(0, widthKvar));
      let switchings = 0;
      for (let i = 1; i < path.length; i++) switchings += Math.abs(path[i]! - path[i - 1]!) / stepKvar;
      const least = new LeastSwitchings([moves(low, high)]);
      expect(least.after(0, stepKvar)).toBeLessThanOrEqual(switchings);
      expect(least.after(1, stepKvar)).toBe(0);
    }
  });

  it('of a load that comes and goes by less than a stage still take a switching each', () => {
    const low = Array.from({ length: 10 }, (_, i) => 30 * (i % 2));
    const high = low.map((kvar) => kvar + 20);
    expect(new LeastSwitchings([moves(low, high)]).after(0, 50)).toBe(9);
  });
});
