// - Tuned orders and frequencies of the customary ratios: common practice, several sources; seen and from memory.
// - 80 kvar, 525 V, 50 Hz, 7 %: worked example, studylib.net 27030577; seen, digits as printed.
// - 400 V, 6 %, 425.5 V on the capacitor: erbar.id, 2022; seen.
import { describe, expect, it } from 'vitest';
import {
  assessBank,
  capacitorV,
  deltaCapacitanceUf,
  effectiveKvar,
  stageAdmittance,
  stageBranch,
  stageOhm,
  tunedOrderH,
  UTC_TABLE,
} from '#libs/engine/index.js';
import { madeGroup } from '../support/made-network.js';
import { madeRecord } from '../support/made-record.js';
import { madeSite } from '../support/made-site.js';

describe('tuned order and frequency', () => {
  it.each([
    [7, 50, 189],
    [7, 60, 227],
    [5.67, 50, 210],
    [14, 50, 134],
  ])('%d %% at %d Hz is tuned to %d Hz', (reactorPct, frequencyHz, printedHz) => {
    expect(tunedOrderH(reactorPct)! * frequencyHz).toBeCloseTo(printedHz, 0);
  });

  it('7 % is order 3.78', () => {
    expect(tunedOrderH(7)).toBeCloseTo(3.78, 2);
  });

  // A formula found in posts; it would put 7 % at 52 Hz.
  it('is not f/√(1 − p): the branch conducts best at 1/√p', () => {
    const orders = Float64Array.of(1 / Math.sqrt(1 - 0.07), 3.7, 1 / Math.sqrt(0.07), 3.9);
    const branch = stageBranch(madeGroup({ reactorPct: 7 }), { capacitanceFactor: 1, inductanceFactor: 1 }, 0.5);
    const y = stageAdmittance(branch, orders);
    const conducts = Array.from(orders, (_, i) => Math.hypot(y.re[i]!, y.im[i]!));
    expect(conducts.indexOf(Math.max(...conducts))).toBe(2);
    expect(conducts[0]).toBeLessThan(conducts[2]! / 20);
    expect(tunedOrderH(7)! * 50).toBeGreaterThan(3 * (50 / Math.sqrt(1 - 0.07)));
  });
});

describe('80 kvar at 525 V, 50 Hz, 7 %', () => {
  const stage = madeGroup({ ratedKvar: 80, ratedV: 525, reactorPct: 7 });
  const ohm = stageOhm(stage);
  const omega = 2 * Math.PI * 50;

  it('has 3.445 Ω and 0.924 mF in star', () => {
    expect(ohm.capacitiveOhm).toBeCloseTo(3.445, 3);
    expect((3 * deltaCapacitanceUf(stage, 50)) / 1000).toBeCloseTo(0.924, 3);
  });

  it('has a reactor of 0.241 Ω and 0.768 mH', () => {
    expect(ohm.inductiveOhm).toBeCloseTo(0.241, 3);
    expect((1000 * ohm.inductiveOhm) / omega).toBeCloseTo(0.768, 3);
  });

  it('gives 86.025 kvar at 525 V and 49.9 kvar at 400 V', () => {
    expect(Math.abs(effectiveKvar(stage, 525) - 86.025)).toBeLessThan(0.005);
    expect(effectiveKvar(stage, 400)).toBeCloseTo(49.9, 1);
  });

  it('is recognised as 7 % from its nameplate in µF and mH', () => {
    const site = madeSite({
      bank: { stages: [{ count: 1, ratedKvar: 80, ratedV: 525, capacitanceUf: 924 / 3, reactorMh: 0.768 }] },
    });
    const record = madeRecord({ activeKw: [100], reactiveKvar: [80] });
    const [settled] = assessBank(site, record, UTC_TABLE).result.bank.stages;
    expect(settled!.reactorPct).toBeCloseTo(7, 1);
    expect(settled!.effectiveKvar).toBeCloseTo(49.9, 1);
  });
});

describe('voltage on the capacitor', () => {
  it('behind 6 % on 400 V is 425.5 V', () => {
    expect(capacitorV(6, 400)).toBeCloseTo(425.5, 1);
  });
});
