// Second method: the same cells by `CellBounds`, which writes the meter's columns and reads the tariff off them.
import { describe, expect, it } from 'vitest';
import { type Chance, chance } from '../../../test/support/chance.js';
import { driftingLoad, madeRecord } from '../../../test/support/made-record.js';
import { madeSite } from '../../../test/support/made-site.js';
import { runs, SEED } from '../../../test/support/soak.js';
import { rangeTariff } from '../money/bill-range.js';
import type { Tariff } from '../money/papers.js';
import { prepareTariff } from '../money/prepare-tariff.js';
import { UTC_TABLE } from '../record/zone-table.js';
import { type CellSize, CellBounds } from './bound-cell.js';
import { leastOfLast } from './least-of-last.js';
import { MonthCells } from './month-cell.js';
import type { Site } from './site.js';
import { controllerView, studySite } from './study.js';

const TARIFF: Tariff = {
  windows: [{ name: 'day', hours: [[6, 22]] }],
  clauses: [
    { name: 'energy', kind: 'energy', of: 'kVAh', pricePerUnit: 0.1 },
    { name: 'reactive', kind: 'kvarhBeyondRatio', freeRatio: 0.33, pricePerUnit: 0.05 },
    { name: 'by day', kind: 'kvarhBeyondRatio', freeRatio: 0.2, pricePerUnit: 0.02, windows: ['day'] },
    { name: 'demand', kind: 'demand', basis: 'kVA', pricePerUnit: 5 },
    { name: 'demand by day', kind: 'demand', basis: 'kWOrKvaShare', kvaShare: 0.95, pricePerUnit: 3, windows: ['day'] },
    {
      name: 'contract',
      kind: 'contractedDemand',
      basis: 'kVA',
      contracted: 150,
      pricePerUnit: 2,
      overrunPricePerUnit: 4,
    },
    { name: 'leading', kind: 'kvarhBeyondRatio', reactive: 'leading', freeRatio: 0, pricePerUnit: 0.03 },
    {
      name: 'bonus',
      kind: 'percent',
      applies: 'all',
      scale: { form: 'ratio', reference: 0.92, belowPct: 60, abovePct: 25 },
    },
  ],
};

function madeStudy(random: Chance, parts: Partial<Site> = {}) {
  const load = driftingLoad(random, 200, 200, random.between(0.2, 0.9));
  const swung = load.reactiveKvar.map((kvar) => kvar - (random.next() < 0.1 ? 150 : 0));
  const record = madeRecord({ activeKw: load.activeKw, reactiveKvar: swung, intervalS: 3 * 3600 });
  const study = studySite(madeSite(parts), record, UTC_TABLE);
  // demand as read in single intervals, and in means of two
  const demandS = random.oneOf([3, 6]) * 3600;
  return { study, ranged: rangeTariff(prepareTariff({ ...TARIFF, demandS }, record, UTC_TABLE)) };
}

function madeSize(random: Chance, wantedKvar: Float64Array): CellSize {
  const mostKvar = random.between(20, 300);
  const leastKvar = mostKvar * random.between(0.7, 1);
  const infinite = Number.POSITIVE_INFINITY;
  if (random.next() < 0.4) {
    const reach = { aboveKvar: infinite, belowKvar: infinite, paceKvar: infinite };
    return { mostKvar, leastKvar, wantedKvar: null, leastWantedKvar: null, reach };
  }
  const aboveKvar = random.between(5, 60);
  const leastWantedKvar = leastOfLast(wantedKvar, random.whole(0, 3));
  const paceKvar = random.oneOf([infinite, random.between(5, 60)]);
  const reach = { aboveKvar, belowKvar: random.oneOf([aboveKvar, infinite]), paceKvar };
  return { mostKvar, leastKvar, wantedKvar, leastWantedKvar, reach };
}

describe(`bounds added up month by month (seed ${SEED})`, () => {
  it('are those read off columns', () => {
    const random = chance(SEED);
    for (let k = 0; k < runs(25, 500); k++) {
      const { study, ranged } = madeStudy(random);
      const size = madeSize(random, controllerView(study, 0.97).wantedKvar);
      const fast = MonthCells.of(study, ranged)!.cell(size);
      const slow = new CellBounds(study, ranged).cell(size);
      const near = (found: Float64Array, wanted: Float64Array) =>
        found.forEach((value, m) => {
          // a percentage that has no end has none either way
          if (value === wanted[m]) return;
          expect(Math.abs(value - wanted[m]!)).toBeLessThan(1e-7 * (1 + Math.abs(wanted[m]!)));
        });
      near(fast.leastBill, slow.leastBill);
      near(fast.leastKvarh, slow.leastKvarh);
      expect(fast.mostLowestFactor).toBeCloseTo(slow.mostLowestFactor, 9);
      expect(fast.leastMovesKvar).toEqual(slow.leastMovesKvar);
    }
  });

  it('are not formed behind a transformer, beside an old bank, or for a tariff that asks for more', () => {
    const random = chance(SEED);
    const { study, ranged } = madeStudy(random);
    expect(MonthCells.of(study, ranged)).not.toBeNull();
    const others: Partial<Site>[] = [{ meteredAt: 'primary' }, { recordedBank: { state: 'fixed', kvar: 20 } }];
    for (const parts of others) {
      const made = madeStudy(random, parts);
      expect(MonthCells.of(made.study, made.ranged)).toBeNull();
    }
    const demand: Tariff = { clauses: [{ name: 'demand', kind: 'demand', basis: 'kVA', per: 'day', pricePerUnit: 5 }] };
    const kvar: Tariff = { clauses: [{ name: 'kvar', kind: 'kvarBeyondRatio', ratio: 0.3, pricePerUnit: 5 }] };
    const byHour: Tariff = {
      clauses: [{ name: 'hourly', kind: 'kvarhBeyondRatio', per: 'hour', freeRatio: 0.3, pricePerUnit: 0.1 }],
    };
    for (const tariff of [demand, kvar, byHour]) {
      expect(MonthCells.of(study, rangeTariff(prepareTariff(tariff, study.record, UTC_TABLE)))).toBeNull();
    }
  });
});
