import { describe, expect, it } from 'vitest';
import { decimateColumns } from './decimate.js';

describe('thinning a row of points to columns of pixels', () => {
  it('keeps the least and the greatest of every column, in their order', () => {
    const y = [5, 9, 1, 4, 7, 7, 7, 2];
    const place = [0, 0.2, 0.4, 0.8, 1, 1.2, 1.4, 1.9];
    expect(decimateColumns(place, y)).toEqual([0, 1, 2, 3, 4, 7]);
  });

  it('loses no peak of a long record', () => {
    const n = 35_040;
    const y = Float64Array.from({ length: n }, (_, i) => (i === 20_123 ? 900 : Math.sin(i)));
    const place = Float64Array.from({ length: n }, (_, i) => (i / n) * 500);
    const kept = decimateColumns(place, y);
    expect(kept).toContain(20_123);
    expect(kept.length).toBeLessThanOrEqual(4 * 500);
  });

  it('keeps a gap as a gap', () => {
    const kept = decimateColumns([0, 0.1, 0.2, 0.3], [1, Number.NaN, Number.NaN, 2]);
    expect(kept).toEqual([0, 1, 3]);
  });
});
