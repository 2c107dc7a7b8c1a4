// Measurement and ageing on whole assessments of invented sites.
import { describe, expect, it } from 'vitest';
import type { BankInput } from '#libs/engine/index.js';
import { assessedSite, BANK, LOADS, reasonCodes } from '../support/assessed-site.js';
import { chance } from '../support/chance.js';
import { runs, SEED } from '../support/soak.js';

const plain = assessedSite();

describe('a measurement', () => {
  const level = plain.network.levels.find(({ levelKvar, case: name }) => levelKvar === 0 && name === 'nominal')!;
  const read = (factor: number, extra: { orderH: number; pct: number }[] = []) => ({
    bankKvar: 0,
    voltagePct: [...level.orders.map(({ orderH, voltagePct }) => ({ orderH, pct: factor * voltagePct })), ...extra],
    currentA: level.orders.map(({ orderH, sourceA }) => ({ orderH, a: factor * sourceA })),
  });
  const measured = (given: ReturnType<typeof read>) => assessedSite({ loads: { ...LOADS, measured: given } });

  it('of what the model computes agrees with it in every row', () => {
    const { measured: check, verdict } = measured(read(1));
    expect(check!.rows).toHaveLength(2 * level.orders.length);
    for (const row of check!.rows) {
      expect(row.standing).toBe('within');
      expect(Math.abs(row.differencePct!)).toBeLessThan(1e-9);
    }
    expect(verdict).toBe('clear');
  });

  it('above every corner is a finding, and the verdict never better than near a limit', () => {
    const result = measured(read(3));
    expect(result.measured!.rows.some(({ standing }) => standing === 'above')).toBe(true);
    expect(reasonCodes(result)).toContain('measured.above');
    expect(result.verdict).toBe('watch');
  });

  it('of an order the model has nothing at is above it', () => {
    const result = measured(read(1, [{ orderH: 3, pct: 2 }]));
    expect(result.measured!.rows.find(({ orderH }) => orderH === 3)).toMatchObject({ computed: 0, standing: 'above' });
  });

  it('is never summed with the sources: whatever it reads, network and duties stay to the bit', () => {
    const random = chance(SEED);
    for (let k = 0; k < runs(4, 40); k++) {
      const result = measured(
        read(
          random.between(0, 20),
          [{ orderH: random.whole(2, 49), pct: random.between(0, 9) }].filter(
            ({ orderH }) => !level.orders.some((order) => order.orderH === orderH),
          ),
        ),
      );
      expect(result.network).toEqual(plain.network);
      expect(result.duties).toEqual(plain.duties);
    }
  });

  it('would show in the network if it were summed (control)', () => {
    const more = [...LOADS.distorting!, { name: 'as read', fundamentalA: 100, orders: [{ orderH: 5, pct: 20 }] }];
    expect(assessedSite({ loads: { ...LOADS, distorting: more } }).network).not.toEqual(plain.network);
  });

  it('with a bank in is compared at that level, and at no other', () => {
    const kvar = plain.bank.levelsKvar[2]!;
    const at = (bankKvar: number) => assessedSite({ loads: { ...LOADS, measured: { ...read(1), bankKvar } } });
    expect(at(kvar + 0.3).measured!.levelKvar).toBe(kvar);
    expect(at(kvar + 5).measured).toMatchObject({ levelKvar: null, rows: [] });
    expect(reasonCodes(at(kvar + 5))).toContain('measured.noLevel');
  });
});

describe('ageing', () => {
  it('moves ratio and tuned order with the capacitance: 7 % at 80 % left is order 4.23', () => {
    const { cases } = assessedSite({ bank: { ...BANK, installed: true } }).ageing;
    expect(cases.map(({ group }) => group)).toEqual([null, 0, 1]);
    for (const aged of cases) {
      expect(aged.capacitanceFactor).toBe(0.8);
      expect(aged.reactorPct).toBeCloseTo(5.6, 9);
      expect(aged.tunedOrderH).toBeCloseTo(4.226, 3);
    }
  });

  it('takes 90 % for a new bank, and what was measured where it was', () => {
    expect(plain.ageing.cases.map(({ capacitanceFactor, from }) => [capacitanceFactor, from])).toEqual(
      Array.from({ length: 3 }, () => [0.9, 'new']),
    );
    const [first, second] = BANK.stages as [BankInput['stages'][0], BankInput['stages'][0]];
    const nameplateUf = plain.charge.stages[1]!.capacitanceUf;
    const stages = [first, { ...second, measuredUf: 0.7 * nameplateUf }];
    const aged = assessedSite({ bank: { stages } }).ageing.cases[2]!;
    expect(aged).toMatchObject({ from: 'measured', group: 1 });
    expect(aged.capacitanceFactor).toBeCloseTo(0.7, 12);
  });

  it('takes what was measured of each stage over the years, and the end of life of a stage that was not', () => {
    const [first, second] = BANK.stages as [BankInput['stages'][0], BankInput['stages'][0]];
    // I = U/(√3·(X_C/left − X_L)) with X_C = U_N²/Q_N, as a clamp meter reads it on a stage with that much left.
    const amps = (left: number): number => 400 / (Math.sqrt(3) * (480 ** 2 / 50_000) * (1 / left - 0.07));
    const reading = (stage: number, date: string, left: number) => {
      const lineA: [number, number, number] = [amps(left), amps(left), amps(left)];
      return { stage, date, busV: 400, lineA };
    };
    const judged = (measurements: ReturnType<typeof reading>[]) =>
      assessedSite({
        asOf: '2026-01-31',
        bank: { stages: [first, { ...second, commissioned: '2016-01-01', measurements }], installed: true },
      }).ageing;
    const some = judged([reading(2, '2020-01-01', 0.95), reading(2, '2024-01-01', 0.91)]);
    expect(some.cases[2]).toMatchObject({ from: 'installed', capacitanceFactor: 0.8 });
    const [history] = some.measured;
    expect(history).toMatchObject({ group: 1, stage: 2, rateFrom: 'measurements' });
    // 4 % in the 1 461 days between.
    expect(history!.lossPctPerYear).toBeCloseTo(1, 9);
    expect(history!.points.map(({ ratedKvar }) => ratedKvar)).toEqual([
      expect.closeTo(47.5, 9),
      expect.closeTo(45.5, 9),
    ]);
    const low = judged([reading(3, '2024-01-01', 0.72)]);
    expect(low.cases[2]).toMatchObject({ from: 'measured', capacitanceFactor: expect.closeTo(0.72, 12) });
    expect(low.measured[0]).toMatchObject({ rateFrom: 'nameplate', lossPctPerYear: expect.closeTo(28 / 8, 2) });
    const whole = judged([1, 2, 3].map((stage) => reading(stage, '2024-01-01', 0.97 - 0.01 * stage)));
    expect(whole.cases[2]).toMatchObject({ from: 'measured', capacitanceFactor: expect.closeTo(0.94, 12) });
  });

  it('leaves the verdict alone: it stands beside the corners, not among them', () => {
    const { installed, ...result } = { installed: assessedSite({ bank: { ...BANK, installed: true } }), ...plain };
    expect(installed.verdict).toBe(result.verdict);
    expect(installed.duties).toEqual(result.duties);
  });

  // Second method: the aged bank written out as a site of its own and assessed whole.
  it('finds the capacitance at which a stage must come out: worse just below it, as it was just above', () => {
    const { stages } = plain.ageing;
    const verdictAt = (pct: number): string => {
      const [first, second] = BANK.stages as [BankInput['stages'][0], BankInput['stages'][0]];
      const left = { ...second, count: 1, ratedKvar: (second.ratedKvar * pct) / 100, reactorPct: (7 * pct) / 100 };
      const { duties } = assessedSite({ bank: { stages: [first, { ...second, count: 2 }, left], interStageUh: 2 } });
      return duties.some(({ verdict }) => verdict === 'avoid' || verdict === 'watch') ? 'worse' : 'clear';
    };
    const { comesOutPct, comesOutUf } = stages[1]!;
    expect(comesOutPct).not.toBeNull();
    expect(verdictAt(comesOutPct! + 0.05)).toBe('clear');
    expect(verdictAt(comesOutPct! - 0.05)).toBe('worse');
    expect(comesOutUf! / plain.charge.stages[1]!.capacitanceUf).toBeCloseTo(comesOutPct! / 100, 12);
  });

  // Second method: the same bank written out and assessed whole. At order 4.6 next to nothing flows, so that only a peak of
  // |Z| near it can speak against a stage whose tuned order has moved up towards it.
  it('of one stage alone is judged whole: a peak that comes near an order present is seen', () => {
    const [first, second] = BANK.stages as [BankInput['stages'][0], BankInput['stages'][0]];
    const orders = [
      { orderH: 4.6, pct: 0.01 },
      { orderH: 11, pct: 4 },
    ];
    const loads = { distorting: [{ name: 'drives', fundamentalA: 100, orders }], backgroundPct: [] };
    for (const [pct, verdict] of [
      [90, 'clear'],
      [70, 'watch'],
    ] as const) {
      const measuredUf = (plain.charge.stages[1]!.capacitanceUf * pct) / 100;
      const bank = { stages: [first, { ...second, measuredUf }], interStageUh: 2 };
      const left = { ...second, count: 1, ratedKvar: (second.ratedKvar * pct) / 100, reactorPct: (7 * pct) / 100 };
      const written = assessedSite({
        loads,
        bank: { stages: [first, { ...second, count: 2 }, left], interStageUh: 2 },
      });
      expect(written.verdict).toBe(verdict);
      expect(reasonCodes(written).includes('peak.near')).toBe(verdict === 'watch');
      expect(written.duties.every((duty) => duty.verdict === 'clear' || duty.verdict === null)).toBe(true);
      expect(assessedSite({ loads, bank }).ageing.cases[2]!.verdict, `${pct} %`).toBe(verdict);
    }
  });

  it('tells of a stage that was measured below that', () => {
    const [first, second] = BANK.stages as [BankInput['stages'][0], BankInput['stages'][0]];
    const atPct = (pct: number) => {
      const measuredUf = (plain.charge.stages[1]!.capacitanceUf * pct) / 100;
      return reasonCodes(assessedSite({ bank: { stages: [first, { ...second, measuredUf }] } }));
    };
    expect(atPct(plain.ageing.stages[1]!.comesOutPct! - 1)).toContain('ageing.takeOut');
    expect(atPct(plain.ageing.stages[1]!.comesOutPct! + 1)).not.toContain('ageing.takeOut');
  });
});
