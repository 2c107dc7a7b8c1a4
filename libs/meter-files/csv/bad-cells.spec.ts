// Cells and rows that no meter writes are refused by name and place within a second, and the next file is read.
import { afterEach, describe, expect, it } from 'vitest';
import { InputProblem } from '#libs/engine/index.js';
import { lines, readMeterText, refusalOf } from '../../../test/support/meter-text.js';
import { readMeterFile } from '../read-meter-file.js';

const rows = (second: string) =>
  lines('time,kW,kvar', '2024-05-06 00:00,1,1', second, '2024-05-06 00:30,3,1', '2024-05-06 00:45,4,1');

describe('bad cells', () => {
  afterEach(async () => {
    expect((await readMeterText(rows('2024-05-06 00:15,2,1'))).record.activeKw).toHaveLength(4);
  });

  it.each([
    ['a date in a column of values', '2024-05-06 00:15,2024-05-06,1', { code: 'bad-number', row: 3, column: 2 }],
    ['a time in a column of values', '2024-05-06 00:15,1,00:15', { code: 'bad-number', row: 3, column: 3 }],
    ['NUL in a number', '2024-05-06 00:15,2\0,1', { code: 'bad-number', row: 3, column: 2 }],
    ['NUL in a stamp', '2024-05-06\0 00:15,2,1', { code: 'bad-time', row: 3, column: 1 }],
    ['infinity', '2024-05-06 00:15,Infinity,1', { code: 'bad-number', row: 3, column: 2 }],
    ['a number beyond every double', '2024-05-06 00:15,1e400,1', { code: 'bad-number', row: 3, column: 2 }],
    [
      'as many digits as a row may have',
      `2024-05-06 00:15,${'9'.repeat(1_000_000)},1`,
      { code: 'bad-number', row: 3, column: 2 },
    ],
    ['a cell too few', '2024-05-06 00:15,2', { code: 'wrong-length', row: 3, column: 3 }],
    ['a cell too many', '2024-05-06 00:15,2,1,7', { code: 'wrong-length', row: 3, column: 4 }],
    ['a line of 10 MB', `2024-05-06 00:15,2,${'1'.repeat(10_000_000)}`, { code: 'too-large', row: 3 }],
  ])('%s', async (_name, second, problem) => {
    const bytes = new TextEncoder().encode(rows(second));
    const startMs = performance.now();
    const { problems } = await refusalOf(bytes);
    expect(performance.now() - startMs).toBeLessThan(1000);
    expect(problems).toMatchObject([problem]);
  });

  it('a number of 10⁹ digits, of which little more than a row’s length is read', async () => {
    let sent = 0;
    async function* digits() {
      yield new TextEncoder().encode(rows('2024-05-06 00:15,2,1').trimEnd());
      for (; sent < 1e9; sent += 65_536) yield new Uint8Array(65_536).fill(0x39);
    }
    const problem = await readMeterFile(digits()).catch((error: unknown) => error);
    expect(problem).toBeInstanceOf(InputProblem);
    expect((problem as InputProblem).problems).toMatchObject([{ code: 'too-large', row: 5 }]);
    expect(sent).toBeLessThan(4e6);
  });

  it('so many NUL that it is no text', async () => {
    expect((await refusalOf(rows(`2024-05-06 00:15,2${'\0'.repeat(20)},1`))).code).toBe('unknown-format');
  });
});
