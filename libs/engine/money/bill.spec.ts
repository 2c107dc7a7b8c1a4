import { describe, expect, it } from 'vitest';
import { zoneTable } from '#libs/contract/time-zone.js';
import { amountsOf, billOf, madeMeter, steadyApril } from '../../../test/support/priced-meter.js';
import { InputProblem } from '../problem.js';
import type { Clause, Tariff } from './papers.js';

const HOURLY = { begin: '2024-04-01T00:00Z', intervalS: 3600 };
const of = (...values: number[]) => ({ activeKw: values });
const constant = (hours: number, kw = 10) => ({ activeKw: new Array<number>(hours).fill(kw) });
const energy = (name: string, rest: Partial<Clause> = {}): Clause =>
  ({ name, kind: 'energy', pricePerUnit: 1, ...rest }) as Clause;

function problemOf(tariff: Tariff, meter = steadyApril({ activeKwh: 720 })) {
  try {
    billOf(tariff, meter);
  } catch (error) {
    if (error instanceof InputProblem) return error.problems[0]!;
    throw error;
  }
  throw new Error('the tariff was accepted');
}

describe('a month of a bill', () => {
  it('that the record covers in part takes fixed amounts, demand and block limits by that part, energies as measured', () => {
    // ten days of April: a third
    const meter = madeMeter(constant(240), HOURLY);
    const clauses: Clause[] = [
      { name: 'fixed', kind: 'fixed', amountPerMonth: 90 },
      { name: 'demand', kind: 'demand', basis: 'kW', pricePerUnit: 6 },
      energy('blocks', {
        pricePerUnit: undefined,
        blocks: [
          { upTo: 3000, pricePerUnit: 1 },
          { upTo: null, pricePerUnit: 2 },
        ],
      } as Partial<Clause>),
    ];
    const [month] = billOf({ clauses }, meter).months;
    expect(month).toMatchObject({ month: '2024-04', partial: true });
    expect(month!.coverage).toBeCloseTo(1 / 3, 12);
    // 10 kW · 6 / 3; 1 000 of 2 400 kWh at 1, the rest at 2
    expect(month!.lines.map(({ amount }) => amount)).toEqual([30, 20, 1000 + 2 * 1400]);
  });

  it('counts a gap inside the record as covered', () => {
    const whole = steadyApril({ activeKwh: 720 });
    const kept = [...whole.span.beginS.keys()].filter((i) => i < 100 || i > 600);
    const pick = (column: Float64Array) => Float64Array.from(kept, (i) => column[i]!);
    const meter = {
      span: { ...whole.span, beginS: pick(whole.span.beginS) },
      columns: {
        activeKw: pick(whole.columns.activeKw),
        laggingKvar: pick(whole.columns.laggingKvar),
        leadingKvar: pick(whole.columns.leadingKvar),
      },
    };
    const [month] = billOf({ clauses: [{ name: 'fixed', kind: 'fixed', amountPerMonth: 90 }] }, meter).months;
    expect(month).toMatchObject({ coverage: 1, partial: false, total: 90 });
    expect(month!.quantities.hours).toBe(kept.length);
  });

  it('is the site’s own month: a Sydney April begins on 31 March, 13:00 UTC', () => {
    const meter = madeMeter(constant(48), { begin: '2024-03-31T00:00Z', intervalS: 3600 });
    const zone = zoneTable('Australia/Sydney', meter.span.firstS - 40 * 86_400, meter.span.endS + 40 * 86_400);
    const { months } = billOf({ clauses: [energy('energy')] }, meter, zone);
    expect(months.map(({ month, total }) => [month, total])).toEqual([
      ['2024-03', 130],
      ['2024-04', 350],
    ]);
  });

  it('of a changed clock is covered by its real hours', () => {
    // March 2024 in Dublin has 743 hours
    const meter = madeMeter(constant(743), { begin: '2024-03-01T00:00Z', intervalS: 3600 });
    const zone = zoneTable('Europe/Dublin', meter.span.firstS - 40 * 86_400, meter.span.endS + 40 * 86_400);
    const { months } = billOf({ clauses: [] }, meter, zone);
    expect(months).toHaveLength(1);
    expect(months[0]).toMatchObject({ month: '2024-03', coverage: 1, partial: false });
    expect(months[0]!.quantities).toMatchObject({ hours: 743, days: 31 });
  });
});

describe('windows', () => {
  const windows = [
    { name: 'night', hours: [[22, 6] as [number, number]] },
    { name: 'Sunday', days: [7] },
    { name: 'holiday', days: [8] },
    { name: 'May', months: [5] },
  ];

  it('hold by the local clock, over midnight of one date, and a listed holiday is no weekday', () => {
    // 1 April 2024 is a Monday; the 7th a Sunday, and a holiday here
    const meter = madeMeter(constant(240, 1), HOURLY);
    const clauses = windows.map(({ name }) => energy(name, { windows: [name] }));
    expect(amountsOf(clauses, meter, { windows, holidays: ['2024-04-07'] })).toEqual({
      night: 80,
      Sunday: 0,
      holiday: 24,
      May: 0,
    });
  });

  it('of a clause are a union', () => {
    const meter = madeMeter(constant(240, 1), HOURLY);
    expect(amountsOf([energy('both', { windows: ['night', 'Sunday'] })], meter, { windows })).toEqual({
      both: 80 + 24 - 8,
    });
  });

  it('that leave a priced moment out are refused, naming the clause and the moment', () => {
    const priced = energy('e', { pricePerUnit: undefined, prices: { night: 1, Sunday: 2 } } as Partial<Clause>);
    expect(problemOf({ windows, clauses: [priced] })).toMatchObject({
      code: 'inconsistent',
      path: 'tariff.clauses[0].prices',
      found: 'none at 2024-04-01 06:00',
    });
  });
});

describe('demand', () => {
  const clause: Clause = { name: 'demand', kind: 'demand', basis: 'kW', pricePerUnit: 1 };
  const quarters = (...values: number[]) => madeMeter(of(...values), { begin: '2024-04-01T00:00Z', intervalS: 900 });
  const quantity = (tariff: Tariff, meter = quarters(100, 0, 60, 50)) =>
    billOf(tariff, meter).months[0]!.lines[0]!.quantity;

  it('is the greatest mean of a block of the clock', () => {
    expect(quantity({ clauses: [clause] })).toBe(100);
    expect(quantity({ clauses: [clause], demandS: 1800 })).toBe(55);
    expect(quantity({ clauses: [clause], demandS: 3600 })).toBe(52.5);
  });

  it('takes the mean of what is there where a block begins before the record', () => {
    const meter = madeMeter(of(90, 10, 20), { begin: '2024-04-01T00:15Z', intervalS: 900 });
    expect(quantity({ clauses: [clause], demandS: 1800 }, meter)).toBe(90);
  });

  it('is 0 where the site exports', () => {
    expect(quantity({ clauses: [clause] }, quarters(-5, -7))).toBe(0);
  });

  it('by a block that is no multiple of the interval is refused', () => {
    expect(problemOf({ demandS: 5400 })).toMatchObject({ path: 'tariff.demandS', found: '5400', unit: 's' });
    expect(problemOf({ demandS: 1800 })).toMatchObject({ path: 'tariff.demandS' });
  });

  it.each([
    ['up', 101.2, 102],
    ['down', 101.9, 101],
    ['nearest', 101.5, 102],
    ['up', 101.0000000001, 101],
  ] as const)('in whole units %s of %f is %i', (wholeUnits, kw, billed) => {
    expect(quantity({ clauses: [{ ...clause, wholeUnits }] }, quarters(kw))).toBe(billed);
  });

  it('is held up by earlier months: pct of their own quantities, so many months back, of some months only', () => {
    // January 200 kW, February 150, March 100, April 50, of the months’ first hour
    const begin = Date.UTC(2024, 0, 1);
    const hours = (Date.UTC(2024, 3, 2) - begin) / 3_600_000;
    const at = (month: number): number => (Date.UTC(2024, month, 1) - begin) / 3_600_000;
    const activeKw = new Array<number>(hours).fill(10);
    for (const [month, kw] of [200, 150, 100, 50].entries()) activeKw[at(month)] = kw;
    const meter = madeMeter({ activeKw }, { begin: '2024-01-01T00:00Z', intervalS: 3600 });
    const quantities = (ratchet: { pct: number; months: number; of?: number[] }) =>
      billOf({ clauses: [{ ...clause, ratchet }] }, meter).months.map(({ lines }) => lines[0]!.quantity);
    expect(quantities({ pct: 80, months: 11 })).toEqual([200, 160, 160, 160]);
    expect(quantities({ pct: 80, months: 1 })).toEqual([200, 160, 120, 80]);
    expect(quantities({ pct: 80, months: 11, of: [2] })).toEqual([200, 150, 120, 120]);
    // what was held up is not held up again: 0.8 · 150, not 0.8 · 160
    expect(quantities({ pct: 80, months: 1 })[2]).toBe(120);
  });

  it('is at least the minimum, after the share of the kVA and the factor', () => {
    expect(quantity({ clauses: [{ ...clause, minimum: 120 }] })).toBe(120);
  });
});

describe('lines', () => {
  it('are rounded in list order: a later percentage and the tax see rounded ones', () => {
    const clauses: Clause[] = [
      { name: 'a', kind: 'fixed', amountPerMonth: 0.005 },
      { name: 'b', kind: 'percent', applies: ['a'], scale: { form: 'steps', steps: [{ from: 0, pct: 50 }] } },
      { name: 'c', kind: 'fixed', amountPerMonth: 10.006, taxed: false },
      { name: 'd', kind: 'fixed', amountPerMonth: -2.345 },
    ];
    const [month] = billOf({ clauses, taxPct: 20 }, steadyApril({ activeKwh: 720 })).months;
    expect(month!.lines.map(({ amount }) => amount)).toEqual([0.01, 0.01, 10.01, -2.35]);
    // 20 % of 0.01 + 0.01 − 2.35
    expect(month!.tax).toBe(-0.47);
    expect(month!.total).toBe(7.21);
  });

  it('are left alone where the tariff has no decimals', () => {
    const clauses: Clause[] = [{ name: 'a', kind: 'fixed', amountPerMonth: 0.0049 }];
    expect(amountsOf(clauses, steadyApril({ activeKwh: 720 }), { decimals: null })).toEqual({ a: 0.0049 });
  });

  it('of a clause that does not hold in the month are 0', () => {
    const clauses = [energy('May', { months: [5] }), energy('April', { months: [4] })];
    expect(amountsOf(clauses, steadyApril({ activeKwh: 720 }))).toEqual({ May: 0, April: 720 });
  });

  it('of a formula without a finite value are refused, naming clause and month', () => {
    const clauses: Clause[] = [{ name: 'f', kind: 'formula', expression: '1 / leadingKvarh' }];
    expect(problemOf({ clauses })).toMatchObject({
      code: 'not-finite',
      path: 'tariff.clauses[0].expression',
      found: 'Infinity in 2024-04',
    });
  });

  it.each([
    ['1 +', 'unreadable'],
    ['kw * 2', 'inconsistent'],
    ['1'.padEnd(1001), 'too-large'],
  ])('of the formula %s are refused before anything is priced', (expression, code) => {
    const clauses: Clause[] = [{ name: 'f', kind: 'formula', expression }];
    expect(problemOf({ clauses })).toMatchObject({ code, path: 'tariff.clauses[0].expression' });
  });
});

describe('a power factor', () => {
  it('without energy gives no percentage at all', () => {
    const clauses: Clause[] = [
      { name: 'fixed', kind: 'fixed', amountPerMonth: 100 },
      { name: 'p', kind: 'percent', applies: 'all', scale: { form: 'steps', steps: [{ from: 0, pct: 9 }], minPct: 5 } },
      { name: 'f', kind: 'formula', expression: 'powerFactor' },
    ];
    const [month] = billOf({ clauses }, steadyApril({ activeKwh: 0, laggingKvarh: 720 })).months;
    expect(month!.lines.map(({ amount }) => amount)).toEqual([100, 0, 1]);
    expect(month!.quantities.powerFactor).toBeNull();
  });

  it('is of the energies, of the first block of greatest kW, or of the maxima, as the rule says', () => {
    // 3 and 4 in the first hour, 3 and 0 in the second
    const meter = madeMeter({ activeKw: [3, 3], laggingKvar: [4, 0] }, HOURLY);
    const factor = (basis: 'energy' | 'atMaxKw' | 'maxima') =>
      billOf({ clauses: [], factor: { basis, decimals: 4 } }, meter).months[0]!.quantities.powerFactor;
    expect(factor('energy')).toBe(0.8321); // 6/√(36 + 16)
    expect(factor('atMaxKw')).toBe(0.6); // 3/√(9 + 16)
    expect(factor('maxima')).toBe(0.6);
  });
});

describe('a real bill', () => {
  it('is held against the month of its name', () => {
    const tariff: Tariff = { clauses: [energy('e')], billed: [{ month: '2024-04', total: 700 }] };
    expect(billOf(tariff, steadyApril({ activeKwh: 720 })).months[0]).toMatchObject({ billed: 700, difference: 20 });
    expect(billOf({ clauses: [] }, steadyApril({ activeKwh: 1 })).months[0]).toMatchObject({
      billed: null,
      difference: null,
    });
  });
});
