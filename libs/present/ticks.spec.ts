import { describe, expect, it } from 'vitest';
import { linearAxis, logAxis, niceStep, placeOnAxis } from './ticks.js';

describe('an axis', () => {
  it('steps by 1, 2 or 5 times a power of ten', () => {
    expect(niceStep(0, 292, 5)).toBe(100);
    expect(niceStep(0, 8.3, 5)).toBe(2);
    expect(niceStep(0, 0.041, 5)).toBeCloseTo(0.01, 12);
  });

  it('holds its values and has a tick at both round ends', () => {
    const axis = linearAxis('needed', 'kvar', { least: -40, most: 292 });
    expect(axis.from).toBeLessThanOrEqual(-40);
    expect(axis.to).toBeGreaterThanOrEqual(292);
    expect(axis.ticks[0]!.at).toBe(axis.from);
    expect(axis.ticks.at(-1)!.at).toBeCloseTo(axis.to, 9);
  });

  it('has a height where nothing is to be shown', () => {
    const axis = linearAxis('needed', 'kvar', { least: 0, most: 0 });
    expect(axis.to).toBeGreaterThan(axis.from);
  });

  it('places decades evenly on a logarithmic scale', () => {
    const axis = logAxis('impedance', 'mΩ', { least: 2, most: 1000 });
    expect(axis.from).toBe(2);
    expect(axis.to).toBe(1000);
    const decade = placeOnAxis(axis, 100) - placeOnAxis(axis, 10);
    expect(placeOnAxis(axis, 1000) - placeOnAxis(axis, 100)).toBeCloseTo(decade, 12);
  });
});
