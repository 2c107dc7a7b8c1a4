// Rows worked out by hand.
import { describe, expect, it } from 'vitest';
import { UTC_TABLE } from '#libs/engine/index.js';
import { tracePicture, traceRows } from './trace-rows.js';

const trace = {
  firstS: 1000,
  intervalS: 900,
  activeKw: Float32Array.from([1, 2, Number.NaN, 4, 5, Number.NaN]),
  reactiveKvar: Float32Array.from([10, -20, Number.NaN, 40, 50, Number.NaN]),
  gaps: [],
  zone: UTC_TABLE,
};

describe('the rows of a trace', () => {
  it('are the single intervals where they fit', () => {
    expect(traceRows(trace, { from: 1, to: 4 }, 3)).toEqual([
      { beginS: 1900, read: 1, kw: [2, 2], kvar: [-20, -20] },
      { beginS: 2800, read: 0, kw: null, kvar: null },
      { beginS: 3700, read: 1, kw: [4, 4], kvar: [40, 40] },
    ]);
  });

  it('are stretches with their least and most where they do not', () => {
    expect(traceRows(trace, { from: 0, to: 6 }, 3)).toEqual([
      { beginS: 1000, read: 2, kw: [1, 2], kvar: [-20, 10] },
      { beginS: 2800, read: 1, kw: [4, 4], kvar: [40, 40] },
      { beginS: 4600, read: 1, kw: [5, 5], kvar: [50, 50] },
    ]);
  });

  it('are drawn as a stroke each in both panes', () => {
    const picture = tracePicture(traceRows(trace, { from: 0, to: 6 }, 3), 'The record', UTC_TABLE);
    expect(picture.match(/M[\d.]+ [\d.]+V/g)).toHaveLength(6);
    expect(picture).not.toContain('NaN');
    expect(picture.match(/1\u00a0Jan\u00a01970/g)).toHaveLength(3);
  });
});
