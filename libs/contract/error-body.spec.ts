import { describe, expect, it } from 'vitest';
import { InputProblem, PROBLEM_CODES } from '#libs/engine/index.js';
import { EXIT_CODE, errorBody, faultBody, HTTP_STATUS, problemJson } from './error-body.js';
import { Question } from './question.js';

const first = { code: 'bad-number' as const, row: 7, column: 3, expected: 'a number', found: '"x"' };
const second = { code: 'missing' as const, path: 'bus', expected: 'an object', found: 'nothing' };

describe('the body of an error', () => {
  it('carries the first problem on top and all of them below', () => {
    expect(errorBody(new InputProblem([first, second]))).toEqual({
      error: {
        code: 'bad-number',
        message: 'row 7, column 3: expected a number, found "x" (and 1 more)',
        row: 7,
        column: 3,
        problems: [first, second],
      },
    });
  });

  it('of a question carries the readings, each with the map that settles it', () => {
    const readings = [
      { map: { dateOrder: 'dmy' as const }, maxKw: 1, activeKwh: 2, firstRows: [['03/04/2026 00:15', '1']] },
      { map: { dateOrder: 'mdy' as const }, maxKw: 1, activeKwh: 2, firstRows: [['03/04/2026 00:15', '1']] },
    ];
    const asked = [{ id: 'date-order', about: 'which comes first, day or month', readings }];
    const { error } = errorBody(new Question(asked));
    expect(error).toMatchObject({ code: 'question', questions: asked });
    expect(problemJson(new Question(asked))).toMatchObject({ status: 422, code: 'question', questions: asked });
    expect(EXIT_CODE[new Question(asked).code]).toBe(3);
  });

  it('over HTTP is a problem document with code and problems added', () => {
    expect(problemJson(new InputProblem([second]))).toEqual({
      type: 'about:blank',
      title: 'The input is refused',
      status: 422,
      detail: 'bus: expected an object, found nothing',
      code: 'missing',
      path: 'bus',
      problems: [second],
    });
  });

  it('of a fault says what happened and names no problem of the caller', () => {
    expect(faultBody(new Error('broken'))).toEqual({ error: { code: 'fault', message: 'broken', problems: [] } });
  });
});

describe('every code of a problem', () => {
  it('has an exit code of the contract and a status that blames the request', () => {
    for (const code of PROBLEM_CODES) {
      expect([2, 3, 130], code).toContain(EXIT_CODE[code]);
      expect(HTTP_STATUS[code], code).toBeGreaterThanOrEqual(400);
      expect(HTTP_STATUS[code], code).toBeLessThan(500);
    }
  });
});
