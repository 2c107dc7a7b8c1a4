// No stage comes back before its reconnection delay is over, whatever the load, the mode, the gaps of the record.
import { describe, expect, it } from 'vitest';
import { type Control, simulate, switchedBank } from '#libs/engine/index.js';
import { chance } from '../support/chance.js';
import { FIRST_S } from '../support/made-record.js';
import { madeBank, madeGroup } from '../support/made-network.js';
import { runs, SEED } from '../support/soak.js';

const seeds = (usual: number, soaked: number): number[] =>
  Array.from({ length: runs(usual, soaked) }, (_, k) => SEED + k);

describe(`the reconnection delay (seed ${SEED})`, () => {
  const SIZES_KVAR = [10, 20, 40, 80];
  const INTERVAL_S = 300;

  // Sizes of 1:2:4:8: every level names the stages that make it, so events can be read from the connected kvar alone.
  function earliestReturns(seed: number, simulatedDelayS: number | null): { delayS: number; leastOffS: number } {
    const random = chance(seed);
    const delayS = random.oneOf([350, 600, 900, 1500]);
    const bank = switchedBank(madeBank(SIZES_KVAR.map((ratedKvar) => madeGroup({ ratedKvar }))), 400);
    const slots: number[] = [];
    for (let slot = 0; slots.length < 300; slot += random.next() < 0.05 ? random.whole(2, 6) : 1) slots.push(slot);
    const beginS = Float64Array.from(slots, (slot) => FIRST_S + slot * INTERVAL_S);
    const control: Control = {
      setPointPowerFactor: 0.95,
      mode: random.oneOf(['nearestLevel', 'oneByOne']),
      responseRatio: 0.65,
      stepDelayS: random.oneOf([0, 10, 150]),
      reconnectDelayS: simulatedDelayS ?? delayS,
      wear: random.oneOf(['even', 'inOrder']),
    };
    const { connectedKvar } = simulate(bank, control, {
      intervalS: INTERVAL_S,
      beginS,
      wantedKvar: beginS.map(() => random.between(0, 150)),
      voltageScale: random.next() < 0.3 ? beginS.map(() => random.between(0.9, 1.1)) : null,
      standby: random.next() < 0.3 ? Uint8Array.from(slots, () => (random.next() < 0.05 ? 1 : 0)) : null,
    });
    let leastOffS = Number.POSITIVE_INFINITY;
    const offSinceS = SIZES_KVAR.map(() => Number.NEGATIVE_INFINITY);
    let before = SIZES_KVAR.map(() => false);
    connectedKvar.forEach((kvar, i) => {
      const tens = Math.round(kvar / 10);
      const now = SIZES_KVAR.map((_, k) => Math.floor(tens / 2 ** k) % 2 === 1);
      now.forEach((on, k) => {
        if (before[k] && !on) offSinceS[k] = beginS[i]!;
        if (!before[k] && on) leastOffS = Math.min(leastOffS, beginS[i]! - offSinceS[k]!);
      });
      before = now;
    });
    return { delayS, leastOffS };
  }

  it('is over before a stage comes back, across gaps, standby and both modes', () => {
    let tight = 0;
    for (const seed of seeds(200, 10_000)) {
      const { delayS, leastOffS } = earliestReturns(seed, null);
      expect(leastOffS, `seed ${seed}`).toBeGreaterThanOrEqual(delayS);
      // At the next begin of an interval after the delay: the test would see one interval less.
      if (leastOffS - INTERVAL_S < delayS) tight++;
    }
    expect(tight).toBeGreaterThan(runs(100, 5000));
  });

  it('control: a controller that ignores it brings stages back too soon', () => {
    const early = seeds(50, 500).filter((seed) => {
      const { delayS, leastOffS } = earliestReturns(seed, 0);
      return leastOffS < delayS;
    });
    expect(early.length).toBeGreaterThan(runs(40, 400));
  });
});
