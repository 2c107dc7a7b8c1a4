import { describe, expect, it } from 'vitest';
import type { Flow } from '../network/bus-flow.js';
import { networkModel } from '../network/network-model.js';
import { NetworkDuties, networkLimits } from './network-duties.js';

const supply = {
  faultLevelMva: { max: 10, min: 10 },
  rOverX: 0.1,
  resistanceExponent: 0.5,
  rippleHz: null,
  transformers: [],
};
const loads = {
  motorSharePct: 60,
  distorting: [{ name: 'drives', fundamentalA: 100, orders: [{ orderH: 11, pct: 10 }] }],
  backgroundPct: [],
  dampingKw: { max: 0, min: 0 },
  summation: 'exponent' as const,
};
const model = networkModel(supply, loads, 400, 100);
const basis = { nominalV: 400, emcClass: 2 as const, shortCircuitMinMva: 10, loadA: 100 };

// A flow as it is handed round, at one order, its bus voltage and source current in % of nominal and of 100 A.
function flow(level: number, pct: { voltage: number; current?: number }, corner = 0): Flow {
  const { voltage, current = 0 } = pct;
  const voltageV = Float64Array.of((voltage * 4) / Math.sqrt(3));
  return {
    level,
    levelKvar: 50 * level,
    vector: Int32Array.of(level),
    connected: Uint8Array.of(level),
    corner: model.corners.corners[corner]!,
    ordersH: Float64Array.of(11),
    voltageV,
    buses: [{ voltageV, voltageDistortionPct: voltage }],
    primary: null,
    sourceA: Float64Array.of(current),
    bankA: Float64Array.of(0),
    stageA: [],
    voltageDistortionPct: voltage,
    currentDistortionPct: current,
  };
}

function judged(without: Parameters<typeof flow>[1], withBank: Parameters<typeof flow>[1], known = true) {
  const limits = networkLimits({ rules: 'ieee', ...basis });
  const duties = new NetworkDuties(model, limits, known);
  duties.take(flow(0, without));
  duties.take(flow(1, withBank));
  const verdict = (name: string) => duties.duties().find((duty) => duty.name === name)!.verdict;
  return { verdict, exceededAlready: duties.exceededAlready };
}

describe('a limit of the network, beside what it is without the bank', () => {
  // By IEEE 519 at 400 V: 8 % in all, 5 % for an order.
  it.each([
    [8.2, 8.2 + 0.0799, 'watch', 'exceeded already, and by less than 1 % of the limit more'],
    [8.2, 8.2 + 0.0801, 'avoid', 'by more than 1 % of the limit more'],
    [7.9, 8.1, 'avoid', 'carried over it by the bank'],
    [7.99, 8.01, 'watch', 'over it, and hardly by the bank: 0.02 are a quarter of a per cent of it'],
    [9, 8.5, 'watch', 'over it, and less than without'],
    [9, 7, 'watch', 'within it again, but near'],
    [9, 6, 'clear', 'well within it again'],
  ])('%d %% without, %d %% with it: %s, %s', (without, withBank, verdict, _why) => {
    expect(judged({ voltage: without }, { voltage: withBank }).verdict('voltage distortion')).toBe(verdict);
  });

  it('says so where that was the reason for a milder verdict', () => {
    expect(judged({ voltage: 8.2 }, { voltage: 8.21 }).exceededAlready).toBe(true);
    expect(judged({ voltage: 1 }, { voltage: 9 }).exceededAlready).toBe(false);
  });

  it('holds for an order, and for currents against the load current', () => {
    // I_sc/I_L is 144: 15 % in all, 5.5 % for the 11th.
    const worse = judged({ voltage: 5.1, current: 15.2 }, { voltage: 5.2, current: 15.4 });
    expect(worse.verdict('harmonic voltage')).toBe('avoid');
    expect(worse.verdict('harmonic current')).toBe('avoid');
    expect(worse.verdict('current distortion')).toBe('avoid');
    const already = judged({ voltage: 5.1, current: 15.2 }, { voltage: 5.14, current: 15.24 });
    for (const name of ['harmonic voltage', 'harmonic current', 'current distortion']) {
      expect(already.verdict(name), name).toBe('watch');
    }
  });

  it('compares with level 0 of its own fault level and damping', () => {
    const duties = new NetworkDuties(model, networkLimits({ rules: 'ieee', ...basis }), true);
    duties.take(flow(0, { voltage: 9 }, 0));
    duties.take(flow(0, { voltage: 1 }, 1));
    duties.take(flow(1, { voltage: 9 }, 0));
    expect(duties.duties()[0]!.verdict).toBe('watch');
    duties.take(flow(1, { voltage: 9 }, 1));
    expect(duties.duties()[0]!.verdict).toBe('avoid');
  });
});

describe('where loads or background are unknown', () => {
  it('nothing is judged clear, and what is found wrong stays wrong', () => {
    expect(judged({ voltage: 1 }, { voltage: 1 }, false).verdict('voltage distortion')).toBeNull();
    expect(judged({ voltage: 1 }, { voltage: 7 }, false).verdict('voltage distortion')).toBe('watch');
    expect(judged({ voltage: 1 }, { voltage: 9 }, false).verdict('voltage distortion')).toBe('avoid');
  });
});

describe('limits that apply', () => {
  it.each([
    ['iec', 100, null, 'no limits of current'],
    ['ieee', 0, null, 'no load current to hold them against'],
    ['ieee', 100, 15, 'I_sc/I_L of 144'],
    ['ieee', 1000, 5, 'I_sc/I_L of 14'],
  ] as ['iec' | 'ieee', number, number | null, string][])('%s with %d A: %s, %s', (rules, loadA, totalPct, _why) => {
    expect(networkLimits({ rules, ...basis, loadA }).current?.totalPct ?? null).toBe(totalPct);
  });
});
