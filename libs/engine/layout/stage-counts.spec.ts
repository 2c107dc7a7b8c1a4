import { describe, expect, it } from 'vitest';
import { eachStageCount } from './stage-counts.js';

function listed(stageKvar: number[], maxStages: number, evenSteps: boolean): string[] {
  const found: string[] = [];
  eachStageCount({ stageKvar, maxStages, evenSteps }, (counts) => found.push(counts.join(' ')));
  return found.sort();
}

// every sum of stages, and whether two neighbours are further apart than the smallest stage
function isEven(stageKvar: number[], counts: number[]): boolean {
  const stages = counts.flatMap((count, k) => new Array<number>(count).fill(stageKvar[k]!));
  let sums = new Set([0]);
  for (const stage of stages) sums = new Set([...sums, ...[...sums].map((sum) => sum + stage)]);
  const levels = [...sums].sort((a, b) => a - b);
  const smallest = Math.min(...stages);
  return levels.every((level, k) => k === 0 || level - levels[k - 1]! <= smallest + 1e-9);
}

describe('choices of stages', () => {
  it('are all multisets of 1 to the most stages: C(n + k, k) − 1 of them', () => {
    expect(listed([10, 20, 50], 4, false)).toHaveLength(34);
    expect(listed([25], 3, false)).toEqual(['1', '2', '3']);
  });

  it.each([
    [[10, 20, 50], 6],
    [[5, 7.5, 12.5, 30], 5],
    [[25, 50, 100, 200], 5],
    [[10, 25], 8],
  ])('of %j with even steps are those whose levels are no further apart than the smallest stage', (sizes, most) => {
    const even = listed(sizes, most, true);
    const expected = listed(sizes, most, false).filter((counts) => isEven(sizes, counts.split(' ').map(Number)));
    expect(even).toEqual(expected);
    expect(even.length).toBeGreaterThan(0);
  });
});
