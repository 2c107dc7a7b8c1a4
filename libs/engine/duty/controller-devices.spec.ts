import { describe, expect, it } from 'vitest';
import type { Bank, StageGroup } from '../layout/bank.js';
import type { Control } from '../operation/control.js';
import { controllerDevices, responseA } from './controller-devices.js';
import type { SiteFacts } from './site-facts.js';

const group = (parts: Partial<StageGroup> = {}): StageGroup => ({
  count: 4,
  ratedKvar: 25,
  ratedV: 400,
  reactorPct: 0,
  reactorQuality: 30,
  dischargeOhm: null,
  reactorMaxA: null,
  switchPeakA: null,
  fixed: false,
  ...parts,
});
const bank = (...groups: StageGroup[]): Bank => ({
  groups,
  interStageUh: 2,
  interStageGiven: true,
  ambientCategory: null,
});
const control = { responseRatio: 0.65 } as Control;
const facts = (parts: Partial<SiteFacts>): SiteFacts => ({
  place: {},
  earthing: null,
  photovoltaicKw: 0,
  fast: [],
  measured: null,
  currentTransformer: null,
  generator: {},
  bank: null,
  ...parts,
});
const rows = (of: Bank, parts: Partial<SiteFacts>, generator = false) =>
  controllerDevices(of, { nominalV: 400, control, facts: facts(parts), generator });
const transformer = { ratioPrimaryA: 1000, ratioSecondaryA: 5 };

describe('the controller’s current transformer', () => {
  // 25 kvar at 400 V are 36.08 A; 0.65 of that through 1000/5 are 0.1173 A.
  const expectedA = ((0.65 * 25_000) / (Math.sqrt(3) * 400)) * (5 / 1000);

  it('gives the smallest switched stage’s threshold at its secondary', () => {
    const of = bank(group(), group({ ratedKvar: 10, fixed: true }));
    expect(responseA(of, 400, control, transformer)).toBeCloseTo(expectedA, 12);
  });

  it.each([
    [undefined, 'open'],
    [0.05, 'fits'],
    [0.1172, 'fits'],
    [0.12, 'short'],
  ])('with a controller that answers to %s A is %s', (sensitivityA, state) => {
    const given = sensitivityA === undefined ? transformer : { ...transformer, sensitivityA };
    const row = rows(bank(group()), { currentTransformer: given }).find(({ device }) => device.endsWith('response'))!;
    expect(row.state).toBe(state);
    expect(row.value).toBeCloseTo(expectedA, 12);
  });

  it.each([
    ['incomer', 'fits'],
    ['load', 'short'],
    ['bank', 'short'],
  ] as const)('that sees the %s %s: the controller must see loads and bank', (place, state) => {
    const row = rows(bank(group()), { currentTransformer: { ...transformer, place } })[0]!;
    expect([row.device, row.state]).toEqual(['currentTransformer.place', state]);
  });

  it('is not asked for where nothing is switched', () => {
    expect(rows(bank(group({ fixed: true })), {})).toEqual([]);
  });
});

describe('a bank on a generator', () => {
  const state = (parts: SiteFacts['generator'], generator = true) =>
    rows(bank(group()), { generator: parts }, generator).find(({ device }) => device === 'generator.holdOff')?.state;

  it.each([
    [{}, 'open', 'nobody has said'],
    [{ holdOff: true }, 'fits', 'held off'],
    [{ holdOff: false }, 'short', 'not held off, and nothing allowed'],
    [{ allowedKvar: 100 }, 'fits', 'the whole bank is allowed'],
    [{ allowedKvar: 99 }, 'short', 'the bank can connect more than is allowed'],
  ] as const)('%j is %s: %s', (given, expected, _why) => {
    expect(state(given)).toBe(expected);
  });

  it('is asked for only where there is one', () => {
    expect(state({}, false)).toBeUndefined();
  });
});
