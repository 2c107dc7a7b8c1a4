import { describe, expect, it } from 'vitest';
import type { Site } from '#libs/engine/index.js';
import { readSite } from './read-site.js';

function siteWith(supply: Record<string, unknown>, rest: Record<string, unknown> = {}) {
  return {
    name: 'Invented Mill',
    timeZone: 'Europe/Dublin',
    rules: 'iec',
    frequencyHz: 50,
    bus: { nominalV: 400 },
    supply,
    ...rest,
  };
}

const mva = { faultLevelMva: { max: 250 } };

const ratios: [what: string, json: unknown, value: (site: Site) => unknown, expected: number, path: string][] = [
  [
    // u_k 6 % with X/R 5.916 is the 1 % of 10 kW on 1000 kVA
    'a transformer’s X/R: P_k = u_k·S/√(1 + (X/R)²)',
    siteWith(
      { ...mva, transformers: [{ ratedKva: 1000, impedancePct: 6, xOverR: Math.sqrt(35) }] },
      { meteredAt: 'bus' },
    ),
    (site) => site.supply.transformers?.[0]?.loadLossKw,
    10,
    'supply.transformers[0].xOverR',
  ],
  [
    'a transformer’s R/X',
    siteWith(
      { ...mva, transformers: [{ ratedKva: '1 MVA', impedancePct: 6, rOverX: 1 / Math.sqrt(35) }] },
      { meteredAt: 'bus' },
    ),
    (site) => site.supply.transformers?.[0]?.loadLossKw,
    10,
    'supply.transformers[0].rOverX',
  ],
  [
    'a generator’s X/R',
    siteWith(mva, {
      network: {
        buses: [{ name: 'A' }],
        generators: [{ bus: 'A', ratedKva: 400, subtransientPct: 12, xOverR: 8, state: 'running' }],
      },
    }),
    (site) => site.network?.generators?.[0]?.rOverX,
    0.125,
    'network.generators[0].xOverR',
  ],
];

describe('a quantity as plates and utilities give it', () => {
  it.each(ratios)('%s is read, and echoed as understood', (...[, json, value, expected, path]) => {
    const site = readSite(json);
    expect(Number(value(site)) / expected).toBeCloseTo(1, 9);
    expect(site.understood).toContainEqual(expect.objectContaining({ path, value: value(site) }));
  });

  it('a quantity in another unit is echoed as it was written, and one in the unit of its name is not', () => {
    const supply = {
      faultLevelMva: { max: '0.25 GVA', min: '180 MVA' },
      transformers: [{ bus: 'A', ratedKva: '1 MVA', impedancePct: '6 %', loadLossKw: 10 }],
    };
    const cables = [{ between: ['A', 'B'], lengthM: '200 ft', crossSectionMm2: '250 kcmil', reactanceOhmPerKm: 0.08 }];
    const network = { buses: [{ name: 'A' }, { name: 'B' }], cables, motors: [{ bus: 'A', kw: '50 hp' }] };
    const { understood } = readSite(siteWith(supply, { network, meteredAt: 'bus', bus: { nominalV: '0.4 kV' } }));
    const told = understood!.map(({ path, given, value, unit }) => [path, given, Math.round(value * 1e4) / 1e4, unit]);
    expect(told).toEqual([
      // 17.241/126.68 Ω/km
      ['network.cables[0].crossSectionMm2', '126.677 mm² copper at 20 °C', 0.1361, 'Ω/km'],
      ['bus.nominalV', '0.4 kV', 400, 'V'],
      ['supply.faultLevelMva.max', '0.25 GVA', 250, 'MVA'],
      ['supply.transformers[0].ratedKva', '1 MVA', 1000, 'kVA'],
      // 1 kcmil is 0.5067 mm², 1 ft 0.3048 m, 1 hp 745.7 W
      ['network.cables[0].lengthM', '200 ft', 60.96, 'm'],
      ['network.cables[0].crossSectionMm2', '250 kcmil', 126.6769, 'mm²'],
      ['network.motors[0].kw', '50 hp', 37.285, 'kW'],
    ]);
  });
});
