// Second method: a dense scan of |Z| at every bus; a peak of its own must be found and no other.
import { describe, expect, it } from 'vitest';
import { networkScene, PeakFinder, type Site, scanSite } from '#libs/engine/index.js';
import { chance } from '../support/chance.js';
import { madeBuses } from '../support/made-buses.js';
import { runs, SEED } from '../support/soak.js';

const STEP_H = 0.002;
const dense = Float64Array.from({ length: 24_501 }, (_, i) => 1 + i * STEP_H);

interface Compared {
  bus: string;
  expected: number[];
  found: number[];
}

function compared(site: Site, corner: number): Compared[] {
  const { model, bank, levels } = networkScene(site);
  const finder = new PeakFinder(model, bank);
  const vector = levels.at(-1)!.vectors[0]!;
  return scanSite(site, { corner, ordersH: dense }).levels.map(({ bus, impedanceOhm: z }, k) => {
    const expected = Array.from(dense).filter(
      (_, i) => i > 0 && i < z.length - 1 && z[i]! > z[i - 1]! && z[i]! >= z[i + 1]!,
    );
    return {
      bus,
      expected,
      found: finder.peaks(vector, model.corners.corners[corner]!, k).map(({ orderH }) => orderH),
    };
  });
}

// A dense scan can step over a low one, so what is found is asked for itself.
function isTop(site: Site, corner: number, { bus, orderH }: { bus: string; orderH: number }): boolean {
  const ordersH = Float64Array.of(orderH - 2e-5, orderH, orderH + 2e-5);
  const [before, top, after] = scanSite(site, { corner, ordersH }).levels.find(
    (level) => level.bus === bus,
  )!.impedanceOhm;
  return top! > before! && top! > after!;
}

// At the very ends of the range a top is no interior one.
const interior = (orders: number[]): number[] => orders.filter((h) => h > 1.01 && h < 49.99);

describe(`peaks at every bus of a network against a dense scan (seed ${SEED})`, () => {
  const made = Array.from({ length: runs(12, 200) }, (_, k) => ({ k, site: madeBuses(chance(SEED + 613 * k)) }));

  it.each(made)('$k: each is found, in the nominal corner and the last', ({ site, k }) => {
    const last = networkScene(site).model.corners.corners.length - 1;
    for (const corner of [0, last]) {
      for (const { bus, expected, found } of compared(site, corner)) {
        const label = JSON.stringify({ seed: SEED, k, corner, bus, expected, found });
        for (const orderH of interior(expected)) {
          expect(
            found.some((h) => Math.abs(h - orderH) < 2 * STEP_H),
            label,
          ).toBe(true);
        }
        for (const orderH of found) expect(isTop(site, corner, { bus, orderH }), `${orderH} ${label}`).toBe(true);
      }
    }
  });
});
