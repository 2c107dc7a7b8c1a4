import { describe, expect, it } from 'vitest';
import { InputProblem, type Problem } from '#libs/engine/index.js';
import { estimateZone } from './estimate-zone.js';
import { readSite } from './read-site.js';

const bill = (parts: object = {}) => ({ month: '2025-06', activeKwh: 1000, laggingKvarh: 600, maxKw: 5, ...parts });
const motor = (parts: object = {}) => ({ name: 'pump', ratedKw: 75, efficiencyPct: 94, powerFactor: 0.86, ...parts });
const siteWith = (estimate: unknown) => ({
  name: 'Made-up works',
  timeZone: 'Europe/Dublin',
  rules: 'iec',
  frequencyHz: 50,
  bus: { nominalV: 400 },
  supply: { faultLevelMva: { max: 20 } },
  estimate,
});
const withBill = (parts: object) => siteWith({ bills: [bill(parts)] });
const withMotor = (parts: object) => siteWith({ equipment: [motor(parts)] });

function problemsOf(json: unknown): readonly Problem[] {
  try {
    readSite(json);
  } catch (error) {
    return (error as InputProblem).problems;
  }
  return [];
}

const REFUSED: [string, object, string, Problem['code']][] = [
  ['neither bills nor equipment', siteWith({}), 'estimate', 'missing'],
  ['an estimate that is no object', siteWith(3), 'estimate', 'wrong-type'],
  ['an empty list of equipment', siteWith({ equipment: [] }), 'estimate.equipment', 'out-of-range'],
  ['an unknown key', siteWith({ bill: [] }), 'estimate.bill', 'unknown-key'],
  ['a month of thirteen', withBill({ month: '2025-13' }), 'estimate.bills[0].month', 'out-of-range'],
  ['a month before any meter', withBill({ month: '0205-06' }), 'estimate.bills[0].month', 'out-of-range'],
  ['a month twice', siteWith({ bills: [bill(), bill()] }), 'estimate.bills[1].month', 'inconsistent'],
  ['neither kvarh nor factor', withBill({ laggingKvarh: undefined }), 'estimate.bills[0].laggingKvarh', 'missing'],
  ['no greatest demand', withBill({ maxKw: undefined }), 'estimate.bills[0].maxKw', 'missing'],
  ['no energy', withBill({ activeKwh: 0 }), 'estimate.bills[0].activeKwh', 'out-of-range'],
  ['kvarh below 0', withBill({ laggingKvarh: -1 }), 'estimate.bills[0].laggingKvarh', 'out-of-range'],
  ['a factor in per cent', withBill({ powerFactor: 85 }), 'estimate.bills[0].powerFactor', 'out-of-range'],
  ['a factor its kvarh deny', withBill({ powerFactor: 0.9 }), 'estimate.bills[0].powerFactor', 'inconsistent'],
  ['kVA below kW', withBill({ maxKva: 4 }), 'estimate.bills[0].maxKva', 'inconsistent'],
  ['kVA in kW', withBill({ maxKva: '6 kW' }), 'estimate.bills[0].maxKva', 'wrong-unit'],
  [
    'an efficiency as a share',
    withMotor({ efficiencyPct: 0.94 }),
    'estimate.equipment[0].efficiencyPct',
    'out-of-range',
  ],
  [
    'an efficiency above 100 %',
    withMotor({ efficiencyPct: 104 }),
    'estimate.equipment[0].efficiencyPct',
    'out-of-range',
  ],
  ['a power factor above 1', withMotor({ powerFactor: 1.02 }), 'estimate.equipment[0].powerFactor', 'out-of-range'],
  ['a load factor in per cent', withMotor({ loadFactor: 75 }), 'estimate.equipment[0].loadFactor', 'out-of-range'],
  ['a coincidence above 1', withMotor({ coincidence: 1.1 }), 'estimate.equipment[0].coincidence', 'out-of-range'],
  ['half a motor', withMotor({ count: 0.5 }), 'estimate.equipment[0].count', 'out-of-range'],
  ['a motor of no power', withMotor({ ratedKw: 0 }), 'estimate.equipment[0].ratedKw', 'out-of-range'],
];

describe('an estimate in a site file', () => {
  it.each(REFUSED)('with %s is refused at its path', (_why, json, path, code) => {
    expect(problemsOf(json)).toContainEqual(expect.objectContaining({ path, code }));
  });

  it('is taken with bills, equipment, or both, kW and kVA beside each other', () => {
    for (const estimate of [
      { bills: [bill({ maxKva: 6 })] },
      { equipment: [motor()] },
      { bills: [bill()], equipment: [motor({ count: 3, loadFactor: 0.8, coincidence: 0.7 })] },
    ]) {
      expect(readSite(siteWith(estimate)).estimate).toEqual(estimate);
    }
  });

  it('understands a power factor as kvarh and horsepower as kW, and says so', () => {
    const site = readSite(
      siteWith({
        bills: [bill({ laggingKvarh: undefined, powerFactor: 0.8 })],
        equipment: [motor({ ratedKw: '100 hp' })],
      }),
    );
    // 0.8 is the triangle 3-4-5: 750 kvarh beside 1 000 kWh.
    expect(site.estimate?.bills?.[0]?.laggingKvarh).toBeCloseTo(750, 9);
    expect(site.estimate?.bills?.[0]).not.toHaveProperty('powerFactor');
    expect(site.understood).toEqual([
      { path: 'estimate.bills[0].powerFactor', given: '0.8', value: expect.closeTo(750, 9), unit: 'kvarh' },
      { path: 'estimate.equipment[0].ratedKw', given: '100 hp', value: expect.closeTo(74.57, 2), unit: 'kW' },
    ]);
  });

  it('keeps a printed factor that its energies bear out, and computes with the kvarh', () => {
    const site = readSite(withBill({ powerFactor: 0.86 }));
    expect(site.estimate?.bills?.[0]).toEqual(bill());
  });
});

describe('the zone of an estimate', () => {
  it('covers the months of the bills and more than one beside them', () => {
    const site = readSite(siteWith({ bills: [bill({ month: '2025-11' }), bill({ month: '2025-02' })] }));
    const { fromS, offsetS } = estimateZone(site);
    expect(fromS[0]).toBeLessThan(Date.UTC(2025, 0, 1) / 1000);
    expect(offsetS).toEqual([0, 3600, 0]);
  });

  it('is that of one moment where there are no bills', () => {
    expect(estimateZone(readSite(siteWith({ equipment: [motor()] }))).fromS).toEqual([0]);
  });
});
