import { describe, expect, it } from 'vitest';
import { zoneTable } from '#libs/contract/time-zone.js';
import type { Tariff } from '#libs/engine/index.js';
import { type Chance, chance } from '../support/chance.js';
import { madeTariff } from '../support/made-tariff.js';
import { billOf, type MadeMeter, madeMeter } from '../support/priced-meter.js';
import { slowBills } from '../support/slow-bill.js';
import { slowWorking } from '../support/slow-formula.js';
import { runs, SEED } from '../support/soak.js';

const ZONES = [
  'Europe/Dublin',
  'UTC',
  'America/New_York',
  'Australia/Lord_Howe',
  'Asia/Kathmandu',
  'America/Sao_Paulo',
];
const DAY_S = 86_400;

function madeColumns(random: Chance, count: number) {
  const activeKw: number[] = [];
  const laggingKvar: number[] = [];
  const leadingKvar: number[] = [];
  const tan = random.between(0.2, 1.1);
  for (let i = 0; i < count; i++) {
    const kw = random.next() < 0.03 ? -random.between(0, 40) : random.between(20, 400);
    const both = random.next() < 0.1;
    activeKw.push(Number(kw.toFixed(1)));
    laggingKvar.push(Number((Math.max(kw, 20) * tan * random.between(0.6, 1.3)).toFixed(1)));
    leadingKvar.push(both ? Number(random.between(0, 80).toFixed(1)) : 0);
  }
  return { activeKw, laggingKvar, leadingKvar };
}

// A record that begins anywhere, has holes, and may run through a change of the clock.
function madeRecord(random: Chance, days: number, intervalS: number): MadeMeter {
  const count = Math.round((days * DAY_S) / intervalS);
  const begin = new Date(Date.UTC(2024, random.whole(0, 11), random.whole(1, 28), random.whole(0, 23)));
  const meter = madeMeter(madeColumns(random, count), { begin: begin.toISOString(), intervalS });
  const kept = [...meter.span.beginS.keys()].filter((i) => i === 0 || i === count - 1 || random.next() > 0.02);
  const pick = (column: Float64Array): Float64Array => Float64Array.from(kept, (i) => column[i]!);
  return {
    span: { ...meter.span, beginS: pick(meter.span.beginS) },
    columns: {
      activeKw: pick(meter.columns.activeKw),
      laggingKvar: pick(meter.columns.laggingKvar),
      leadingKvar: pick(meter.columns.leadingKvar),
    },
  };
}

function expectEqualBills(tariff: Tariff, meter: MadeMeter, zone: string): void {
  const { span } = meter;
  const table = zoneTable(zone, span.firstS - 40 * DAY_S, span.endS + 40 * DAY_S);
  const bill = billOf(tariff, meter, table);
  const slow = slowBills(tariff, meter, zone);
  expect(bill.months.map(({ month }) => month)).toEqual(slow.map(({ month }) => month));
  // to the cent: a rounded line is the same number, an unrounded one differs in the last bits of its sums alone
  const width = (tariff.decimals === null ? 1e-9 : 0) * 1e4;
  for (const [m, month] of bill.months.entries()) {
    const other = slow[m]!;
    expect(month.coverage).toBeCloseTo(other.coverage, 12);
    for (const [k, line] of month.lines.entries()) {
      const where = `${zone} ${month.month} ${JSON.stringify(tariff.clauses![k])}`;
      expect(Math.abs(line.amount - other.lines[k]!.amount), where).toBeLessThanOrEqual(width);
      const size = Math.max(1, Math.abs(other.lines[k]!.quantity));
      expect(Math.abs(line.quantity - other.lines[k]!.quantity) / size, where).toBeLessThan(1e-9);
    }
    expect(Math.abs(month.tax - other.tax)).toBeLessThanOrEqual(width);
    expect(month.total).toBeCloseTo(other.total, 6);
  }
}

// A working has 12 digits of each value and the line is rounded: half a unit of its last decimal, and those digits.
function expectWorkings(tariff: Tariff, meter: MadeMeter): void {
  const decimals = tariff.decimals === undefined ? 2 : tariff.decimals;
  const width = decimals === null ? 0 : 0.5 * 10 ** -decimals + 1e-5;
  for (const month of billOf(tariff, meter).months) {
    for (const { clause, amount, working } of month.lines) {
      const off = Math.abs(slowWorking(working) - amount);
      expect(off, `${clause}: ${working} for ${amount}`).toBeLessThanOrEqual(width + 1e-8 * (1 + Math.abs(amount)));
    }
  }
}

describe('bills', () => {
  it('print a working for every line that comes to its amount', () => {
    for (let run = 0; run < runs(40, 2000); run++) {
      const random = chance(SEED + 200_000 + run);
      const meter = madeRecord(random, random.whole(3, 70), 3600);
      expectWorkings(madeTariff(random, [3600, 7200]), meter);
    }
  });

  it(`of generated tariffs and records are those of a clerk with the tariff on the desk (seed ${SEED})`, () => {
    for (let run = 0; run < runs(60, 6000); run++) {
      const random = chance(SEED + run);
      const intervalS = random.oneOf([900, 1800, 3600]);
      const meter = madeRecord(random, random.whole(3, 95), intervalS);
      const demandS = [intervalS, 2 * intervalS, 4 * intervalS];
      expectEqualBills(madeTariff(random, demandS), meter, random.oneOf(ZONES));
    }
  });

  it('of a whole year of quarter hours are the same to the cent', () => {
    for (let run = 0; run < runs(1, 40); run++) {
      const random = chance(SEED + 90_000 + run);
      const meter = madeRecord(random, 366, 900);
      expectEqualBills(madeTariff(random, [900, 1800]), meter, random.oneOf(ZONES));
    }
  });
});
