import { describe, expect, it } from 'vitest';
import type { StageGroup } from './bank.js';
import {
  capacitorV,
  deltaCapacitanceUf,
  effectiveKvar,
  nameplateKvar,
  ratedA,
  stageOhm,
  tunedOrderH,
} from './stage.js';

const stage = (more: Partial<StageGroup> = {}): StageGroup => ({
  count: 1,
  ratedKvar: 40,
  ratedV: 400,
  reactorPct: 0,
  reactorQuality: 20,
  dischargeOhm: null,
  reactorMaxA: null,
  switchPeakA: null,
  fixed: false,
  ...more,
});

describe('a stage', () => {
  it('of 40 kvar at 400 V has 4 Ω a phase in star', () => {
    expect(stageOhm(stage())).toEqual({ capacitiveOhm: 4, inductiveOhm: 0, resistanceOhm: 0 });
  });

  it('behind 20 % of quality 20 has 0.8 Ω and 0.04 Ω', () => {
    const { inductiveOhm, resistanceOhm } = stageOhm(stage({ reactorPct: 20 }));
    expect(inductiveOhm).toBeCloseTo(0.8, 12);
    expect(resistanceOhm).toBeCloseTo(0.04, 12);
  });

  it('ordered by its output gives that output, and one ordered by its nameplate has it', () => {
    // 25 kvar at 400 V behind 7 %: 25 · 0.93 · (480 / 400)² = 33.48 kvar at 480 V
    const build = { ratedV: 480, nominalV: 400, reactorPct: 7 };
    const ratedKvar = nameplateKvar(25, build, 'effective');
    expect(ratedKvar).toBeCloseTo(33.48, 12);
    expect(effectiveKvar(stage({ ...build, ratedKvar }), 400)).toBeCloseTo(25, 12);
    expect(nameplateKvar(25, build, 'rated')).toBe(25);
    expect(nameplateKvar(25, { ...build, reactorPct: 0 }, 'effective')).toBe(25);
  });

  it.each([
    [400, 0, 40, 'its nameplate'],
    [200, 0, 10, 'a quarter at half the voltage'],
    [400, 20, 50, '1/(1 − p) more behind a reactor'],
  ])('on %d V with %d %% gives %d kvar: %s', (busV, reactorPct, kvar, _why) => {
    expect(effectiveKvar(stage({ reactorPct }), busV)).toBeCloseTo(kvar, 12);
  });

  it.each([
    [0, 400],
    [20, 500],
    [50, 800],
  ])('behind %d %% carries %d V', (reactorPct, volts) => {
    expect(capacitorV(reactorPct, 400)).toBeCloseTo(volts, 12);
  });

  it.each([
    [25, 2],
    [4, 5],
    [100 / 9, 3],
  ])('behind %d %% is tuned to order %d', (reactorPct, orderH) => {
    expect(tunedOrderH(reactorPct)).toBeCloseTo(orderH, 12);
  });

  it('without a reactor is tuned to none', () => {
    expect(tunedOrderH(0)).toBeNull();
  });

  it('has a rated current of Q/(√3·U) and a third of its star capacitance in a delta phase', () => {
    expect(ratedA(stage())).toBeCloseTo(40_000 / (Math.sqrt(3) * 400), 12);
    const starUf = 1e6 / (2 * Math.PI * 50 * 4);
    expect(3 * deltaCapacitanceUf(stage(), 50)).toBeCloseTo(starUf, 9);
  });
});
