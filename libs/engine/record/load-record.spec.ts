import { describe, expect, it } from 'vitest';
import { InputProblem, type Problem } from '../problem.js';
import { createLoadRecord, type LoadRecordParts } from './load-record.js';

function parts(more: Partial<LoadRecordParts> = {}): LoadRecordParts {
  return {
    intervalS: 900,
    beginS: Float64Array.of(0, 900, 2700),
    activeKw: Float64Array.of(1, -2, 3),
    laggingKvar: Float64Array.of(1, 0, 0),
    leadingKvar: Float64Array.of(0, 0, 2),
    ...more,
  };
}

function problems(more: Partial<LoadRecordParts>): readonly Problem[] {
  try {
    createLoadRecord(parts(more));
  } catch (problem) {
    if (problem instanceof InputProblem) return problem.problems;
    throw problem;
  }
  return [];
}

describe('a record', () => {
  it('counts what is missing between its first and last interval', () => {
    const record = createLoadRecord(parts());
    expect(record).toMatchObject({ firstS: 0, endS: 3600, missing: 1, repaired: 0, duplicates: 0, notes: [] });
    expect(record).toMatchObject({ voltageV: null, connectedKvar: null, standby: null });
  });

  it('keeps the columns it was given', () => {
    const voltageV = Float64Array.of(400, 401, 402);
    expect(createLoadRecord(parts({ voltageV })).voltageV).toBe(voltageV);
  });

  it.each([
    [{ beginS: new Float64Array(0) }, 'empty-file', 'nothing to work on'],
    [{ activeKw: Float64Array.of(1, 2) }, 'wrong-length', 'columns of one length'],
    [{ voltageV: Float64Array.of(1) }, 'wrong-length', 'optional columns too'],
    [{ standby: Uint8Array.of(1) }, 'wrong-length', 'optional columns too'],
    [{ beginS: Float64Array.of(0, 900, 900) }, 'mixed-intervals', 'a stamp twice'],
    [{ beginS: Float64Array.of(900, 0, 2700) }, 'mixed-intervals', 'a stamp that goes back'],
    [{ beginS: Float64Array.of(0, 900, 2000) }, 'mixed-intervals', 'a stamp beside the grid'],
    [{ beginS: Float64Array.of(0, 450, 2700) }, 'mixed-intervals', 'half an interval'],
    [{ beginS: Float64Array.of(Number.NaN, 900, 2700) }, 'mixed-intervals', 'no stamp'],
    [{ beginS: Float64Array.of(0, 900, Number.POSITIVE_INFINITY) }, 'mixed-intervals', 'a stamp without end'],
    [{ intervalS: 0 }, 'out-of-range', 'no length'],
    [{ intervalS: -900 }, 'out-of-range', 'a length backwards'],
    [{ intervalS: Number.NaN }, 'out-of-range', 'a length that is no number'],
    [{ activeKw: Float64Array.of(1, Number.NaN, 3) }, 'not-finite', 'no value'],
    [{ laggingKvar: Float64Array.of(0, 0, -1e-9) }, 'not-finite', 'a lagging column has no sign'],
    [{ voltageV: Float64Array.of(-400, 400, 400) }, 'not-finite', 'a voltage has none'],
    [{ connectedKvar: Float64Array.of(1, 2, Number.POSITIVE_INFINITY) }, 'not-finite', 'an old bank without end'],
  ])('%# is refused: %s, %s', (more, code, _why) => {
    expect(problems(more).map((problem) => problem.code)).toEqual([code]);
  });

  it('names every column that has a bad value, with its row', () => {
    const found = problems({
      activeKw: Float64Array.of(1, Number.NaN, 3),
      leadingKvar: Float64Array.of(0, 0, -1),
    });
    expect(found.map(({ path, row }) => [path, row])).toEqual([
      ['activeKw', 2],
      ['leadingKvar', 3],
    ]);
  });
});
