// Second method: the year billed again with every whole value that could be contracted. Hand-worked: three months.
import { describe, expect, it } from 'vitest';
import {
  billYear,
  type ContractedDemandClause,
  contractAdvice,
  prepareTariff,
  type Tariff,
  UTC_TABLE,
} from '#libs/engine/index.js';
import { chance } from '../support/chance.js';
import { madeMeter } from '../support/priced-meter.js';
import { runs, SEED } from '../support/soak.js';

const TIMES = { begin: '2024-01-01T00:00Z', intervalS: 86_400 };
const CONTRACT: ContractedDemandClause = {
  name: 'contract',
  kind: 'contractedDemand',
  basis: 'kVA',
  contracted: 300,
  pricePerUnit: 4,
  overrunPricePerUnit: 10,
};
const tariffOf = (clause: ContractedDemandClause): Tariff => ({ clauses: [clause] });

/** January, February and March 2024 by the day, each month of one power. */
const months = (kva: readonly number[]) => {
  const days = [31, 29, 31];
  const each = (share: number): number[] => days.flatMap((count, m) => new Array<number>(count).fill(share * kva[m]!));
  return madeMeter({ activeKw: each(0.6), laggingKvar: each(0.8) }, TIMES);
};

describe(`the value to contract for (seed ${SEED})`, () => {
  it('of three months is the middle one where an overrun costs two and a half times as much', () => {
    // 300, 200 and 260 kVA: at 260 the months cost 1 040 + 400, 1 040, 1 040 = 3 520; at 300 3 600; at 200 4 000
    const meter = months([300, 200, 260]);
    const prepared = prepareTariff(tariffOf(CONTRACT), meter.span, UTC_TABLE);
    const lower = months([150, 150, 150]);
    const [advice] = contractAdvice(prepared, meter.columns, lower.columns);
    expect(advice).toMatchObject({ clause: 'contract', unit: 'kVA', contracted: 300 });
    expect(advice!.before.amount).toBeCloseTo(3600, 9);
    expect(advice!.before.proposed).toBeCloseTo(260, 9);
    expect(advice!.before.amountProposed).toBeCloseTo(3520, 9);
    // after a bank the contract can go down to what is left
    expect(advice!.after.amount).toBeCloseTo(3600, 9);
    expect(advice!.after.proposed).toBeCloseTo(150, 9);
    expect(advice!.after.amountProposed).toBeCloseTo(1800, 9);
  });

  it('is beaten by no other, and costs what the bills say', () => {
    for (let run = 0; run < runs(10, 300); run++) {
      const random = chance(SEED + run);
      const pricePerUnit = random.between(1, 8);
      const clause: ContractedDemandClause = {
        ...CONTRACT,
        basis: random.oneOf(['kW', 'kVA', 'kWOrKvaShare'] as const),
        kvaShare: 0.9,
        contracted: random.whole(50, 400),
        pricePerUnit,
        overrunPricePerUnit: pricePerUnit * random.oneOf([1.5, 2, 3]),
        tolerancePct: random.oneOf([0, 5]),
        leastPct: random.oneOf([100, 85, 50]),
        ...(random.next() < 0.3 ? { months: [1, 3] } : {}),
      };
      const meter = months([random.between(50, 400), random.between(50, 400), random.between(50, 400)]);
      const billed = (contracted: number): number =>
        billYear(prepareTariff(tariffOf({ ...clause, contracted }), meter.span, UTC_TABLE), meter.columns, false).total;
      const prepared = prepareTariff(tariffOf(clause), meter.span, UTC_TABLE);
      const { before } = contractAdvice(prepared, meter.columns, meter.columns)[0]!;
      expect(before.amount).toBeCloseTo(billed(clause.contracted), 6);
      expect(before.amountProposed).toBeCloseTo(billed(before.proposed), 6);
      for (let contracted = 0; contracted <= 420; contracted += 10) {
        // a cent a month is rounding
        expect(before.amountProposed).toBeLessThanOrEqual(billed(contracted) + 0.03);
      }
    }
  });

  it('has nothing to say of a tariff without a contract', () => {
    const meter = months([100, 100, 100]);
    const prepared = prepareTariff(
      { clauses: [{ name: 'f', kind: 'fixed', amountPerMonth: 1 }] },
      meter.span,
      UTC_TABLE,
    );
    expect(contractAdvice(prepared, meter.columns, meter.columns)).toEqual([]);
  });
});
