import { describe, expect, it } from 'vitest';
import { chance } from '../../../test/support/chance.js';
import { runs, SEED } from '../../../test/support/soak.js';
import { FreeLevels } from './free-levels.js';

const classesOf = (sizes: [kvar: number, stages: number][]) =>
  sizes.map(([kvar, stages]) => ({ kvar, stages: new Int32Array(stages) }));

function chosen(sizes: [number, number][], wantedKvar: number, connected: number[]): number[] {
  const counts = new Int32Array(sizes.length);
  FreeLevels.of({ classes: classesOf(sizes) }, 1e-9)!.chooseInto(counts, wantedKvar, Int32Array.from(connected));
  return [...counts];
}

/** Every count vector, held against the rule one after the other. */
function slowlyChosen(sizes: [number, number][], wantedKvar: number, connected: number[]): number[] {
  let vectors: number[][] = [[]];
  for (const [, stages] of sizes) {
    vectors = vectors.flatMap((vector) => Array.from({ length: stages + 1 }, (_, count) => [...vector, count]));
  }
  const level = (vector: number[]) => vector.reduce((sum, count, c) => sum + count * sizes[c]![0], 0);
  const off = (vector: number[]) => Math.abs(wantedKvar - level(vector));
  const moves = (vector: number[]) => vector.reduce((sum, count, c) => sum + Math.abs(count - connected[c]!), 0);
  const least = Math.min(...vectors.map(off));
  const order = (a: number[], b: number[]): number =>
    moves(a) - moves(b) ||
    level(a) - level(b) ||
    (a.map((count, c) => count - b[c]!).find((apart) => apart !== 0) ?? 0);
  return vectors.filter((vector) => off(vector) <= least + 1e-9).sort(order)[0]!;
}

describe('levels while every stage is free', () => {
  it.each([
    [
      'the nearest',
      [
        [50, 2],
        [25, 1],
      ],
      70,
      [0, 0],
      [1, 1],
    ],
    [
      'of one level the one with fewest switchings',
      [
        [50, 1],
        [25, 2],
      ],
      50,
      [0, 1],
      [0, 2],
    ],
    [
      'of two as near the one with fewer switchings',
      [
        [50, 2],
        [25, 1],
      ],
      62.5,
      [1, 0],
      [1, 0],
    ],
    [
      'then the lower',
      [
        [50, 1],
        [25, 1],
      ],
      37.5,
      [0, 0],
      [0, 1],
    ],
    [
      'none below 0',
      [
        [50, 1],
        [25, 1],
      ],
      -80,
      [1, 1],
      [0, 0],
    ],
    [
      'all above everything',
      [
        [50, 1],
        [25, 1],
      ],
      500,
      [0, 0],
      [1, 1],
    ],
  ] as [string, [number, number][], number, number[], number[]][])(
    'are taken: %s',
    (_, sizes, wanted, from, counts) => {
      expect(chosen(sizes, wanted, from)).toEqual(counts);
    },
  );

  it(`are those of trying every count (seed ${SEED})`, () => {
    const random = chance(SEED);
    for (let k = 0; k < runs(500, 10_000); k++) {
      const sizes = random
        .oneOf([
          [100, 50, 25],
          [40, 20],
          [60, 30, 15, 7.5],
          [50, 30, 20],
        ])
        .map((kvar): [number, number] => [kvar, random.whole(1, 3)]);
      const connected = sizes.map(([, stages]) => random.whole(0, stages));
      // whole steps of a quarter of the least difference, so that ties come up
      const wanted = random.whole(-40, 900) * 1.25;
      expect(chosen(sizes, wanted, connected), JSON.stringify({ sizes, connected, wanted })).toEqual(
        slowlyChosen(sizes, wanted, connected),
      );
    }
  });

  it('of too many counts are left to be walked', () => {
    expect(
      FreeLevels.of(
        {
          classes: classesOf([
            [50, 40],
            [25, 40],
          ]),
        },
        1e-9,
      ),
    ).toBeNull();
    expect(FreeLevels.of({ classes: [] }, 1e-9)).toBeNull();
  });
});
