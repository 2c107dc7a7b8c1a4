import { describe, expect, it } from 'vitest';
import { readTyped } from './read-typed.js';

describe('a quantity as people type it', () => {
  it.each([
    ['1250', 'kVA', 1250, 'a bare number is in the field’s own unit'],
    ['1 250', 'kVA', 1250, 'a space stands between thousands'],
    ['1.25 MVA', 'kVA', 1250, 'the prefix shifts the point'],
    ['1,25 MVA', 'kVA', 1250, 'a lone comma is the decimal mark'],
    ['0,4 kV', 'V', 400, 'the same for volts'],
    ['1.250,5', 'V', 1250.5, 'of two marks the last is the decimal one'],
    ['1,250.5', 'V', 1250.5, 'whichever it is'],
    ['0.95', '', 0.95, 'a pure number has no unit'],
    ['−3', 'kW', -3, 'a true minus'],
  ])('%s in %s is %d: %s', (text, unit, value) => {
    expect(readTyped(text, unit)).toMatchObject({ value });
  });

  it('is shown as understood where it was not typed in the field’s own way', () => {
    expect(readTyped('0,4 kV', 'V')).toMatchObject({ echo: '0,4 kV: 400\u00a0V' });
    expect(readTyped('400', 'V')).toMatchObject({ echo: null });
  });

  it.each([
    ['12 kV', 'MVA', 'another dimension'],
    ['twelve', 'kW', 'no number'],
    ['1,2,3', 'kW', 'two decimal marks'],
    ['5 furlongs', 'V', 'an unknown unit'],
    ['5 V', '', 'a unit where there is none'],
  ])('%s for %s is no value: %s', (text, unit) => {
    expect(readTyped(text, unit)).toHaveProperty('fault');
  });
});
