// Second method: the controller itself, simulated; and the sum of what it keeps to, added up interval by interval.
import { describe, expect, it } from 'vitest';
import { type Chance, chance } from '../../../test/support/chance.js';
import { runs, SEED } from '../../../test/support/soak.js';
import type { Control } from '../operation/control.js';
import { controlReach } from '../operation/control-reach.js';
import { simulate } from '../operation/simulate.js';
import { KeptKvarh } from './kept-kvarh.js';

const INTERVAL_S = 60;

function madeBank(random: Chance) {
  const sizes = [...new Set([random.whole(1, 12), random.whole(1, 12)])].sort((a, b) => b - a);
  let stage = 0;
  const classes = sizes.map((size) => ({
    kvar: size * 4.7,
    stages: Int32Array.from({ length: random.whole(1, 4) }, () => stage++),
  }));
  const totalKvar = classes.reduce((sum, { kvar, stages }) => sum + kvar * stages.length, 0);
  const [smallestKvar, largestKvar] = [classes[classes.length - 1]!.kvar, classes[0]!.kvar];
  return { classes, stageCount: stage, fixedKvar: 0, smallestKvar, largestKvar, totalKvar };
}

function madeControl(random: Chance): Control {
  return {
    setPointPowerFactor: 1,
    mode: random.oneOf(['nearestLevel', 'nearestLevel', 'oneByOne']),
    responseRatio: random.oneOf([0.5, 0.65, 1]),
    stepDelayS: random.oneOf([0, 10, 20, 40]),
    reconnectDelayS: random.oneOf([0, 60, 120, 300]),
    wear: 'even',
  };
}

function madeView(random: Chance, totalKvar: number) {
  let wanted = 0;
  const wantedKvar = Float64Array.from({ length: 300 }, () => {
    wanted = random.next() < 0.05 ? random.between(-30, 1.5 * totalKvar) : wanted + random.between(-3, 3);
    return wanted;
  });
  const beginS = wantedKvar.map((_, i) => i * INTERVAL_S);
  return { intervalS: INTERVAL_S, beginS, wantedKvar, voltageScale: null, standby: null };
}

describe(`the fewest kvarh connected (seed ${SEED})`, () => {
  it('are no more than a simulated bank has in', () => {
    const random = chance(SEED);
    let told = 0;
    for (let k = 0; k < runs(150, 3000); k++) {
      const bank = madeBank(random);
      const control = madeControl(random);
      const view = madeView(random, bank.totalKvar);
      const least = new KeptKvarh().least(bank, control, view);
      const { connectedKvar } = simulate(bank, control, view);
      const kvarh = connectedKvar.reduce((sum, kvar) => sum + kvar, 0) / 60;
      expect(least, JSON.stringify({ k, control })).toBeLessThanOrEqual(kvarh);
      if (least > 0.5 * kvarh) told++;
    }
    // and they are worth having
    expect(told).toBeGreaterThan(30);
  });

  it('are the sum of what the reach leaves, but for the steps it is counted in', () => {
    const random = chance(SEED);
    const bank = { ...madeBank(random), stageCount: 1 };
    const control: Control = { ...madeControl(random), mode: 'nearestLevel', stepDelayS: 0, reconnectDelayS: 120 };
    const view = madeView(random, bank.totalKvar);
    const { belowKvar, waitIntervals } = controlReach(bank, control, view);
    expect(waitIntervals).toBe(1);
    let sum = 0;
    for (let i = 0; i < view.wantedKvar.length; i++) {
      const wanted = Math.min(view.wantedKvar[i]!, view.wantedKvar[Math.max(i - 1, 0)]!);
      sum += Math.max(Math.min(bank.totalKvar, wanted - belowKvar), 0);
    }
    const least = new KeptKvarh().least(bank, control, view);
    const stepsKvarh = (300 * 1.5 * bank.totalKvar) / 2048 / 60;
    expect(least).toBeLessThanOrEqual(sum / 60);
    expect(least).toBeGreaterThan(sum / 60 - 2 * stepsKvarh);
  });
});
