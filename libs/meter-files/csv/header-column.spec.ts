import { describe, expect, it } from 'vitest';
import { readHeaderColumn } from './header-column.js';

const roleOf = (name: string) => readHeaderColumn(name, 0).role;

describe('a column name', () => {
  it.each([
    ['Usage_kWh', 'active'],
    ['active power [kW]', 'active'],
    ['Real Power (W)', 'active'],
    ['kW', 'active'],
    ['Wirkleistung in kW', 'active'],
    ['Wirkarbeit Bezug (kWh)', 'active'],
    ['Puissance active [kW]', 'active'],
    ['Energía activa (kWh)', 'active'],
    ['Demand kW', 'active'],
    ['P+ [kW]', 'active'],
    ['Wirkarbeit Lieferung (kWh)', 'exported'],
    ['Grid export kWh', 'exported'],
    ['P- [kW]', 'exported'],
    ['reactive power [kvar]', 'reactive'],
    ['Reactive power (kW)', 'reactive'],
    ['Blindleistung [kvar]', 'reactive'],
    ['Q (kvar)', 'reactive'],
    ['Lagging_Current_Reactive.Power_kVarh', 'lagging'],
    ['Blindarbeit induktiv kvarh', 'lagging'],
    ['kVArh lag', 'lagging'],
    ['Reactive import kvarh', 'lagging'],
    ['Q+ [kvar]', 'lagging'],
    ['Leading_Current_Reactive_Power_kVarh', 'leading'],
    ['Énergie réactive capacitive (kvarh)', 'leading'],
    ['kVArh lead', 'leading'],
    ['Energía reactiva capacitiva (kvarh)', 'leading'],
    ['Voltage L-L (V)', 'voltage'],
    ['Spannung [V]', 'voltage'],
    ['Capacitor bank [kvar]', 'connected'],
    ['connectedKvar', 'connected'],
    ['Kondensatorbatterie kvar', 'connected'],
    ['Standby (0/1)', 'standby'],
    ['stand-by', 'standby'],
    ['Lagging_Current_Power_Factor', 'powerFactor'],
    ['cos φ', 'powerFactor'],
    ['Facteur de puissance', 'powerFactor'],
    ['Apparent power (kVA)', 'apparent'],
    ['Scheinleistung', 'apparent'],
    ['Current L1 (A)', 'current'],
    ['Cumulative energy (kWh)', 'active'],
    ['Meter ID', 'meter'],
    ['Zählernummer', 'meter'],
    ['NMI', 'meter'],
    ['Meter reading (kWh)', 'active'],
    ['Quality', 'quality'],
    ['Messwertstatus', 'quality'],
    // what stands in the column decides
    ['WeekStatus', 'quality'],
    ['date', 'time'],
    ['Zeitstempel', 'time'],
    ['Horodatage', 'time'],
    ['interval begin [UTC]', 'time'],
  ])('"%s" is %s', (name, role) => {
    expect(roleOf(name)).toBe(role);
  });

  it.each(['NSM', 'Day_of_week', 'Load_Type', 'CO2(tCO2)', 'Load factor', 'THD (%)', 'Tariff', 'Temperature', ''])(
    '"%s" is of no use',
    (name) => {
      expect(roleOf(name)).toBeNull();
    },
  );

  it('keeps the site’s own kvar apart from the bank’s', () => {
    expect(roleOf('Reactive power after compensation (kvar)')).toBe('reactive');
  });

  it('says which end of the interval a stamp marks', () => {
    const markOf = (name: string) => readHeaderColumn(name, 0).mark;
    expect([markOf('Interval beginning'), markOf('Start time'), markOf('Von'), markOf('Desde')]).toEqual(
      Array(4).fill('begin'),
    );
    expect([markOf('Interval ending'), markOf('End time'), markOf('bis'), markOf('Fecha hasta')]).toEqual(
      Array(4).fill('end'),
    );
    expect([markOf('Time'), markOf('from - to')]).toEqual([null, null]);
  });

  it('says the zone where the name does', () => {
    const zoneOf = (name: string) => readHeaderColumn(name, 0).zone;
    expect([
      zoneOf('Time (UTC)'),
      zoneOf('timestamp_utc'),
      zoneOf('Zeit [UTC+1]'),
      zoneOf('Time GMT-05:30'),
      zoneOf('Time'),
    ]).toEqual(['UTC', 'UTC', '+01:00', '-05:30', null]);
  });

  it('knows a unit that it can’t read from a word of the trade', () => {
    const isForeign = (name: string) => readHeaderColumn(name, 0).foreignUnit;
    expect(['Active energy (MJ)', 'Active power [hp]', 'Leading reactive (kvrah)'].map(isForeign)).toEqual([
      true,
      true,
      true,
    ]);
    expect(['Active energy (import)', 'kWh (total)', 'Active power', 'Time (UTC)'].map(isForeign)).toEqual(
      Array(4).fill(false),
    );
  });

  it('says the phase, and what a voltage is measured between', () => {
    const phaseOf = (name: string) => readHeaderColumn(name, 0).phase;
    expect(['kW L1', 'P_L2 [kW]', 'phase C kvar', 'Phase S (kW)', 'kW', 'Leistung 1 kW'].map(phaseOf)).toEqual([
      1, 2, 3, 2, 0, 0,
    ]);
    const betweenOf = (name: string) => readHeaderColumn(name, 0).between;
    expect(['Voltage L-L (V)', 'U12 [V]', 'Voltage L1-L2 [V]', 'Voltage line to line (V)'].map(betweenOf)).toEqual(
      Array(4).fill('lineToLine'),
    );
    expect(['Voltage L-N (V)', 'Voltage L1-N (V)', 'phase to neutral voltage [V]'].map(betweenOf)).toEqual(
      Array(3).fill('lineToNeutral'),
    );
    expect(['Voltage (V)', 'Voltage L1 [V]', 'U1 [V]'].map(betweenOf)).toEqual([null, null, null]);
  });

  it('says a register, and where the word may mean the interval too', () => {
    const registerOf = (name: string) => readHeaderColumn(name, 0).register;
    expect(
      ['Cumulative energy (kWh)', 'Zählerstand kWh', 'kWh register', 'Meter reading (kWh)', 'kWh'].map(registerOf),
    ).toEqual(['said', 'said', 'said', 'maybe', null]);
  });

  it('remarks on reactive power in kilowatt, which can only be kvar', () => {
    expect(readHeaderColumn('reactive power in kilowatt', 0).reactiveInWatt).toBe(true);
  });
});
