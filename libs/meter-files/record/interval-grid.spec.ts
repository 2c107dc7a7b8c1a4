import { describe, expect, it } from 'vitest';
import { ConflictingRows, gridRows, sameIn } from './interval-grid.js';

function grid(utcS: number[], options: { values?: number[]; keep?: 'first' | 'last'; spanS?: number } = {}) {
  const values = Float64Array.from(options.values ?? utcS.map(() => 1));
  const rowNumber = Int32Array.from(utcS, (_, i) => i + 2);
  const rows = {
    utcS: Float64Array.from(utcS),
    rowNumber,
    agree: sameIn([values]),
    spanS: options.spanS ?? Number.NaN,
  };
  const found = gridRows(rows, options.keep);
  return { ...found, kept: Array.from(found.kept) };
}

describe('the grid of a record', () => {
  it('has the commonest step as its interval and keeps gaps as gaps', () => {
    expect(grid([0, 900, 1800, 4500, 5400])).toMatchObject({ intervalS: 900, kept: [0, 1, 2, 3, 4] });
  });

  it('is refused where rows lie further apart than any month, and not where they are a month apart', () => {
    const monthS = 31 * 86_400;
    expect(grid([0, monthS]).intervalS).toBe(monthS);
    expect(() => grid([0, monthS + 1])).toThrow(`row 3: expected an interval of at most ${monthS} s`);
    expect(() => grid([3_155_672_700, 0])).toThrow('row 2: expected an interval of at most');
  });

  it('puts rows in time order', () => {
    expect(grid([1800, 900, 0])).toMatchObject({ kept: [2, 1, 0], misplaced: 0 });
    expect(grid([0, 1800, 900, 2700])).toMatchObject({ kept: [0, 2, 1, 3], misplaced: 1 });
  });

  it('drops identical repeats and counts them', () => {
    expect(grid([0, 900, 900, 1800, 0])).toMatchObject({ kept: [0, 1, 3], duplicates: 2 });
    const withoutValues = [1, Number.NaN, Number.NaN, 1];
    expect(grid([0, 900, 900, 1800], { values: withoutValues })).toMatchObject({ duplicates: 1 });
  });

  it('refuses a repeat with other values, naming both rows, until someone says which counts', () => {
    const values = [1, 2, 3, 4];
    const conflict = () => grid([0, 900, 900, 1800], { values });
    expect(conflict).toThrow(ConflictingRows);
    expect(conflict).toThrow('row 4: expected the values of row 3');
    expect(grid([0, 900, 900, 1800], { values, keep: 'first' })).toMatchObject({ kept: [0, 1, 3], overruled: 1 });
    expect(grid([0, 900, 900, 1800], { values, keep: 'last' })).toMatchObject({ kept: [0, 2, 3], overruled: 1 });
  });

  it('keeps the first or last row of the file where the file runs backwards', () => {
    const values = [4, 3, 2, 1];
    expect(grid([1800, 900, 900, 0], { values, keep: 'first' }).kept).toEqual([3, 1, 0]);
    expect(grid([1800, 900, 900, 0], { values, keep: 'last' }).kept).toEqual([3, 2, 0]);
  });

  it.each([
    [[0, 900, 1800, 2400], 'row 5: expected an interval of 900 s, found 600 s'],
    [[0, 900, 1800, 2700, 3900], 'row 6: expected an interval of 900 s, found 1200 s'],
    [[0, 900, 1800, 2700, 3600, 5400, 7200, 9000], 'row 7: expected an interval of 900 s, found 1800 s'],
    [[0, 900, 2700, 4500, 6300, 8100], 'row 3: expected an interval of 1800 s, found 900 s'],
  ])('refuses intervals of two lengths, naming the row', (utcS, message) => {
    expect(() => grid(utcS)).toThrow(message);
  });

  it('does not take scattered gaps for a second interval length', () => {
    // every tenth row is missing at random places of a fixed sequence: runs of three equal gaps occur by chance
    let state = 11;
    const there = () => {
      state = (state * 48_271) % 2_147_483_647;
      return state % 10 !== 0;
    };
    const utcS = Array.from({ length: 40_000 }, (_, i) => i * 900).filter(there);
    const steps = utcS.map((moment, i) => moment - (utcS[i - 1] ?? -900));
    const runs = steps.filter((step, i) => step === 1800 && steps[i - 1] === 1800 && steps[i - 2] === 1800);
    expect(runs.length).toBeGreaterThan(3);
    expect(grid(utcS).intervalS).toBe(900);
  });

  it('takes the length that the rows state over the one that the steps suggest', () => {
    expect(grid([0, 1800, 3600], { spanS: 900 })).toMatchObject({ intervalS: 900 });
    expect(grid([0], { spanS: 900 })).toMatchObject({ intervalS: 900 });
    expect(() => grid([0])).toThrow('at least two intervals');
  });
});
