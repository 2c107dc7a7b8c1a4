// The rules by which a bank is clear, watch or avoid, each at its edge and just past it.
import { describe, expect, it } from 'vitest';
import { assessBank, type Duty, type Outcome, type Site, UTC_TABLE } from '#libs/engine/index.js';
import { madeRecord } from '../support/made-record.js';
import { madeSite } from '../support/made-site.js';

const tuned = { count: 2, ratedKvar: 25, ratedV: 525, reactorPct: 7 };
const plain = { count: 2, ratedKvar: 25, ratedV: 525 };

/** Two of these are the twelve days a record needs to be planned on. */
const INTERVAL_S = 6 * 86_400;

function assessed(parts: Partial<Site>): Outcome['result'] {
  const record = madeRecord({ activeKw: [200, 220], reactiveKvar: [120, 130], intervalS: INTERVAL_S });
  return assessBank(madeSite({ bank: { stages: [tuned], interStageUh: 20 }, ...parts }), record, UTC_TABLE).result;
}

function duty(result: Outcome['result'], name: string): Duty {
  return result.duties.find((row) => row.name === name)!;
}

const codes = (result: Outcome['result']): string[] => result.reasons.map(({ code }) => code);

describe('what is not known', () => {
  it('a bank on declared loads within limits is clear', () => {
    expect(assessed({}).verdict).toBe('clear');
  });

  it.each([
    [{ backgroundPct: [] }, 'network.unknownLoads'],
    [{ distorting: [] }, 'network.unknownBackground'],
    [undefined, 'network.unknownLoads'],
  ])('with loads %j it is at best watch, and says why', (loads, code) => {
    const result = assessed(loads === undefined ? { loads: {} } : { loads });
    expect(result.verdict).toBe('watch');
    expect(codes(result)).toContain(code);
    expect(duty(result, 'voltage distortion').verdict).toBeNull();
  });

  it('an old bank that may have been working makes it watch', () => {
    const result = assessed({ recordedBank: { state: 'unknown' } });
    expect(result.verdict).toBe('watch');
    expect(codes(result)).toContain('recordedBank.unknown');
  });

  it('no bank at all has nothing that could be watched', () => {
    const record = madeRecord({ activeKw: [200], reactiveKvar: [0], intervalS: 2 * INTERVAL_S });
    const { result } = assessBank(madeSite({ loads: {}, bank: { stages: [] } }), record, UTC_TABLE);
    expect(result.verdict).toBe('clear');
  });
});

describe('a limit of the network', () => {
  // Background alone: what the bus has without any bank.
  const noisy = (pct: number): Site['loads'] => ({
    distorting: [],
    backgroundPct: [{ orderH: 11, pct }],
    dampingKw: { max: 0 },
  });

  it('exceeded without the bank already is watch, not avoid', () => {
    const result = assessed({ loads: noisy(4) });
    expect(duty(result, 'harmonic voltage').ratio).toBeGreaterThan(1);
    expect(duty(result, 'harmonic voltage').verdict).toBe('watch');
    expect(codes(result)).toContain('limit.exceededAlready');
    expect(codes(result)).not.toContain('limit.exceeded');
    expect(result.verdict).toBe('watch');
  });

  it('that the bank itself makes worse by more than 1 % of it is avoid', () => {
    // Plain stages move the resonance to the 11th: 4 % behind the source become far more at the bus.
    const result = assessed({
      loads: noisy(4),
      supply: { faultLevelMva: { max: 6 } },
      bank: { stages: [{ ...plain, ratedKvar: 40 }], interStageUh: 50 },
    });
    expect(duty(result, 'harmonic voltage').verdict).toBe('avoid');
    expect(result.verdict).toBe('avoid');
  });

  it('near from 80 % on', () => {
    const limit = 3.5;
    const ratioAt = (pct: number): Duty => duty(assessed({ loads: noisy(pct) }), 'harmonic voltage');
    // In proportion, so that 80 % can be met from either side.
    const perPct = ratioAt(1).ratio!;
    expect(ratioAt(0.8001 / perPct).verdict).toBe('watch');
    expect(ratioAt(0.7999 / perPct).verdict).toBe('clear');
    expect(ratioAt(1).limit).toBe(limit);
  });
});

describe('inrush over its limit', () => {
  const crowded = { stages: [{ ...plain, count: 6, ratedKvar: 25 }] };

  it('on the customary inductance between stages is watch', () => {
    const result = assessed({ bank: crowded });
    expect(duty(result, 'inrush current').ratio).toBeGreaterThan(1);
    expect(duty(result, 'inrush current').verdict).toBe('watch');
    expect(codes(result)).toContain('inrush.assumedInductance');
    expect(result.verdict).toBe('watch');
  });

  it('on a given one of the same size is avoid', () => {
    const result = assessed({ bank: { ...crowded, interStageUh: 2 } });
    expect(duty(result, 'inrush current').verdict).toBe('avoid');
    expect(result.verdict).toBe('avoid');
  });

  it('of a single stage on its own supply is avoid even so: no inductance between stages would help', () => {
    const result = assessed({
      supply: { faultLevelMva: { max: 900 } },
      bank: { stages: [{ count: 1, ratedKvar: 1, ratedV: 440 }] },
    });
    expect(duty(result, 'inrush current').ratio).toBeGreaterThan(1);
    expect(result.verdict).toBe('avoid');
  });

  it('is judged against the switch where that makes less', () => {
    const result = assessed({ bank: { stages: [{ ...tuned, switchPeakA: 200 }], interStageUh: 20 } });
    expect(duty(result, 'inrush current').limit).toBe(200);
    expect(duty(result, 'inrush current').source).toBe('site');
  });

  it('has no limit by the other rules unless the switch states one', () => {
    const ieee = { rules: 'ieee' as const, bank: { stages: [plain], interStageUh: 2 } };
    expect(assessed(ieee).duties.some(({ name }) => name === 'inrush current')).toBe(false);
    const stated = { ...ieee, bank: { stages: [{ ...plain, switchPeakA: 500 }], interStageUh: 2 } };
    expect(duty(assessed(stated), 'inrush current').verdict).toBe('avoid');
  });
});

describe('plain stages beside distorting loads', () => {
  // 1 000 kVA at 400 V are 1 443.4 A: 15 % are 216.5 A.
  const drives = (fundamentalA: number): Site['loads'] => ({
    distorting: [{ name: 'drives', fundamentalA, orders: [{ orderH: 25, pct: 0.01 }] }],
    backgroundPct: [],
  });
  const bank = { stages: [{ count: 1, ratedKvar: 25, ratedV: 525 }], interStageUh: 20 };

  it.each([
    [216, 'clear'],
    [217, 'watch'],
  ])('%d A on 1 000 kVA is %s', (fundamentalA, verdict) => {
    const result = assessed({ loads: drives(fundamentalA), bank });
    expect(codes(result).includes('plain.distortingShare')).toBe(verdict === 'watch');
    expect(result.verdict).toBe(verdict);
  });

  it('does not concern tuned ones', () => {
    expect(assessed({ loads: drives(400) }).verdict).toBe('clear');
  });
});

describe('a peak of the impedance near an order that is present', () => {
  // 10 MVA with 100 kvar at nominal: order 10 with C as given, from 9.53 to 10.26 in the corners.
  const peakAt = (orderH: number): Outcome['result'] =>
    assessed({
      supply: { faultLevelMva: { max: 10 }, rOverX: 0.05 },
      loads: {
        distorting: [{ name: 'tone', fundamentalA: 1, orders: [{ orderH, pct: 0.001 }] }],
        backgroundPct: [],
        dampingKw: { max: 0 },
      },
      bank: { stages: [{ count: 1, ratedKvar: 172.265625, ratedV: 525 }], interStageUh: 20 },
    });

  it('is within 0.3 of an order in some corner: watch', () => {
    for (const orderH of [9.3, 10, 10.5]) {
      const result = peakAt(orderH);
      expect(codes(result), `order ${orderH}`).toContain('peak.near');
      expect(result.verdict).toBe('watch');
    }
  });

  it('is farther than 0.3 in every corner: clear', () => {
    for (const orderH of [9.1, 10.7]) expect(peakAt(orderH).verdict, `order ${orderH}`).toBe('clear');
  });

  it('names the level, the corner and both orders', () => {
    const { values } = peakAt(10).reasons.find(({ code }) => code === 'peak.near')!;
    expect(values.presentOrderH).toBe(10);
    expect(Math.abs(Number(values.peakOrderH) - 10)).toBeLessThanOrEqual(0.3);
    expect(Number(values.levelKvar)).toBeCloseTo(100, 9);
  });
});

describe('a limit of the capacitor', () => {
  it('at its edge is near, past it exceeded; voltages are near from 95 % on', () => {
    // One plain stage: continuous voltage is 400/U_N whatever else happens.
    const at = (ratedV: number): Duty =>
      duty(
        assessed({ bank: { stages: [{ count: 1, ratedKvar: 25, ratedV }], interStageUh: 20 } }),
        'capacitor voltage, continuous',
      );
    expect(at(400).ratio).toBe(1);
    expect(at(400).verdict).toBe('watch');
    expect(at(399.9).verdict).toBe('avoid');
    expect(at(400 / 0.951).verdict).toBe('watch');
    expect(at(400 / 0.949).verdict).toBe('clear');
  });

  it('is judged with the corner’s own reactor ratio', () => {
    // 7 % are 7.93 % at +10 % C and +3 % L: 430.1 V nominal, 434.5 V there.
    const row = duty(assessed({ bank: { stages: [{ ...tuned, ratedV: 432 }] } }), 'capacitor voltage, continuous');
    expect(row.value).toBeCloseTo(400 / (1 - 0.07 * 1.1 * 1.03), 9);
    expect(row.verdict).toBe('avoid');
  });

  it('of a reactor is judged only where it is given', () => {
    expect(duty(assessed({}), 'reactor current').verdict).toBeNull();
    expect(duty(assessed({}), 'reactor current').limit).toBeNull();
    const weak = assessed({ bank: { stages: [{ ...tuned, reactorMaxA: 5 }], interStageUh: 20 } });
    expect(duty(weak, 'reactor current').verdict).toBe('avoid');
    expect(weak.verdict).toBe('avoid');
  });

  it('of a discharge resistor is judged only where it is given', () => {
    expect(assessed({}).duties.some(({ name }) => name === 'discharge')).toBe(false);
    const { requiredOhm } = assessed({}).charge.stages[0]!;
    const fitted = (ohm: number): Duty =>
      duty(
        assessed({
          control: { reconnectDelayS: 240 },
          bank: { stages: [{ ...tuned, dischargeOhm: ohm }], interStageUh: 20 },
        }),
        'discharge',
      );
    expect(fitted(requiredOhm * 0.999).verdict).toBe('clear');
    expect(fitted(requiredOhm * 1.001).verdict).toBe('avoid');
  });
});

describe('a shorter reconnection delay than the standard’s own resistor allows', () => {
  it('is kept, and the resistor it needs is named', () => {
    const result = assessed({ control: { reconnectDelayS: 60 } });
    expect(result.control.reconnectDelayS).toBe(60);
    const found = result.reasons.find(({ code }) => code === 'reconnection.short')!;
    expect(found.values.requiredOhm).toBe(result.charge.stages[0]!.requiredOhm);
    expect(result.charge.stages[0]!.requiredOhm).toBeCloseTo(result.charge.stages[0]!.reconnectMaxOhm!, 9);
  });

  it('is no matter where the resistor is stated and fast enough', () => {
    const stages = [{ ...tuned, dischargeOhm: 30_000 }];
    const result = assessed({ control: { reconnectDelayS: 60 }, bank: { stages, interStageUh: 20 } });
    expect(codes(result)).not.toContain('reconnection.short');
    expect(duty(result, 'discharge').verdict).toBe('clear');
  });

  it('defaults to the time of the stated resistor, or of the standard’s', () => {
    const stages = [{ ...tuned, dischargeOhm: 30_000 }];
    const stated = assessed({ bank: { stages, interStageUh: 20 } });
    const c = stated.charge.stages[0]!.capacitanceUf * 1e-6;
    expect(stated.control.reconnectDelayS).toBeCloseTo(30_000 * c * Math.log(Math.SQRT2 / 0.1), 9);
    // 525 V from √2·525 to 52.5 V with the resistor that reaches 75 V in 180 s.
    const standard = (180 * Math.log(Math.SQRT2 * 10)) / Math.log((Math.SQRT2 * 525) / 75);
    expect(assessed({}).control.reconnectDelayS).toBeCloseTo(standard, 9);
  });
});

describe('over-correction', () => {
  it('is said where it happens', () => {
    const record = madeRecord({ activeKw: [10, 10], reactiveKvar: [5, 5] });
    const site = madeSite({
      bank: { stages: [{ count: 1, ratedKvar: 50, ratedV: 525, fixed: true }, tuned], interStageUh: 20 },
    });
    const { result } = assessBank(site, record, UTC_TABLE);
    expect(codes(result)).toContain('operation.overCorrection');
    expect(result.operation.minResidualKvar).toBeCloseTo(5 - 50 * (400 / 525) ** 2, 9);
    expect(result.operation.leadingKvarh).toBeCloseTo(0.5 * (50 * (400 / 525) ** 2 - 5), 9);
  });
});
