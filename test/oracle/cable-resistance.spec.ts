// IEC 60228, class 2: greatest resistance of stranded copper at 20 °C, from memory. American wire gauge: areas and resistances
// as wire tables print them (4/0 is 107 mm², 10 is 5.26 mm², 1 is 42.4 mm²; copper 4/0 0.161, 2 0.513, 10 3.28 Ω/km), from
// memory. Conductivity of copper 17.241 Ω·mm²/km (100 % IACS).
import { describe, expect, it } from 'vitest';
import { AWG_SIZES, awgAreaMm2, conductorOhmPerKm } from '#libs/engine/index.js';

describe('copper by its cross-section', () => {
  it.each([
    [1.5, 12.1],
    [16, 1.15],
    [95, 0.193],
    [240, 0.0754],
    [630, 0.0283],
  ])('%d mm² has %d Ω/km', (areaMm2, ohmPerKm) => {
    expect(conductorOhmPerKm(areaMm2, 'copper')).toBe(ohmPerKm);
  });

  it('of no preferred size follows its resistivity, and lies between its neighbours', () => {
    const ohmPerKm = conductorOhmPerKm(100, 'copper');
    expect(ohmPerKm).toBeCloseTo(0.17241, 9);
    expect(ohmPerKm).toBeLessThan(conductorOhmPerKm(95, 'copper'));
    expect(ohmPerKm).toBeGreaterThan(conductorOhmPerKm(120, 'copper'));
  });

  it('no preferred size is further than 13 % from its resistivity: a slip in the table would show', () => {
    for (const areaMm2 of [1.5, 2.5, 4, 6, 10, 16, 25, 35, 50, 70, 95, 120, 150, 185, 240, 300, 400, 500, 630]) {
      const share = conductorOhmPerKm(areaMm2, 'copper') / (17.241 / areaMm2);
      expect(Math.abs(share - 1)).toBeLessThan(0.13);
    }
  });
});

describe('aluminium', () => {
  it('has 1.639 times the resistance of copper', () => {
    expect(conductorOhmPerKm(95, 'aluminium') / conductorOhmPerKm(95, 'copper')).toBeCloseTo(1.639, 3);
  });
});

describe('wire gauge', () => {
  it.each([
    ['10', 5.26, 3.28],
    ['2', 33.6, 0.513],
    ['1', 42.4, 0.407],
    ['1/0', 53.5, 0.322],
    ['4/0', 107.2, 0.161],
  ])('%s is %d mm² and %d Ω/km', (size, areaMm2, ohmPerKm) => {
    expect(awgAreaMm2(size) / areaMm2).toBeCloseTo(1, 2);
    expect(conductorOhmPerKm(awgAreaMm2(size), 'copper') / ohmPerKm).toBeCloseTo(1, 2);
  });

  it('grows from size to size by the same factor, 92^(2/39)', () => {
    const areas = AWG_SIZES.map(awgAreaMm2);
    for (let k = 1; k < areas.length; k++) expect(areas[k]! / areas[k - 1]!).toBeCloseTo(92 ** (2 / 39), 9);
  });
});
