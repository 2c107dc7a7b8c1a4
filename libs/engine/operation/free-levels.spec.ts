import { describe, expect, it } from 'vitest';
import { type Chance, chance } from '../../../test/support/chance.js';
import { runs, SEED } from '../../../test/support/soak.js';
import { FreeLevels } from './free-levels.js';

// What is never switched is no part of the choice; a whole number leaves every difference exact.
const FIXED_KVAR = 20;

const bankOf = (sizes: [kvar: number, stages: number][]) => ({
  classes: sizes.map(([kvar, stages]) => ({ kvar, stages: new Int32Array(stages) })),
  fixedKvar: FIXED_KVAR,
});

function chosen(sizes: [number, number][], wantedKvar: number, connected: number[]): number[] {
  const counts = new Int32Array(sizes.length);
  FreeLevels.of(bankOf(sizes), 1e-9)!.chooseInto({
    wantedKvar: wantedKvar + FIXED_KVAR,
    connected: Int32Array.from(connected),
    chosen: counts,
  });
  return [...counts];
}

/** Every count vector, held against the rule one after the other. */
function slowlyChosen(
  sizes: [number, number][],
  wantedKvar: number,
  connected: number[],
  may: { free: number[]; switched: number } | null = null,
): number[] {
  let vectors: number[][] = [[]];
  for (const [, stages] of sizes) {
    vectors = vectors.flatMap((vector) => Array.from({ length: stages + 1 }, (_, count) => [...vector, count]));
  }
  const level = (vector: number[]) => vector.reduce((sum, count, c) => sum + count * sizes[c]![0], 0);
  const off = (vector: number[]) => Math.abs(wantedKvar - level(vector));
  const moves = (vector: number[]) => vector.reduce((sum, count, c) => sum + Math.abs(count - connected[c]!), 0);
  if (may !== null) {
    const fits = (vector: number[]) => vector.every((count, c) => count - connected[c]! <= may.free[c]!);
    vectors = vectors.filter((vector) => fits(vector) && moves(vector) <= may.switched);
  }
  const least = Math.min(...vectors.map(off));
  const order = (a: number[], b: number[]): number =>
    moves(a) - moves(b) ||
    level(a) - level(b) ||
    (a.map((count, c) => count - b[c]!).find((apart) => apart !== 0) ?? 0);
  return vectors.filter((vector) => off(vector) <= least + 1e-9).sort(order)[0]!;
}

describe('the nearest levels', () => {
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
      const sizes = madeSizes(random);
      const connected = sizes.map(([, stages]) => random.whole(0, stages));
      // whole steps of a quarter of the least difference, so that ties come up
      const wanted = random.whole(-40, 900) * 1.25;
      expect(chosen(sizes, wanted, connected), JSON.stringify({ sizes, connected, wanted })).toEqual(
        slowlyChosen(sizes, wanted, connected),
      );
    }
  });

  it(`are those of trying every count within reach, while stages wait or few may be switched (seed ${SEED})`, () => {
    const random = chance(SEED);
    let held = 0;
    for (let k = 0; k < runs(500, 10_000); k++) {
      const sizes = madeSizes(random);
      const connected = sizes.map(([, stages]) => random.whole(0, stages));
      const free = sizes.map(([, stages], c) => random.whole(0, stages - connected[c]!));
      const switched = random.whole(1, 12);
      const wanted = random.whole(-40, 900) * 1.25;
      const chosenCounts = new Int32Array(sizes.length);
      FreeLevels.of(bankOf(sizes), 1e-9)!.chooseReachableInto({
        wantedKvar: wanted + FIXED_KVAR,
        connected: Int32Array.from(connected),
        free: Int32Array.from(free),
        mostSwitchings: switched,
        chosen: chosenCounts,
      });
      const slow = slowlyChosen(sizes, wanted, connected, { free, switched });
      if (slow.join() !== slowlyChosen(sizes, wanted, connected).join()) held++;
      expect([...chosenCounts], JSON.stringify({ sizes, connected, free, switched, wanted })).toEqual(slow);
    }
    expect(held).toBeGreaterThan(100);
  });

  it('of too many counts are left to be walked', () => {
    expect(
      FreeLevels.of(
        bankOf([
          [50, 40],
          [25, 40],
        ]),
        1e-9,
      ),
    ).toBeNull();
    expect(FreeLevels.of(bankOf([]), 1e-9)).toBeNull();
  });
});

/** Stages of one to three of each size, largest first [kvar]. */
function madeSizes(random: Chance): [kvar: number, stages: number][] {
  const kvars = random.oneOf([
    [100, 50, 25],
    [40, 20],
    [60, 30, 15, 7.5],
    [50, 30, 20],
  ]);
  return kvars.map((kvar) => [kvar, random.whole(1, 3)]);
}
