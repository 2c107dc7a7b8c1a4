import { describe, expect, it } from 'vitest';
import { readCommandLine } from './command-line.js';
import { COMMANDS } from './commands.js';
import { paperSheet } from './paper-sheet.js';

const sheetOf = (...typed: string[]) => paperSheet(readCommandLine('plan', COMMANDS.plan!, ['site.json', ...typed]));

describe('the sheet of a proposal', () => {
  it('is A4, in English and without a logo where nothing was typed', async () => {
    expect(await sheetOf()).toEqual({ paper: 'A4', language: 'en', logo: null });
    const typed = await sheetOf('--pdf', 'out.pdf', '--paper', 'Letter', '--language', 'de');
    expect(typed).toEqual({ paper: 'Letter', language: 'de', logo: null });
  });

  it.each([
    [['--pdf', 'out.pdf', '--language', 'fr'], '--language en or de', '"fr"'],
    [['--pdf', 'out.pdf', '--paper', 'A3'], '--paper A4 or Letter', '"A3"'],
    [['--language', 'de'], '--pdf OUT beside --paper, --logo or --language', 'none'],
  ])('is refused as %j', async (typed, expected, found) => {
    const refused = sheetOf(...typed).catch((error) => (error as { problems: object[] }).problems);
    expect(await refused).toEqual([{ code: 'usage', expected, found }]);
  });
});
