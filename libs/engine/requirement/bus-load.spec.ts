import { describe, expect, it } from 'vitest';
import { createLoadRecord } from '../record/load-record.js';
import { busLoad } from './bus-load.js';

const record = (more = {}) =>
  createLoadRecord({
    intervalS: 900,
    beginS: Float64Array.of(0, 900),
    activeKw: Float64Array.of(100, -20),
    laggingKvar: Float64Array.of(80, 5),
    leadingKvar: Float64Array.of(0, 25),
    ...more,
  });

describe('the load at the bus', () => {
  const bus = { at: 'bus' as const };

  it('is net: lagging less leading', () => {
    expect([...busLoad(record(), bus, { state: 'none' }).reactiveKvar]).toEqual([80, -20]);
  });

  it('with a fixed old bank is its kvar more, in every interval', () => {
    expect([...busLoad(record(), bus, { state: 'fixed', kvar: 30 }).reactiveKvar]).toEqual([110, 10]);
  });

  it('with a logged one is what was connected more', () => {
    const logged = record({ connectedKvar: Float64Array.of(0, 50) });
    expect([...busLoad(logged, bus, { state: 'logged' }).reactiveKvar]).toEqual([80, 30]);
  });

  it('with a logged one and no column is a question to the user', () => {
    expect(() => busLoad(record(), bus, { state: 'logged' })).toThrow('connected kvar');
  });

  it('behind a transformer leaves out what the transformer takes; the old bank stood at the bus', () => {
    const passage = { baseKva: 1000, noLoadKw: 0, noLoadKvar: 10, rPu: 0, xPu: 0.05 };
    const load = busLoad(record(), { at: 'primary', passage }, { state: 'fixed', kvar: 30 });
    // 0.05 of (0.1² + 0.07²) per unit is 0.745 kvar.
    expect(load.reactiveKvar[0]).toBeCloseTo(80 - 10 - 0.05 * (0.1 ** 2 + 0.07 ** 2) * 1000 + 30, 9);
    expect(load.activeKw[0]).toBeCloseTo(100, 9);
  });

  it('that no transformer could have carried is refused, with the interval', () => {
    const passage = { baseKva: 4, noLoadKw: 0, noLoadKvar: 0, rPu: 0.01, xPu: 0.05 };
    expect(() => busLoad(record(), { at: 'primary', passage }, { state: 'none' })).toThrow(/beginning at 0 s/);
  });
});
