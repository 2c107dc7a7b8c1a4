// Second method: the same bills on a calendar that keeps no sums, where every column is added up for every meter.
import { describe, expect, it } from 'vitest';
import { billYear, type MeterColumns, type PreparedTariff, prepareTariff, UTC_TABLE } from '#libs/engine/index.js';
import { type Chance, chance } from '../support/chance.js';
import { madeTariff } from '../support/made-tariff.js';
import { madeMeter } from '../support/priced-meter.js';
import { runs, SEED } from '../support/soak.js';

const HOURS = 24 * 50;
const TIMES = { begin: '2024-11-20T00:00Z', intervalS: 3600 };

const list = (random: Chance, least: number, most: number): number[] =>
  Array.from({ length: HOURS }, () => random.between(least, most));

const madeYear = (random: Chance) =>
  madeMeter(
    { activeKw: list(random, -20, 200), laggingKvar: list(random, 0, 100), leadingKvar: list(random, 0, 9) },
    TIMES,
  );

const totals = (prepared: PreparedTariff, columns: MeterColumns): number[] =>
  billYear(prepared, columns, false).months.map(({ total }) => total);

describe(`sums of a column that no bank moves (seed ${SEED})`, () => {
  it('are kept, and every meter’s bills stay what they are, to the bit', () => {
    for (let run = 0; run < runs(12, 200); run++) {
      const random = chance(SEED + 700_000 + run);
      const { span, columns } = madeYear(random);
      const tariff = madeTariff(random, [3600, 7200]);
      const keeping = prepareTariff(tariff, { ...span, activeKw: columns.activeKw }, UTC_TABLE);
      const meters = [
        columns,
        { ...madeYear(random).columns, activeKw: columns.activeKw },
        madeYear(random).columns,
        { ...madeYear(random).columns, activeKw: columns.activeKw },
      ];
      for (const meter of meters) {
        const plain = prepareTariff(tariff, span, UTC_TABLE);
        expect(totals(keeping, meter), `${run} ${JSON.stringify(tariff.clauses)}`).toEqual(totals(plain, meter));
      }
    }
  });

  it('control: are those of the column as it first was, so a column that is kept may not change', () => {
    const random = chance(SEED + 710_000);
    const { span, columns } = madeYear(random);
    const clauses = [{ name: 'energy', kind: 'energy', pricePerUnit: 0.2 } as const];
    const keeping = prepareTariff({ clauses }, { ...span, activeKw: columns.activeKw }, UTC_TABLE);
    const before = totals(keeping, columns);
    columns.activeKw.fill(1000);
    expect(totals(keeping, columns)).toEqual(before);
    expect(totals(prepareTariff({ clauses }, span, UTC_TABLE), columns)).not.toEqual(before);
  });
});
