import { describe, expect, it } from 'vitest';
import type { StageGroupInput } from '../layout/bank.js';
import { settleBank, settleControl } from './settle-bank.js';

const stage: StageGroupInput = { count: 2, ratedKvar: 50, ratedV: 440 };
const codes = (remarks: { code: string }[]): string[] => remarks.map(({ code }) => code);

describe('a bank of the site file', () => {
  it('takes the customary reactor quality and inductance between stages, and says so', () => {
    const { bank, assumptions } = settleBank({ stages: [{ ...stage, reactorPct: 7 }] }, 50);
    expect(bank).toMatchObject({ interStageUh: 2, interStageGiven: false });
    expect(bank.groups[0]).toMatchObject({ reactorQuality: 30, fixed: false, dischargeOhm: null });
    expect(codes(assumptions)).toEqual(['default.bank.stages.reactorQuality', 'default.bank.interStageUh']);
  });

  it('says nothing of a quality where there is no reactor, nor of what is given', () => {
    const { bank, assumptions } = settleBank({ stages: [stage], interStageUh: 5 }, 50);
    expect(assumptions).toEqual([]);
    expect(bank).toMatchObject({ interStageUh: 5, interStageGiven: true });
  });

  // 50 kvar at 440 V and 50 Hz are 3.872 Ω in star: 7 % is 0.27104 Ω, 0.86275 mH.
  const sevenPctMh = (0.07 * 3.872 * 1000) / (100 * Math.PI);

  it('has its reactor ratio from the nameplate where that gives an inductance', () => {
    const { bank } = settleBank({ stages: [{ ...stage, reactorMh: sevenPctMh }] }, 50);
    expect(bank.groups[0]!.reactorPct).toBeCloseTo(7, 9);
  });

  it('has it from a measured capacitance too: a tenth more is a tenth more', () => {
    const nominalUf = 1e6 / (100 * Math.PI * 3.872) / 3;
    const { bank } = settleBank({ stages: [{ ...stage, reactorMh: sevenPctMh, capacitanceUf: 1.1 * nominalUf }] }, 50);
    expect(bank.groups[0]!.reactorPct).toBeCloseTo(7.7, 9);
  });

  it.each([
    [7, [], 'the same'],
    [7.2, [], 'under 3 % away'],
    [6.8, [], 'under 3 % away'],
    [7.3, ['bank.ratioDisagrees'], 'over 3 % away'],
    [6.7, ['bank.ratioDisagrees'], 'over 3 % away'],
  ])('with %d %% stated finds %j: %s', (reactorPct, findings, _why) => {
    const settled = settleBank({ stages: [{ ...stage, reactorPct, reactorMh: sevenPctMh }] }, 50);
    expect(codes(settled.findings)).toEqual(findings);
    expect(settled.bank.groups[0]!.reactorPct).toBeCloseTo(7, 9);
  });

  it.each([
    [{ stages: [{ ...stage, reactorPct: 88 }] }, 'bank.stages[0].reactorPct'],
    [{ stages: [stage, { ...stage, reactorPct: -1 }] }, 'bank.stages[1].reactorPct'],
    [{ stages: [stage], interStageUh: 0 }, 'bank.interStageUh'],
  ])('%j is refused at %s', (input, path) => {
    expect(() => settleBank(input, 50)).toThrow(path);
  });
});

describe('the controller’s settings', () => {
  const basis = { targetPowerFactor: 0.95, rules: 'iec' as const, frequencyHz: 50 };
  const { bank } = settleBank({ stages: [{ ...stage, ratedV: 400 }] }, 50);

  it('default to the target, the customary threshold and the time the standard’s own resistor takes', () => {
    const { control, assumptions } = settleControl(undefined, bank, basis);
    expect(control).toMatchObject({
      setPointPowerFactor: 0.95,
      mode: 'nearestLevel',
      responseRatio: 0.65,
      stepDelayS: 10,
      wear: 'even',
    });
    expect(control.reconnectDelayS).toBeCloseTo(236, 0);
    expect(assumptions).toHaveLength(6);
  });

  it('given are kept, and no assumption', () => {
    const given = {
      setPointPowerFactor: 0.99,
      mode: 'oneByOne' as const,
      responseRatio: 0.6,
      stepDelayS: 0,
      reconnectDelayS: 0,
      wear: 'inOrder' as const,
    };
    expect(settleControl(given, bank, basis)).toEqual({ control: given, assumptions: [] });
  });
});
