import { describe, expect, it } from 'vitest';
import { judgingLine, judgingProgress } from './judging-progress.js';

function told(steps: [atMs: number, fraction: number][]): string[] {
  const lines: string[] = [];
  let now = 5000;
  const report = judgingProgress(
    (line) => lines.push(line),
    () => now,
  );
  for (const [atMs, fraction] of steps) {
    now = 5000 + atMs;
    report(fraction);
  }
  return lines;
}

describe('how far a plan is', () => {
  it('is not said within the first second, and once a second after it', () => {
    expect(told([[900, 0.9]])).toEqual([]);
    const lines = told([
      [1000, 0.1],
      [1500, 0.2],
      [1999, 0.3],
      [2000, 0.4],
    ]);
    expect(lines).toEqual(['10 % done, 10 % a second, about 9 s left', '40 % done, 20 % a second, about 3 s left']);
  });

  it('is not said where nothing or everything is done', () => {
    expect(
      told([
        [1200, 0],
        [2400, 1],
      ]),
    ).toEqual([]);
  });

  it('counts the time left in minutes where it is long', () => {
    expect(judgingLine(0.01, 6)).toBe('1 % done, 0.2 % a second, about 10 min left');
  });
});
