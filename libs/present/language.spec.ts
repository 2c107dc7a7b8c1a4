import { describe, expect, it } from 'vitest';
import { formatNumber, formatQuantity, printedArithmetic } from './format-number.js';
import { type Catalogue, hyphenParts, inLanguage, say, spokenCatalogue, words } from './language.js';

/** Invented for the test. */
const TURNED: Catalogue = {
  language: 'de',
  decimalMark: ',',
  texts: { '{0} of {1} levels': 'von {1} Stufen {0}', head: 'Kopf', 'a line and the next': 'zwei Zeilen' },
  fields: {},
  messages: {},
  partings: ['kopf|zeile'],
};

const TABLE = words({ rows: [{ head: 'head', share: 2 }, { head: 'unknown' }], align: 'right' });

const counted = (few: number, all: number) => say`${few} of ${all} levels`;

describe('words in the language in force', () => {
  it('are English without a catalogue, and in the catalogue’s order with one', () => {
    expect(counted(2, 9)).toBe('2 of 9 levels');
    expect(inLanguage(TURNED, () => counted(2, 9))).toBe('von 9 Stufen 2');
    expect(counted(2, 9)).toBe('2 of 9 levels');
  });

  it('count a line break in the source as one space', () => {
    const broken = () => say`a line
        and the next`;
    expect(broken()).toBe('a line and the next');
    expect(inLanguage(TURNED, broken)).toBe('zwei Zeilen');
  });

  it('of a table are read whenever they are used, and what is no word stays', () => {
    const read = () => JSON.stringify({ rows: [...TABLE.rows], align: TABLE.align });
    expect(read()).toBe('{"rows":[{"head":"head","share":2},{"head":"unknown"}],"align":"right"}');
    expect(inLanguage(TURNED, read)).toBe('{"rows":[{"head":"Kopf","share":2},{"head":"unknown"}],"align":"right"}');
  });

  it('stay English where an entry is missing', () => {
    expect(inLanguage(TURNED, () => say`none of these`)).toBe('none of these');
  });

  it('are restored where what speaks throws, and may be nested', () => {
    expect(() =>
      inLanguage(TURNED, () => {
        throw new Error('half-way');
      }),
    ).toThrow('half-way');
    expect(spokenCatalogue()).toBeNull();
    expect(inLanguage(TURNED, () => inLanguage(null, () => counted(2, 9)))).toBe('2 of 9 levels');
  });

  it('refuse to be awaited, since what follows would be in another language', () => {
    expect(() => inLanguage(TURNED, async () => counted(2, 9))).toThrow('not awaited');
  });
});

describe('the places where a word may be parted', () => {
  it('are the language’s, whatever stands behind the word; English has none', () => {
    expect(inLanguage(TURNED, () => hyphenParts('Kopfzeilen,'))).toEqual(['Kopf', 'zeilen,']);
    expect(inLanguage(TURNED, () => hyphenParts('Kopf'))).toEqual(['Kopf']);
    expect(hyphenParts('Kopfzeilen,')).toEqual(['Kopfzeilen,']);
  });
});

describe('numbers in the language in force', () => {
  it('have its decimal mark, thousands apart by the same gap', () => {
    expect(inLanguage(TURNED, () => formatQuantity(1234.5, 'kW', 'given'))).toBe('1\u00a0234,5\u00a0kW');
    expect(formatNumber(1234.5, 'given')).toBe('1\u00a0234.5');
  });

  it('of a working are apart by semicolons where the mark is a comma', () => {
    const working = 'max(0, 123.4 − 70.25 · 0.329)';
    expect(inLanguage(TURNED, () => printedArithmetic(working))).toBe('max(0; 123,4 − 70,25 · 0,329)');
    expect(printedArithmetic(working)).toBe(working);
  });
});
