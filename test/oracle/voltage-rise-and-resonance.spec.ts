// - 5 Mvar on 125 MVA, voltage rise 4.0 %, reported as 1.04 per unit and order 5.0: atlasofengineering.com; seen.
// - 1 000 kVA, 5.3 %, 100 kvar, order 13.7: an engineering note; seen.
// - 1 500 kVA, 6 %, 500 kvar, order 7.07 and rise 2.0 %: Dugan and others, Electrical Power Systems Quality; from memory.
// - Between the 3rd and the 5th, order √15 = 3.873, ratio 0.067: electrical-engineering-portal.com; seen.
import { describe, expect, it } from 'vitest';
import { assessBank, primaryFromBus, type Site, scanSite, tunedOrderH, UTC_TABLE } from '#libs/engine/index.js';
import { madeRecord } from '../support/made-record.js';
import { madeSite } from '../support/made-site.js';

/** A source so strong that the transformer alone is the fault level. */
const STRONG_MVA = 1e8;

function withTransformer(ratedKva: number, impedancePct: number, kvar: number): Site {
  return madeSite({
    supply: {
      faultLevelMva: { max: STRONG_MVA },
      transformers: [{ ratedKva, impedancePct, impedanceTolerancePct: 0, loadLossKw: 0.001 * ratedKva }],
    },
    loads: { distorting: [], backgroundPct: [], dampingKw: { max: 0 } },
    bank: { stages: [{ count: 1, ratedKvar: kvar, ratedV: 400 }] },
  });
}

function figureOf(site: Site, id: string): number {
  const record = madeRecord({ activeKw: [10, 10], reactiveKvar: [5, 5] });
  return assessBank(site, record, UTC_TABLE).result.figures.find((figure) => figure.id === id)!.value;
}

describe('voltage rise', () => {
  const substation = madeSite({
    bus: { nominalV: 34_500 },
    supply: { faultLevelMva: { max: 125 }, rOverX: 0.01 },
    loads: { distorting: [], backgroundPct: [], dampingKw: { max: 0 } },
    bank: { stages: [{ count: 1, ratedKvar: 5000, ratedV: 34_500 }] },
  });

  it('of 5 Mvar on 125 MVA is 4.0 %', () => {
    expect(figureOf(substation, 'bank.voltageRisePct')).toBeCloseTo(4.0, 6);
  });

  it('of 500 kvar on 1 500 kVA with 6 % is 2.0 %, and the transformer’s own equations agree', () => {
    expect(figureOf(withTransformer(1500, 6, 500), 'bank.voltageRisePct')).toBeCloseTo(2.0, 3);
    const passage = { baseKva: 1500, noLoadKw: 0, noLoadKvar: 0, rPu: 0.001, xPu: Math.sqrt(0.06 ** 2 - 0.001 ** 2) };
    const rise = (kvar: number): number => 100 * (primaryFromBus(passage, 0, -kvar)!.busVoltagePu - 1);
    expect(rise(500)).toBeCloseTo(2.0, 1);
    expect(rise(0)).toBeCloseTo(0, 12);
  });

  it('reported as 1.04 per unit, the same bank resonates at order 5.0', () => {
    expect(figureOf(substation, 'network.parallelOrderClosedFormH')).toBeCloseTo(5.0, 6);
    const [nominal] = scanSite(substation, { ordersH: Float64Array.of(5) }).levels;
    expect(nominal!.parallelOrderH).toBeCloseTo(5.0, 2);
  });
});

describe('parallel resonance', () => {
  it.each([
    [1000, 5.3, 100, 13.7, 1],
    [1500, 6, 500, 7.07, 2],
  ])(
    'of %d kVA with %d %% and %d kvar is at order %d, closed form and scan',
    (kva, impedancePct, kvar, printed, digits) => {
      const site = withTransformer(kva, impedancePct, kvar);
      expect(figureOf(site, 'network.parallelOrderClosedFormH')).toBeCloseTo(printed, digits);
      const [nominal] = scanSite(site, { ordersH: Float64Array.of(5) }).levels;
      expect(Math.abs(nominal!.parallelOrderH! / printed - 1)).toBeLessThan(0.005);
    },
  );

  it('between the 3rd and the 5th is avoided by a ratio of 0.067, order √15', () => {
    expect(tunedOrderH(6.7)!).toBeCloseTo(3.87, 1);
    expect(tunedOrderH(100 / 15)).toBeCloseTo(3.873, 3);
  });
});
