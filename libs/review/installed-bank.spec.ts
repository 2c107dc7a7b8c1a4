import { describe, expect, it } from 'vitest';
import { readSite } from '#libs/contract/read-site.js';
import { type BankStage, readMeasurement, type StageGroup } from '#libs/engine/index.js';
import { COMMISSIONED } from '../../test/support/made-review.js';
import { installedBank } from './installed-bank.js';

const stage = (ratedKvar: number): BankStage => ({
  ...{ ratedKvar, ratedV: 480, reactorPct: 7, effectiveKvar: 0, capacitorV: 0, tunedOrderH: 3.78 },
});
const measured = (number: number, amps: number) => ({
  stage: number,
  lineV: 400,
  currentsA: [amps, amps, amps] as [number, number, number],
});

describe('a bank as it was installed', () => {
  const record = { ...COMMISSIONED, stages: [measured(1, 53.8), measured(3, 27)] };
  const bank = installedBank([stage(50), stage(50), stage(25)], record);

  it('is the bank of a site file: equal stages a group, each measurement with the stage it was made on', () => {
    expect(bank.stages.map(({ count, ratedKvar }) => [count, ratedKvar])).toEqual([
      [2, 50],
      [1, 25],
    ]);
    const whole = readSite({
      ...{ name: 'Mill', timeZone: 'Europe/Dublin', rules: 'iec', frequencyHz: 50, bus: { nominalV: 400 } },
      ...{ supply: { faultLevelMva: { max: 250 } }, bank },
    });
    expect(whole.bank!.stages.map(({ measurements }) => measurements?.map((one) => one.stage))).toEqual([[1], [1]]);
    expect(whole.bank!.stages.every(({ commissioned }) => commissioned === COMMISSIONED.doneOn)).toBe(true);
  });

  // Closed form: a 50 kvar, 480 V stage behind 7 % takes I = 50·(400/480)²/(1 − 0.07)/(√3·0.4) = 53.88 A at 400 V.
  it('gives the capacitance back that the currents stand for', () => {
    const [group] = bank.stages;
    const basis = { nominalV: 400, frequencyHz: 50 };
    const settled: StageGroup = {
      ...{ count: 2, ratedKvar: 50, ratedV: 480, reactorPct: 7, reactorQuality: 30 },
      ...{ dischargeOhm: null, reactorMaxA: null, switchPeakA: null, fixed: false },
    };
    const { capacitanceFactor } = readMeasurement(group!.measurements![0]!, settled, basis, 'bank');
    expect(capacitanceFactor).toBeCloseTo(53.8 / 53.88, 3);
  });
});
