import fc from 'fast-check';
import { type MathNumericType, unit as mathjsUnit } from 'mathjs';
import { describe, expect, it } from 'vitest';
import { readQuantity, unitOfName } from './quantity.js';

const SEED = 20_260_131;

const readings: [text: string, unit: string, value: number, why: string][] = [
  ['1.25 MVA', 'kVA', 1250, 'the contract’s own example'],
  ['1.005 MVA', 'kVA', 1005, 'the point moves in the digits; 1.005 · 1000 would be 1004.9999999999999'],
  ['1250kVA', 'kVA', 1250, 'the blank may be left out'],
  ['1250\u00a0kVA', 'kVA', 1250, 'a no-break blank is a blank'],
  ['1250\u2009kVA', 'kVA', 1250, 'so is a thin one'],
  ['  50 kvar ', 'kvar', 50, 'blanks around it mean nothing'],
  ['50 kVAr', 'kvar', 50, 'the other spellings of var'],
  ['50 kVAR', 'kvar', 50, 'the other spellings of var'],
  ['-3e2 V', 'V', -300, 'a sign and an exponent'],
  ['\u22125 V', 'V', -5, 'a typographic minus'],
  ['.5 kV', 'V', 500, 'no digit before the point'],
  ['5. kV', 'V', 5000, 'no digit after it'],
  ['82 \u00b5F', '\u00b5F', 82, 'micro sign'],
  ['82 \u03bcF', '\u00b5F', 82, 'Greek mu'],
  ['82 uF', '\u00b5F', 82, 'the letter that stands for it'],
  ['0.082 mF', '\u00b5F', 82, 'milli is not mega'],
  ['3 \u03a9', 'ohm', 3, 'Greek omega'],
  ['3 \u2126', 'ohm', 3, 'ohm sign'],
  ['268 kohm', 'ohm', 268_000, 'spelled out'],
  ['7 %', '%', 7, 'a share'],
  ['7%', '%', 7, 'a share'],
  ['2 min', 's', 120, 'minutes'],
  ['1.5 h', 's', 5400, 'hours'],
  ['250 ms', 's', 0.25, 'a prefix on seconds'],
  ['1 GW', 'kW', 1e6, 'largest prefix'],
  ['4700 pF', '\u00b5F', 0.0047, 'smallest prefix'],
  ['50 hp', 'kW', 37.284_993_579_113_51, 'mechanical horsepower, 550 ft·lbf/s = 745.69987158227022 W'],
  ['0.4 km', 'm', 400, 'a length'],
  ['120 mohm/km', 'ohm/km', 0.12, 'a resistance for a length'],
  ['0.12 \u03a9/km', 'ohm/km', 0.12, 'with the sign'],
  ['0.12 mohm/m', 'ohm/km', 0.12, 'both prefixes shift'],
  ['25 kA', 'kA', 25, 'a fault current'],
  ['95 mm\u00b2', 'mm2', 95, 'a cross-section'],
  ['500 kcmil', 'mm2', 253.353_739_548_748_85, '1 000 circular mils are π/4 · (25.4 µm)² · 1 000'],
  ['40 \u00b0C', '\u00b0C', 40, 'a temperature'],
];

const refusals: [text: string, unit: string, fault: string, why: string][] = [
  ['1250', 'kVA', 'no-unit', 'a number alone could be anything'],
  ['1250 kW', 'kVA', 'other-dimension', 'kVA are no kW'],
  ['50 kvar', 'kVA', 'other-dimension', 'nor kvar'],
  ['400 A', 'V', 'other-dimension', 'amperes'],
  ['5 kW', '%', 'other-dimension', 'a power is no share'],
  ['1 kWh', 'kW', 'other-dimension', 'an energy is no power'],
  ['5 kv', 'V', 'unknown-unit', 'letters have their case'],
  ['5 furlong', 'm', 'unknown-unit', 'not in the table'],
  ['5 ohm/furlong', 'ohm/km', 'unknown-unit', 'nor below a stroke'],
  ['5 ohm', 'ohm/km', 'other-dimension', 'a resistance is none for a length'],
  ['5 ohm/km/km', 'ohm/km', 'unknown-unit', 'one stroke at most'],
  ['5 k%', '%', 'unknown-unit', 'a share has no prefix'],
  ['5 constructor', 'V', 'unknown-unit', 'no word of the language is a unit'],
  ['1,25 MVA', 'kVA', 'number', 'a decimal comma'],
  ['1 250 kVA', 'kVA', 'number', 'digits in groups'],
  ['1.2.3 kVA', 'kVA', 'number', 'two points'],
  ['lots', 'kVA', 'number', 'no number'],
  ['', 'kVA', 'number', 'nothing'],
  ['Infinity V', 'V', 'number', 'no digits'],
  [`${'9'.repeat(100)} V`, 'V', 'number', 'longer than anybody means'],
];

describe('a text with a unit', () => {
  it.each(readings)('%s in %s is %d: %s', (text, unit, value, _why) => {
    expect(readQuantity(text, unit)).toEqual({ value });
  });

  it.each(refusals)('%s in %s is refused as %s: %s', (text, unit, fault, _why) => {
    expect(readQuantity(text, unit)).toEqual({ fault });
  });

  // mathjs has neither kvar nor the Greek letters, and takes VA for W: only the units both know are compared.
  it('is read as a general unit library reads it', () => {
    const units = ['V', 'A', 'W', 'ohm', 'F', 'H', 'Hz', 's', 'Wh'];
    const prefixes = ['p', 'n', 'u', 'm', '', 'k', 'M', 'G'];
    const amount = fc.tuple(fc.integer({ min: -999_999, max: 999_999 }), fc.integer({ min: -6, max: 3 }));
    fc.assert(
      fc.property(
        fc.constantFrom(...units),
        fc.constantFrom(...prefixes),
        fc.constantFrom(...prefixes),
        amount,
        (unit, from, to, [digits, power]) => {
          const text = `${digits}e${power} ${from}${unit}`;
          const ours = readQuantity(text, `${to}${unit}`);
          const theirs = Number(mathjsUnit(text).toNumber(`${to}${unit}`) satisfies MathNumericType);
          expect(ours).toHaveProperty('value');
          // theirs multiplies in binary, a few rounding errors of 1.1e-16 each
          const value = 'value' in ours ? ours.value : Number.NaN;
          expect(Math.abs(value - theirs)).toBeLessThanOrEqual(1e-14 * Math.abs(theirs));
        },
      ),
      { seed: SEED, numRuns: 2000 },
    );
  });

  it('gives back the digits it was written with, whatever the prefix', () => {
    const shifts: [string, number][] = [
      ['MVA', 6],
      ['kVA', 3],
      ['VA', 0],
      ['mVA', -3],
    ];
    fc.assert(
      fc.property(
        fc.double({ min: 1e-6, max: 1e9, noNaN: true }),
        fc.constantFrom(...shifts),
        (value, [unit, power]) => {
          const [digits, exponent] = value.toExponential().split('e');
          const text = `${digits}e${Number(exponent) - power + 3} ${unit}`;
          expect(readQuantity(text, 'kVA')).toEqual({ value });
        },
      ),
      { seed: SEED, numRuns: 2000 },
    );
  });
});

describe('the last word of a name', () => {
  it.each([
    ['ratedKva', 'kVA'],
    ['ratedKvar', 'kvar'],
    ['kvar', 'kvar'],
    ['loadLossKw', 'kW'],
    ['faultLevelMva', 'MVA'],
    ['nominalV', 'V'],
    ['fundamentalA', 'A'],
    ['dischargeOhm', 'ohm'],
    ['stepDelayS', 's'],
    ['frequencyHz', 'Hz'],
    ['reactorPct', '%'],
    ['pct', '%'],
    ['capacitanceUf', '\u00b5F'],
    ['reactorMh', 'mH'],
    ['interStageUh', '\u00b5H'],
    ['activeKwh', 'kWh'],
    ['laggingKvarh', 'kvarh'],
    ['maxKa', 'kA'],
    ['atKv', 'kV'],
    ['lengthM', 'm'],
    ['resistanceOhmPerKm', 'ohm/km'],
    ['crossSectionMm2', 'mm²'],
    ['ambientMaxC', '\u00b0C'],
    ['allowedRiseK', 'K'],
    ['airFlowM3PerH', 'm3/h'],
  ])('of %s means %s', (name, unit) => {
    expect(unitOfName(name)).toBe(unit);
  });

  it.each(['orderH', 'count', 'powerFactor', 'rOverX', 'name', 'rules', 's', 'v', 'a'])(
    'of %s means no unit',
    (name) => {
      expect(unitOfName(name)).toBeNull();
    },
  );
});
