import { describe, expect, it } from 'vitest';
import type { Bank, StageGroup } from '../layout/bank.js';
import { inrushStages } from './inrush.js';

const group = (more: Partial<StageGroup> = {}): StageGroup => ({
  count: 1,
  ratedKvar: 40,
  ratedV: 400,
  reactorPct: 0,
  reactorQuality: 30,
  dischargeOhm: null,
  reactorMaxA: null,
  switchPeakA: null,
  fixed: false,
  ...more,
});
const bank = (...groups: StageGroup[]): Bank => ({
  groups,
  interStageUh: 10,
  interStageGiven: true,
  ambientCategory: null,
});
const SITE = { nominalV: 400, frequencyHz: 50, shortCircuitMva: 16, rules: 'iec' as const };
const PHASE_PEAK_V = (Math.SQRT2 * 400) / Math.sqrt(3);
const BETWEEN_OHM = 2 * Math.PI * 50 * 10e-6;

describe('inrush, by the closed forms', () => {
  it('of a single plain stage rings against the supply: X_C 4 Ω, X_L 0.01 Ω', () => {
    const [only] = inrushStages(bank(group()), SITE);
    expect(only!.singlePeakA).toBeCloseTo(PHASE_PEAK_V / 0.2, 9);
    expect(only!.singleHz).toBeCloseTo(50 * 20, 9);
    expect(only!.ontoBankPeakA).toBeNull();
  });

  it('of a tuned stage rings against its own reactor too', () => {
    const [only] = inrushStages(bank(group({ reactorPct: 10 })), SITE);
    expect(only!.singlePeakA).toBeCloseTo(PHASE_PEAK_V / Math.sqrt(4 * 0.41), 9);
  });

  it('onto plain stages has what lies between them alone', () => {
    // Three others of 4 Ω: a third of it.
    const [stage] = inrushStages(bank(group({ count: 4 })), SITE);
    expect(stage!.ontoBankPeakA).toBeCloseTo(PHASE_PEAK_V / Math.sqrt((4 + 4 / 3) * BETWEEN_OHM), 9);
    expect(stage!.ontoBankHz).toBeCloseTo(50 * Math.sqrt((4 + 4 / 3) / BETWEEN_OHM), 9);
  });

  it('onto tuned stages has their reactors in parallel', () => {
    const [stage] = inrushStages(bank(group({ count: 3, reactorPct: 10 })), SITE);
    expect(stage!.ontoBankPeakA).toBeCloseTo(PHASE_PEAK_V / Math.sqrt(6 * (0.4 + 0.2 + BETWEEN_OHM)), 9);
  });

  it('of a tuned stage onto a bank with one plain stage in it has its own reactor and none of the others’', () => {
    const [tuned] = inrushStages(bank(group({ count: 2, reactorPct: 10 }), group()), SITE);
    expect(tuned!.ontoBankPeakA).toBeCloseTo(PHASE_PEAK_V / Math.sqrt((4 + 2) * (0.4 + BETWEEN_OHM)), 9);
  });

  const ratedA = 40_000 / (Math.sqrt(3) * 400);

  it.each([
    ['iec', null, 100 * ratedA, 'a hundred times rated'],
    ['iec', 3000, 3000, 'the switch’s own, where that is less'],
    ['iec', 1e6, 100 * ratedA, 'the smaller of the two'],
    ['ieee', null, null, 'none'],
    ['ieee', 3000, 3000, 'the switch’s own'],
  ] as ['iec' | 'ieee', number | null, number | null, string][])(
    'by %s with a switch for %s A has the limit %s: %s',
    (rules, switchPeakA, limitPeakA, _why) => {
      const [stage] = inrushStages(bank(group({ switchPeakA })), { ...SITE, rules });
      if (limitPeakA === null) expect(stage!.limitPeakA).toBeNull();
      else expect(stage!.limitPeakA).toBeCloseTo(limitPeakA, 9);
    },
  );

  it('of a kvar form agrees with the energy: ½·C·V² comes back as ½·L·I²', () => {
    const [only] = inrushStages(bank(group()), SITE);
    const omega = 2 * Math.PI * 50;
    const [farad, henry] = [1 / (omega * 4), 0.01 / omega];
    expect(henry * only!.singlePeakA ** 2).toBeCloseTo(farad * PHASE_PEAK_V ** 2, 9);
  });
});
