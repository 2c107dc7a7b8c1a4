// Bounds of a bill and sums of an equipment list, worked by hand.
// - Input of a motor P = P_N/η, its kvar P·tan φ, needed kvar P·(tan φ₁ − tan φ₂): textbook formulas; the factors per kW
//   are those of a plant engineer's table (US guide of November 2010, table 6; seen), 0.65→0.95 0.84 by difference of the
//   printed 0.65→1.00 1.169 and 0.95→1.00 0.329.
// - The bill of 100 000 kWh and 60 000 kvarh is the example of public kvarh tariffs: 27 132 kvarh lie beyond 0.32868.
import { describe, expect, it } from 'vitest';
import { zoneTable } from '#libs/contract/time-zone.js';
import {
  billBounds,
  InputProblem,
  listNeed,
  type MonthlyBill,
  primaryFromBus,
  type TransformerPassage,
  UTC_TABLE,
} from '#libs/engine/index.js';

const BUS = { at: 'bus' as const };
const TARGET = { powerFactor: 0.95, onExport: 'importOnly' as const };
const bill = (parts: Partial<MonthlyBill> = {}): MonthlyBill => ({
  month: '2025-06',
  activeKwh: 100_000,
  laggingKvarh: 60_000,
  maxKw: 300,
  ...parts,
});
const bounds = (parts: Partial<MonthlyBill> = {}, addedKvar = 0) =>
  billBounds([bill(parts)], { zone: UTC_TABLE, targetPowerFactor: 0.95, addedKvar })[0]!;

describe('a bill of 100 000 kWh and 60 000 kvarh in June', () => {
  it('needs at least 27 132 kvarh over 720 h, 37.68 kvar', () => {
    expect(bounds().hours).toBe(720);
    expect(bounds().lowerKvar * 720).toBeCloseTo(27_132, 0);
    expect(bounds().lowerKvar).toBeCloseTo(37.68, 2);
  });

  it('needs at most 300 kW · (0.6 − 0.328684) = 81.395 kvar if its peak has its factor', () => {
    expect(bounds().peakKvar).toBeCloseTo(180, 9);
    expect(bounds().upperKvar).toBeCloseTo(81.395, 3);
  });

  it('with 350 kVA in place of kW: λ = 1/√1.36 = 0.857493 gives 300.1225 kW and 81.428 kvar', () => {
    const given = bounds({ maxKw: undefined, maxKva: 350 } as Partial<MonthlyBill>);
    expect(given.powerFactorLagging).toBeCloseTo(0.857_493, 6);
    expect(given.maxKw).toBeCloseTo(300.1225, 3);
    expect(given.upperKvar).toBeCloseTo(81.428, 3);
  });

  it('with 500 kVA beside 300 kW the triangle 3-4-5 gives 400 kvar at the peak, 400 − 98.61 needed', () => {
    const given = bounds({ maxKva: 500 });
    expect(given.peakKvar).toBeCloseTo(400, 9);
    expect(given.upperKvar).toBeCloseTo(400 - 98.605, 2);
  });

  it('with 305 kVA the peak is better than the month, and the month’s factor still counts', () => {
    expect(bounds({ maxKva: 305 }).peakKvar).toBeCloseTo(55, 0);
    expect(bounds({ maxKva: 305 }).upperKvar).toBeCloseTo(81.395, 3);
  });

  it('an old bank of 50 kvar that was connected throughout adds to both bounds', () => {
    expect(bounds({}, 50).lowerKvar).toBeCloseTo(87.68, 2);
    expect(bounds({}, 50).upperKvar).toBeCloseTo(131.395, 3);
  });

  it('a month at the target already needs nothing', () => {
    expect(bounds({ laggingKvarh: 30_000 })).toMatchObject({ lowerKvar: 0, upperKvar: 0 });
  });
});

describe('the hours of a bill’s month', () => {
  const zone = zoneTable('Europe/Dublin', Date.UTC(2025, 0, 1) / 1000, Date.UTC(2025, 11, 31) / 1000);
  const hoursOf = (month: string) =>
    billBounds([bill({ month })], { zone, targetPowerFactor: 0.95, addedKvar: 0 })[0]!.hours;

  it('are an hour fewer where the clock goes forward, an hour more where it goes back', () => {
    expect([hoursOf('2025-02'), hoursOf('2025-03'), hoursOf('2025-06'), hoursOf('2025-10')]).toEqual([
      672, 743, 720, 745,
    ]);
  });
});

describe('a bill that contradicts itself', () => {
  const problemsOf = (parts: Partial<MonthlyBill>) => {
    try {
      return [bounds(parts)] as unknown[];
    } catch (error) {
      return (error as InputProblem).problems;
    }
  };

  it('is refused where its mean, 138.9 kW, is above its greatest demand', () => {
    expect(problemsOf({ maxKw: 120 })).toMatchObject([
      { code: 'inconsistent', path: 'estimate.bills[0].maxKw', found: '120', unit: 'kW' },
    ]);
  });

  it('is refused where the kVA of its means, 162, are above its greatest kVA', () => {
    expect(problemsOf({ maxKva: 150 })).toMatchObject([{ path: 'estimate.bills[0].maxKva' }]);
  });

  it('is taken where only rounding stands between them', () => {
    expect(problemsOf({ maxKw: 138.5 })).toMatchObject([{ month: '2025-06' }]);
  });
});

describe('an equipment list', () => {
  it('a 75 kW motor of 93.75 % at 0.65 takes 80 kW, 93.5 kvar, and 0.84 kvar a kW to reach 0.95', () => {
    const list = listNeed([{ name: 'pump', ratedKw: 75, efficiencyPct: 93.75, powerFactor: 0.65 }], BUS, TARGET);
    expect(list.activeKw).toBeCloseTo(80, 9);
    expect(list.reactiveKvar).toBeCloseTo(80 * 1.169, 1);
    expect(Math.abs(list.neededKvar / 80 - 0.84)).toBeLessThan(0.0015);
  });

  // 4·22/0.88·0.75·0.8 = 60 kW at 0.8: 45 kvar. 30/1 = 30 kW of heaters, none. 90 kW and 45 kvar: 45 − 29.58 needed.
  it('adds motors at part load and heaters that take no kvar', () => {
    const list = listNeed(
      [
        {
          name: 'motors',
          count: 4,
          ratedKw: 22,
          efficiencyPct: 88,
          powerFactor: 0.8,
          loadFactor: 0.75,
          coincidence: 0.8,
        },
        { name: 'heaters', ratedKw: 30, efficiencyPct: 100, powerFactor: 1 },
      ],
      BUS,
      TARGET,
    );
    expect(list.rows.map(({ activeKw, reactiveKvar }) => [activeKw, reactiveKvar])).toEqual([
      [expect.closeTo(60, 9), expect.closeTo(45, 9)],
      [30, 0],
    ]);
    expect(list.powerFactor).toBeCloseTo(90 / Math.hypot(90, 45), 12);
    expect(list.neededKvar).toBeCloseTo(45 - 90 * 0.328_684, 4);
  });

  it('metered at the primary the need brings the meter to its target, the transformer’s own kvar included', () => {
    const passage: TransformerPassage = { baseKva: 250, noLoadKw: 0.5, noLoadKvar: 4, rPu: 0.012, xPu: 0.04 };
    const entry = { name: 'pumps', ratedKw: 150, efficiencyPct: 94, powerFactor: 0.85 };
    const list = listNeed([entry], { at: 'primary', passage }, TARGET);
    const meter = primaryFromBus(passage, list.activeKw, list.reactiveKvar - list.neededKvar)!;
    expect(meter.activeKw / Math.hypot(meter.activeKw, meter.reactiveKvar)).toBeCloseTo(0.95, 9);
    expect(list.neededKvar).toBeGreaterThan(listNeed([entry], BUS, TARGET).neededKvar);
  });

  it('beyond what the transformers can carry is refused at its path', () => {
    const passage: TransformerPassage = { baseKva: 100, noLoadKw: 0, noLoadKvar: 0, rPu: 0.01, xPu: 0.06 };
    const entry = { name: 'all', ratedKw: 5000, efficiencyPct: 90, powerFactor: 0.7 };
    expect(() => listNeed([entry], { at: 'primary', passage }, TARGET)).toThrow(InputProblem);
    expect(() => listNeed([entry], { at: 'primary', passage }, TARGET)).toThrow(/estimate\.equipment/);
  });
});
