import { describe, expect, it } from 'vitest';
import { describeProblem, InputProblem, remark } from './problem.js';

describe('an input problem', () => {
  it.each([
    [
      { code: 'missing' as const, path: 'bank', expected: 'a bank', found: 'nothing' },
      'bank: expected a bank, found nothing',
    ],
    [
      { code: 'bad-number' as const, row: 7, column: 2, expected: 'a number', found: 'abc' },
      'row 7, column 2: expected a number, found abc',
    ],
    [{ code: 'usage' as const, expected: 'a file', found: 'two' }, 'expected a file, found two'],
  ])('%# is one sentence: %s', (problem, sentence) => {
    expect(describeProblem(problem)).toBe(sentence);
  });

  it('is a list, the first problem’s code on top', () => {
    const problem = new InputProblem([
      { code: 'missing', expected: 'a', found: 'b' },
      { code: 'usage', expected: 'c', found: 'd' },
    ]);
    expect(problem.code).toBe('missing');
    expect(problem.message.split('\n')).toHaveLength(2);
    expect(problem).toBeInstanceOf(Error);
  });
});

describe('a remark', () => {
  it('leaves words and effect to others', () => {
    expect(remark('record.short', { days: 3 })).toEqual({
      code: 'record.short',
      path: null,
      values: { days: 3 },
      unit: null,
      source: null,
      effect: null,
      text: '',
    });
  });
});
