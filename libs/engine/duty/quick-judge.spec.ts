import { describe, expect, it } from 'vitest';
import type { Bank } from '../layout/bank.js';
import { bankLevels } from '../layout/levels.js';
import { networkModel } from '../network/network-model.js';
import { type JudgeBasis, judgeBank } from './judge-bank.js';
import { quickJudge } from './quick-judge.js';
import { graver, type Verdict } from './rules.js';

// A spread of banks and loads by arithmetic, so that every verdict comes up.
function madeCase(k: number): { bank: Bank; basis: JudgeBasis } {
  const bank: Bank = {
    groups: [
      {
        count: 1 + (k % 4),
        ratedKvar: [12.5, 25, 50][k % 3]!,
        ratedV: [400, 440, 525][(k >> 1) % 3]!,
        reactorPct: [0, 5.67, 7, 14][(k >> 2) % 4]!,
        reactorQuality: 30,
        dischargeOhm: null,
        reactorMaxA: null,
        switchPeakA: null,
        fixed: false,
      },
    ],
    interStageUh: [1, 20, 60][k % 3]!,
    interStageGiven: k % 2 === 0,
    ambientCategory: null,
  };
  const basis: JudgeBasis = {
    rules: k % 5 === 0 ? 'ieee' : 'iec',
    frequencyHz: 50,
    voltages: { nominalV: 400, highestV: 400 + (k % 7) * 6 },
    emcClass: 2,
    supply: {
      faultLevelMva: { max: 5 + 3 * (k % 11), min: 5 },
      rOverX: 0.2,
      resistanceExponent: 0.5,
      rippleHz: null,
      transformers: [],
    },
    loads: {
      motorSharePct: 60,
      distorting: [{ name: 'drives', fundamentalA: 7 * (k % 9), spectrum: 'six-pulse' }],
      backgroundPct: k % 13 === 0 ? null : [],
      dampingKw: { max: 40, min: 0 },
      summation: 'exponent',
    },
    reconnectDelayS: 240,
  };
  return { bank, basis };
}

describe('the quick judgement', () => {
  const cases = Array.from({ length: 120 }, (_, k) => madeCase(k)).map(({ bank, basis }) => {
    const model = networkModel(basis.supply, basis.loads, 400, 300);
    return { quick: quickJudge(model, bank, basis), full: judgeBank(model, bank, bankLevels(bank, 400), basis) };
  });

  it('is never graver than the full one: no candidate is dropped for nothing', () => {
    for (const { quick, full } of cases) expect(graver(quick.verdict, full.verdict)).toBe(full.verdict);
  });

  it('differs from it only where a peak of the impedance lies near an order', () => {
    for (const { quick, full } of cases) if (full.nearPeak === null) expect(quick.verdict).toBe(full.verdict);
    expect(cases.some(({ quick, full }) => quick.verdict !== full.verdict)).toBe(true);
  });

  it('has the voltages’ own verdict', () => {
    for (const { quick, full } of cases) {
      const voltages = full.duties.filter(({ name }) => name.startsWith('capacitor voltage'));
      expect(quick.voltages).toBe(voltages.reduce<Verdict>((worst, { verdict }) => graver(worst, verdict), 'clear'));
    }
  });

  it('meets every verdict in these cases', () => {
    expect(new Set(cases.map(({ full }) => full.verdict)).size).toBe(3);
  });
});
