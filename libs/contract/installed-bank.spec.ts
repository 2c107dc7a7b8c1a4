import { describe, expect, it } from 'vitest';
import { InputProblem } from '#libs/engine/index.js';
import { readSite } from './read-site.js';

function siteWith(parts: Record<string, unknown>) {
  return {
    name: 'Invented Mill',
    timeZone: 'Europe/Dublin',
    rules: 'iec',
    frequencyHz: 50,
    bus: { nominalV: 400 },
    supply: { faultLevelMva: { max: 250 } },
    ...parts,
  };
}

const STAGE = { count: 2, ratedKvar: 50, ratedV: 480 };
const measured = (measurement: Record<string, unknown>) =>
  siteWith({ bank: { stages: [{ ...STAGE, measurements: [{ stage: 1, date: '2025-01-01', ...measurement }] }] } });

function problemOf(json: unknown) {
  try {
    readSite(json);
  } catch (error) {
    if (error instanceof InputProblem) return error.problems[0];
    throw error;
  }
  return null;
}

describe('an installed bank', () => {
  it('has dates and measurements with units', () => {
    const site = readSite(measured({ busV: '0.4 kV', lineA: ['50 A', 51, 49], instrument: 'clamp meter 3' }));
    expect(site.bank!.stages[0]!.measurements).toEqual([
      { stage: 1, date: '2025-01-01', busV: 400, lineA: [50, 51, 49], instrument: 'clamp meter 3' },
    ]);
  });

  it.each([
    ['two line currents of three', { busV: 400, lineA: [50, 50] }, 'lineA'],
    ['a day that does not exist', { date: '2025-02-30' }, 'date'],
    ['a negative capacitance', { terminalUf: [1, 1, -1], connection: 'delta' }, 'terminalUf[2]'],
    ['a connection nobody knows', { terminalUf: [1, 1, 1], connection: 'zigzag' }, 'connection'],
  ])('with %s is refused at that field', (_, measurement, field) => {
    const path = problemOf(measured(measurement))!.path!;
    expect(path.startsWith(`bank.stages[0].measurements[0].${field}`)).toBe(true);
  });
});

describe('a bank that was switching while the record was taken', () => {
  it('may be the site’s own, or one of its own with its own settings', () => {
    const own = readSite(siteWith({ bank: { stages: [STAGE] }, recordedBank: { state: 'switching' } }));
    expect(own.recordedBank).toEqual({ state: 'switching' });
    const other = readSite(
      siteWith({
        recordedBank: {
          state: 'switching',
          bank: { stages: [{ ...STAGE, tunedHz: 189 }] },
          control: { reconnectDelayS: '3 min' },
        },
      }),
    );
    expect(other.recordedBank).toMatchObject({
      bank: { stages: [{ reactorPct: expect.closeTo((50 / 189) ** 2 * 100, 9) }] },
      control: { reconnectDelayS: 180 },
    });
    expect(other.understood![0]!.path).toBe('recordedBank.bank.stages[0].tunedHz');
  });

  it.each([
    ['without a nameplate', {}, 'recordedBank.bank', 'missing'],
    [
      'with a least power factor of the load above its greatest',
      { bank: { stages: [STAGE] }, loadPowerFactor: { min: 0.9, max: 0.8 } },
      'recordedBank.loadPowerFactor.min',
      'inconsistent',
    ],
    [
      'with a reactor given twice',
      { bank: { stages: [{ ...STAGE, reactorPct: 7, tunedHz: 189 }] } },
      'recordedBank.bank.stages[0].tunedHz',
      'inconsistent',
    ],
  ])('%s is refused', (_, parts, path, code) => {
    expect(problemOf(siteWith({ recordedBank: { state: 'switching', ...parts } }))).toMatchObject({ path, code });
  });
});
