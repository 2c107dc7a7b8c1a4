import { describe, expect, it } from 'vitest';
import { findUnit, readUnit } from './unit-text.js';

describe('a unit', () => {
  it.each([
    ['kW', 'active', false, 1],
    ['KW', 'active', false, 1],
    ['W', 'active', false, 0.001],
    ['MW', 'active', false, 1000],
    ['GWh', 'active', true, 1_000_000],
    ['kWh', 'active', true, 1],
    ['KWH', 'active', true, 1],
    ['kW·h', 'active', true, 1],
    ['kWhr', 'active', true, 1],
    ['kilowatt hours', 'active', true, 1],
    ['kWh/15min', 'active', true, 1],
    ['kvar', 'reactive', false, 1],
    ['kVAr', 'reactive', false, 1],
    ['kVArh', 'reactive', true, 1],
    ['KVARH', 'reactive', true, 1],
    ['Mvarh', 'reactive', true, 1000],
    ['varh', 'reactive', true, 0.001],
    ['kVA', 'apparent', false, 1],
    ['V', 'voltage', false, 1],
    ['kV', 'voltage', false, 1000],
  ])('%s', (text, family, energy, factor) => {
    const unit = readUnit(text)!;
    expect({ ...unit, factor: unit.times / unit.over }).toMatchObject({ family, energy, factor });
  });

  it.each(['', 'k', 'kWx', 'UTC', 'kW/h', 'Vh', '°C', 'tCO2', 'avg'])('"%s" is none', (text) => {
    expect(readUnit(text)).toBeNull();
  });

  it('a milliwatt is no unit of a site, an all-small mwh a megawatt hour, remarked upon', () => {
    expect(readUnit('mW')).toBeNull();
    expect(readUnit('mwh')).toMatchObject({ times: 1000, smallMega: true });
    expect(readUnit('MWh')).toMatchObject({ times: 1000, smallMega: false });
  });

  it.each([
    ['Active power [kW]', 'kW', 'Active power  '],
    ['Wirkarbeit (kWh)', 'kWh', 'Wirkarbeit  '],
    ['Usage_kWh', 'kWh', 'Usage'],
    ['Reactive.Power_kVarh', 'kVarh', 'Reactive.Power'],
    ['kWh', 'kWh', ''],
    ['active power in kilowatt', 'kilowatt', 'active power in'],
    ['activePowerKw', 'Kw', 'activePower'],
    ['U_V', 'V', 'U_'],
  ])('stands in a name in any bracket, behind an underscore or alone: %s', (name, unit, rest) => {
    expect(findUnit(name)).toEqual({ unit: readUnit(unit), rest });
  });

  it.each(['Now', 'phase A', 'Load_Type', 'CO2(tCO2)', 'Interval begin [UTC]', 'WeekStatus', 'NSM'])(
    'is not found in the name "%s"',
    (name) => {
      expect(findUnit(name).unit).toBeNull();
    },
  );
});
