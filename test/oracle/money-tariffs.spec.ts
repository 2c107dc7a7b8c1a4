/*
 * Public electricity schedules and printed bills, each typed from the source named beside it.
 * Seen in a public copy unless "from memory" is said. Prices are those of the source; where a schedule is quoted without
 * a worked bill the expected value is its own arithmetic on round quantities, written out beside it.
 */
import { describe, expect, it } from 'vitest';
import type { Clause, Scale } from '#libs/engine/index.js';
import { amountsOf, billOf, madeMeter, steadyApril } from '../support/priced-meter.js';

/*
 * Spain: access tariffs, reactive term (Real Decreto 1164/2001, article 9.3: kvarh beyond 33 % of the kWh, the excess
 * alone), prices 0.041554 EUR/kvarh, and 0.062332 below cos φ 0.80, worked on 3 000 kWh and 1 500 kvarh (fornieles.es).
 */
describe('Spain, reactive term', () => {
  const clause: Clause = {
    name: 'reactiva',
    kind: 'kvarhBeyondRatio',
    cumulative: false,
    tiers: [
      { aboveRatio: 0.33, pricePerUnit: 0.041554 },
      { aboveRatio: 0.75, pricePerUnit: 0.062332 },
    ],
  };

  it('prices 510 of 1 500 kvarh, 990 being free', () => {
    const { lines } = billOf({ clauses: [clause] }, steadyApril({ activeKwh: 3000, laggingKvarh: 1500 })).months[0]!;
    expect(lines[0]!.quantity).toBeCloseTo(510, 9);
    expect(lines[0]!.amount).toBe(21.19);
  });

  it('prices the whole excess at the higher price past 0.75 kvarh a kWh', () => {
    // 2 400 − 990 = 1 410 kvarh, all at 0.062332
    expect(amountsOf([clause], steadyApril({ activeKwh: 3000, laggingKvarh: 2400 }))).toEqual({ reactiva: 87.89 });
  });
});

/*
 * Malaysia: power factor surcharge of the national utility below 132 kV (tariff book; the utility's own three examples
 * on a bill of 2 000): 1.5 % of the bill for every 0.01 below 0.85 and 3 % for every 0.01 below 0.75.
 */
describe('Malaysia, surcharge on the bill', () => {
  const scale: Scale = {
    form: 'points',
    reference: 0.85,
    below: [
      { downTo: 0.75, pctPerPoint: 1.5 },
      { downTo: 0, pctPerPoint: 3 },
    ],
  };

  it.each([
    [0.8, 150],
    [0.75, 300],
    [0.6, 1200],
  ])('at a factor of %f adds %f to 2 000', (powerFactor, surcharge) => {
    const meter = steadyApril({ activeKwh: 10_000, laggingKvarh: 10_000 * Math.sqrt(1 / powerFactor ** 2 - 1) });
    const clauses: Clause[] = [
      { name: 'current bill', kind: 'energy', pricePerUnit: 0.2 },
      { name: 'surcharge', kind: 'percent', applies: 'all', scale },
    ];
    expect(amountsOf(clauses, meter)).toEqual({ 'current bill': 2000, surcharge });
  });
});

/*
 * Mexico: recargo 60·(0.9/FP − 1) up to 120 %, bonificación 25·(1 − 0.9/FP) up to 2.5 %, to one decimal: the federal
 * utility's general rules of application, from memory. An industrial bill of January 2004 published as a worked example
 * (331 383.84 + 87 151.61 for energy and demand), and the bonus of a published bill at 97.83 %.
 */
describe('Mexico, surcharge and bonus', () => {
  const scale: Scale = {
    form: 'ratio',
    reference: 0.9,
    belowPct: 60,
    abovePct: 25,
    pctDecimals: 1,
    minPct: -2.5,
    maxPct: 120,
  };
  const clauses: Clause[] = [
    { name: 'energía', kind: 'fixed', amountPerMonth: 331_383.84 },
    { name: 'demanda', kind: 'fixed', amountPerMonth: 87_151.61 },
    { name: 'factor', kind: 'percent', applies: ['energía', 'demanda'], scale },
  ];
  const factor = { basis: 'energy', decimals: 4 } as const;

  it('charges 15.6 % at 0.7145', () => {
    const meter = steadyApril({ activeKwh: 495_192, laggingKvarh: 484_884 });
    const [month] = billOf({ clauses, factor }, meter).months;
    expect(month!.quantities.powerFactor).toBe(0.7145);
    expect(month!.lines[2]).toMatchObject({ quantity: 15.6, unit: '%', amount: 65_291.53 });
  });

  it('gives back 2.0 % at 0.9783', () => {
    const meter = steadyApril({ activeKwh: 10_000, laggingKvarh: 10_000 * Math.sqrt(1 / 0.9783 ** 2 - 1) });
    expect(billOf({ clauses, factor }, meter).months[0]!.lines[2]!.quantity).toBe(-2);
  });
});

/*
 * Québec: the utility's general rates for medium power, April 2012: the billing demand is the greater of the greatest
 * kW and 90 % of the greatest kVA, and not less than 65 % of the winter's greatest; energy 210 000 kWh at 4.10 ¢, the
 * rest at 3.19 ¢. The price of a kW is from memory.
 */
describe('Québec, medium power', () => {
  const clauses: Clause[] = [
    { name: 'power', kind: 'demand', basis: 'kWOrKvaShare', kvaShare: 0.9, pricePerUnit: 14 },
    {
      name: 'energy',
      kind: 'energy',
      blocks: [
        { upTo: 210_000, pricePerUnit: 0.041 },
        { upTo: null, pricePerUnit: 0.0319 },
      ],
    },
  ];

  it('bills 90 % of the kVA where the kW are fewer', () => {
    // 400 kW and 300 kvar: 500 kVA, 450 kW billed; 288 000 kWh: 210 000 · 0.041 + 78 000 · 0.0319
    const meter = steadyApril({ activeKwh: 288_000, laggingKvarh: 216_000 });
    expect(amountsOf(clauses, meter)).toEqual({ power: 6300, energy: 11_098.2 });
  });

  it('bills the kW where they are more', () => {
    // 400 kW and 100 kvar: 412.31 kVA, of which 90 % are 371.08
    const meter = steadyApril({ activeKwh: 288_000, laggingKvarh: 72_000 });
    expect(amountsOf(clauses, meter)).toMatchObject({ power: 5600 });
  });
});

/*
 * Thailand: general service of the metropolitan utility (testmeaor.mea.or.th): 56.07 baht for each kvar of the greatest
 * 15-minute reactive demand beyond 61.97 % of the greatest kW, to the nearest whole kvar.
 */
describe('Thailand, kvar beyond a share of the kW', () => {
  it('prices 102 of 350 kvar beside 400 kW', () => {
    // 350 − 0.6197 · 400 = 102.12, to the nearest whole 102; 102 · 56.07
    const clause: Clause = {
      name: 'power factor',
      kind: 'kvarBeyondRatio',
      ratio: 0.6197,
      wholeUnits: 'nearest',
      pricePerUnit: 56.07,
    };
    const meter = steadyApril({ activeKwh: 400 * 720, laggingKvarh: 350 * 720 });
    expect(amountsOf([clause], meter)).toEqual({ 'power factor': 5719.14 });
  });
});

/*
 * A public utility district of Oregon, schedule 92 of October 2011 (crpud.net): the billing demand rises by one
 * percentage point for each percentage point or fraction of it by which the average power factor is below 95 %.
 */
describe('a US public utility, demand by points', () => {
  const clause = (count: 'exact' | 'orPart'): Clause => ({
    name: 'demand',
    kind: 'demand',
    basis: 'kW',
    pricePerUnit: 1,
    scale: { form: 'points', reference: 0.95, below: [{ downTo: 0, pctPerPoint: 1 }], count },
  });
  const at = (powerFactor: number) =>
    steadyApril({ activeKwh: 500 * 720, laggingKvarh: 500 * 720 * Math.sqrt(1 / powerFactor ** 2 - 1) });

  it('bills 565 kW for 500 kW at 0.82', () => {
    expect(amountsOf([clause('orPart')], at(0.82))).toEqual({ demand: 565 });
  });

  it('counts a fraction of a point as a point', () => {
    expect(amountsOf([clause('orPart')], at(0.815))).toEqual({ demand: 570 });
    expect(amountsOf([clause('exact')], at(0.815))).toEqual({ demand: 567.5 });
  });
});

/*
 * Great Britain: distribution use of system, reactive units beyond a third of the kWh or beyond √(1/0.95² − 1) of them
 * (0.32868), and other free ratios in use; quantities only (arithmetic on 100 000 kWh and 60 000 kvarh).
 */
describe('kvarh beyond a free ratio', () => {
  it.each([
    [0.33, 27_000],
    [1 / 3, 26_667],
    [Math.sqrt(1 / 0.95 ** 2 - 1), 27_132],
    [0.4, 20_000],
    [0.5, 10_000],
  ])('of %f leave %f of 60 000 to be paid', (freeRatio, excess) => {
    const clause: Clause = { name: 'reactive', kind: 'kvarhBeyondRatio', freeRatio, pricePerUnit: 1 };
    const meter = steadyApril({ activeKwh: 100_000, laggingKvarh: 60_000 });
    expect(billOf({ clauses: [clause] }, meter).months[0]!.lines[0]!.quantity).toBeCloseTo(excess, 0);
  });
});

/*
 * Brazil: excess reactive energy by the hour (ANEEL, Resolução Normativa 414/2010): Σ active energy of the hour ×
 * (0.92/f − 1) × price, hours at or above 0.92 adding nothing.
 */
describe('Brazil, reactive energy by the hour', () => {
  const clause: Clause = {
    name: 'excedente',
    kind: 'energyByFactor',
    per: 'hour',
    pricePerUnit: 0.3,
    scale: { form: 'ratio', reference: 0.92, belowPct: 100, abovePct: 0 },
  };

  it('does not let a good hour pay for a bad one', () => {
    // 100 kWh at 0.80 in every other hour: 100 · (0.92/0.80 − 1) = 15 kWh an hour, 360 hours, 0.30 each; the others at unity
    const even = Array.from({ length: 720 }, (_, i) => i % 2 === 0);
    const meter = madeMeter(
      { activeKw: even.map(() => 100), laggingKvar: even.map((bad) => (bad ? 75 : 0)) },
      { begin: '2024-04-01T00:00Z', intervalS: 3600 },
    );
    expect(amountsOf([clause], meter)).toEqual({ excedente: 1620 });
    // by the month the two would have cancelled: 72 000 kWh, 27 000 kvarh, a factor of 0.936
    expect(amountsOf([{ ...clause, per: 'month' }], meter)).toEqual({ excedente: 0 });
  });
});

/*
 * Kerala: incentive and disincentive of the state's commission for high tension: 0.5 % of the energy charge back for each
 * 0.01 above 0.90, 1 % more for each 0.01 below (the schedule does not say whether bands add up; one band here).
 */
describe('Kerala, bands around a reference', () => {
  const scale: Scale = {
    form: 'points',
    reference: 0.9,
    below: [{ downTo: 0, pctPerPoint: 1 }],
    above: [{ upTo: 1, pctPerPoint: -0.5 }],
  };

  it.each([
    [0.85, 500],
    [0.95, -250],
    [0.9, 0],
  ])('at %f turns 10 000 into %f more', (powerFactor, more) => {
    const meter = steadyApril({ activeKwh: 20_000, laggingKvarh: 20_000 * Math.sqrt(1 / powerFactor ** 2 - 1) });
    const clauses: Clause[] = [
      { name: 'energy', kind: 'energy', pricePerUnit: 0.5 },
      { name: 'factor', kind: 'percent', applies: ['energy'], scale },
    ];
    expect(amountsOf(clauses, meter, { factor: { decimals: 4 } })).toEqual({ energy: 10_000, factor: more });
  });
});

/* Demand taken to a reference factor, common in US schedules: kW × 0.90/λ (arithmetic on round values). */
describe('demand to a reference factor', () => {
  it('of 0.90 bills 600 kW for 500 kW at 0.75', () => {
    const clause: Clause = {
      name: 'demand',
      kind: 'demand',
      basis: 'kW',
      pricePerUnit: 1,
      scale: { form: 'ratio', reference: 0.9, belowPct: 100, abovePct: 100 },
    };
    const meter = steadyApril({ activeKwh: 500 * 720, laggingKvarh: 500 * 720 * Math.sqrt(1 / 0.75 ** 2 - 1) });
    expect(amountsOf([clause], meter)).toEqual({ demand: 600 });
    expect(amountsOf([{ ...clause, scale: undefined, basis: 'kVA' }], meter)).toEqual({ demand: 666.67 });
  });
});
