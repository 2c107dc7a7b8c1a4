import { describe, expect, it } from 'vitest';
import type { Bank, StageGroup } from '../layout/bank.js';
import { cabinetHeat } from './cabinet-heat.js';
import type { ChargeStage } from './charge.js';

const group: StageGroup = {
  count: 4,
  ratedKvar: 50,
  ratedV: 400,
  reactorPct: 7,
  reactorQuality: 30,
  dischargeOhm: null,
  reactorMaxA: null,
  switchPeakA: null,
  fixed: false,
};
const bank = (parts: Partial<Bank> = {}): Bank => ({
  groups: [group],
  interStageUh: 2,
  interStageGiven: true,
  ambientCategory: null,
  ...parts,
});
const charge = [{ dischargeLossW: 0.6 } as ChargeStage];
const demand = { groups: [], reactorLossW: 600 };

describe('the heat of a cabinet', () => {
  it('is that of capacitors, resistors of all phases, and reactors', () => {
    const heat = cabinetHeat(bank(), charge, demand, {});
    // 0.2 and 0.5 W/kvar of 200 kvar, 3 · 4 resistors of 0.6 W, 600 W
    expect(heat.lowW).toBeCloseTo(40 + 7.2 + 600, 9);
    expect(heat.highW).toBeCloseTo(100 + 7.2 + 600, 9);
  });

  it('takes a resistor that is fitted: 400²/16 000 Ω are 10 W a phase', () => {
    const fitted = bank({ groups: [{ ...group, dischargeOhm: 16_000 }] });
    expect(cabinetHeat(fitted, charge, demand, {}).resistorW).toBeCloseTo(120, 9);
  });

  it('is carried away by 3.0 m³/h for each watt and kelvin at sea level, the rule of thumb', () => {
    const { airFlowM3PerH, highW } = cabinetHeat(bank(), charge, demand, { allowedRiseK: 10 });
    expect((airFlowM3PerH * 10) / highW).toBeCloseTo(2.985, 2);
  });

  it('needs more air in thin air: 1.28 times as much at 2 500 m', () => {
    const at = (altitudeM: number) =>
      cabinetHeat(bank(), charge, demand, { allowedRiseK: 10, altitudeM }).airFlowM3PerH;
    // density of the standard atmosphere at 2 500 m is 0.781 of that at sea level
    expect(at(0) / at(2500)).toBeCloseTo(0.781, 2);
    expect(at(-50)).toBe(at(0));
  });
});

describe('the rise that is allowed', () => {
  it.each([
    [{ allowedRiseK: 15 }, null, 15, 'site'],
    [{ ambientMaxC: 40 }, 'C', 10, 'category'],
    [{ ambientMaxC: 60 }, 'C', 10, 'practice'],
    [{ ambientMaxC: 35 }, null, 10, 'practice'],
    [{}, 'C', 10, 'practice'],
  ] as const)('%j with category %s is %d K, from %s', (place, ambientCategory, riseK, from) => {
    const heat = cabinetHeat(bank({ ambientCategory }), charge, demand, place);
    expect([heat.allowedRiseK, heat.riseFrom]).toEqual([riseK, from]);
  });
});
