import { describe, expect, it } from 'vitest';
import { type Control, controlReach, simulate } from '#libs/engine/index.js';
import { chance } from '../support/chance.js';
import { runs, SEED } from '../support/soak.js';

describe(`a controller (seed ${SEED})`, () => {
  it('keeps the connected kvar within its reach of what is wanted, or as near as its delays let it come', () => {
    let [bounded, paced, waiting] = [0, 0, 0];
    for (let run = 0; run < runs(400, 20_000); run++) {
      const random = chance(SEED + 600_000 + run);
      const sizes = [...new Set([random.whole(1, 12), random.whole(1, 12), random.whole(1, 12)])].sort((a, b) => b - a);
      let stage = 0;
      const classes = sizes.map((size) => ({
        kvar: size * 4.7,
        stages: Int32Array.from({ length: random.whole(1, 3) }, () => stage++),
      }));
      const bank = { classes, stageCount: stage, fixedKvar: 0, smallestKvar: classes[classes.length - 1]!.kvar };
      const control: Control = {
        setPointPowerFactor: 1,
        mode: random.oneOf(['nearestLevel', 'oneByOne']),
        responseRatio: random.oneOf([0.3, 0.5, 0.65, 1]),
        stepDelayS: random.oneOf([0, 10, 100, 300, 500]),
        reconnectDelayS: random.oneOf([0, 60, 900, 2000]),
        wear: random.oneOf(['even', 'inOrder']),
      };
      const n = 60;
      const totalKvar = classes.reduce((sum, { kvar, stages }) => sum + kvar * stages.length, 0);
      let wanted = 0;
      const wantedKvar = Float64Array.from({ length: n }, () => {
        wanted = random.next() < 0.3 ? random.between(-30, 1.2 * totalKvar) : wanted + random.between(-8, 8);
        return wanted;
      });
      const beginS = Float64Array.from({ length: n }, (_, i) => i * 900);
      const view = { intervalS: 900, beginS, wantedKvar, voltageScale: null, standby: null };
      const reach = controlReach({ ...bank, largestKvar: classes[0]!.kvar }, control, view);
      const { aboveKvar, belowKvar, waitIntervals, paceKvar } = reach;
      if (Number.isFinite(aboveKvar)) bounded++;
      if (Number.isFinite(paceKvar)) paced++;
      if (Number.isFinite(belowKvar) && waitIntervals > 0) waiting++;
      let before = 0;
      for (const [i, connected] of simulate(bank, control, view).connectedKvar.entries()) {
        const where = `${run} ${i} ${JSON.stringify(control)}`;
        const leastWanted = Math.min(...wantedKvar.slice(Math.max(i - waitIntervals, 0), i + 1));
        expect(connected, where).toBeLessThanOrEqual(Math.max(0, wantedKvar[i]! + aboveKvar, before - paceKvar));
        const floor = Math.min(totalKvar, leastWanted - belowKvar, before + paceKvar);
        expect(connected, where).toBeGreaterThanOrEqual(floor - 1e-9);
        before = connected;
      }
    }
    expect(Math.min(paced, waiting)).toBeGreaterThan(30);
    expect(bounded).toBeGreaterThan(100);
  });
});
