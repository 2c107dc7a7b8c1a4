import { describe, expect, it } from 'vitest';
import { TracePyramid } from './trace-pyramid.js';

describe('the least and greatest of a stretch of the record', () => {
  const column = Float32Array.from({ length: 100_003 }, (_, i) => Math.sin(i / 7) * ((i * 7919) % 101));
  const pyramid = new TracePyramid(column);

  it('are those of the values themselves for short stretches', () => {
    for (const [from, to] of [
      [0, 1],
      [17, 40],
      [99_990, 100_003],
    ] as const) {
      const part = column.subarray(from, to);
      expect(pyramid.extent(from, to)).toEqual({ least: Math.min(...part), most: Math.max(...part) });
    }
  });

  it('never lose a peak of a long stretch, and reach past it by no more than a pixel of an eighth', () => {
    for (const [from, to] of [
      [0, 100_003],
      [1234, 56_789],
      [40_000, 40_700],
    ] as const) {
      const wide = Math.ceil((to - from) / 8);
      const within = [...column.subarray(from, to)];
      const around = [...column.subarray(Math.max(0, from - wide), to + wide)];
      const { least, most } = pyramid.extent(from, to);
      expect(most).toBeGreaterThanOrEqual(within.reduce((a, b) => Math.max(a, b)));
      expect(most).toBeLessThanOrEqual(around.reduce((a, b) => Math.max(a, b)));
      expect(least).toBeLessThanOrEqual(within.reduce((a, b) => Math.min(a, b)));
      expect(least).toBeGreaterThanOrEqual(around.reduce((a, b) => Math.min(a, b)));
    }
  });

  it('pass over what was not read, and are none where nothing was', () => {
    const holed = Float32Array.from({ length: 5000 }, (_, i) => (i >= 1000 && i < 4000 ? Number.NaN : i));
    const over = new TracePyramid(holed);
    expect(over.extent(950, 1050)).toEqual({ least: 950, most: 999 });
    expect(over.extent(2000, 2010)).toEqual({ least: Number.POSITIVE_INFINITY, most: Number.NEGATIVE_INFINITY });
  });
});
