import { describe, expect, it } from 'vitest';
import { needColumn, type Target, targetKw } from './need.js';

const at8: Target = { powerFactor: 0.8, onExport: 'importOnly' };

const rows: [activeKw: number, reactiveKvar: number, target: Target, needKvar: number, why: string][] = [
  [80, 100, at8, 40, '80 kW may have 60 kvar at 0.8'],
  [80, 60, at8, 0, 'just at the target'],
  [80, -50, at8, 0, 'leading: nothing to add'],
  [-80, 100, at8, 100, 'exported power counts as none'],
  [-80, 100, { ...at8, onExport: 'absolute' }, 40, 'or by its size, where the target says so'],
  [0, 10, at8, 10, 'without active power every kvar is too many'],
  [100, 30, { ...at8, powerFactor: 1 }, 30, 'unity leaves none'],
];

describe('need at the bus', () => {
  it.each(rows)('%d kW and %d kvar with %j: %d kvar, %s', (activeKw, reactiveKvar, target, needKvar, _why) => {
    const load = {
      metering: { at: 'bus' as const },
      activeKw: Float64Array.of(activeKw),
      reactiveKvar: Float64Array.of(reactiveKvar),
    };
    expect(needColumn(load, target, Float64Array.of(0))[0]).toBeCloseTo(needKvar, 12);
  });
});

describe('active power a target is held against', () => {
  it.each([
    [5, 'importOnly', 5],
    [-5, 'importOnly', 0],
    [-5, 'absolute', 5],
  ] as const)('%d kW, %s: %d', (activeKw, onExport, counted) => {
    expect(targetKw(activeKw, onExport)).toBe(counted);
  });
});

describe('need behind a transformer', () => {
  const passage = { baseKva: 1000, noLoadKw: 2, noLoadKvar: 15, rPu: 0.01, xPu: 0.05 };

  it('of an idle site is the transformer’s magnetising kvar', () => {
    const load = {
      metering: { at: 'primary' as const, passage },
      activeKw: Float64Array.of(0),
      reactiveKvar: Float64Array.of(0),
    };
    // All of it but what 2 kW of no-load loss may have, and the little the bank's own current takes in the reactance.
    const [need] = needColumn(load, { powerFactor: 0.95, onExport: 'importOnly' }, Float64Array.of(0));
    expect(need).toBeGreaterThan(14);
    expect(need).toBeLessThan(15);
  });

  it('of a load beyond what the transformer lets through is a refusal', () => {
    const load = {
      metering: { at: 'primary' as const, passage },
      activeKw: Float64Array.of(0),
      reactiveKvar: Float64Array.of(9000),
    };
    expect(() => needColumn(load, at8, Float64Array.of(0))).toThrow('greatest power');
  });
});
