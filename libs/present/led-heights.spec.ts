// Heights worked out by hand.
import { describe, expect, it } from 'vitest';
import { ledHeights } from './led-heights.js';

const ROOM = { line: 16, above: 4, top: 8 };

describe('words that lead back to their points', () => {
  it('stand at their points where these are far enough apart', () => {
    expect(ledHeights([40, 80, 120], ROOM)).toEqual([36, 76, 116]);
  });

  it('go up where the points are close, so that a falling curve right of them stays free', () => {
    expect(ledHeights([60, 66, 70], ROOM)).toEqual([34, 50, 66]);
    expect(ledHeights([70, 60, 66], ROOM)).toEqual([66, 34, 50]);
  });

  it('go down again below the top, a line apart', () => {
    expect(ledHeights([12, 16, 20], ROOM)).toEqual([8, 24, 40]);
  });
});
