// Right by reading: the words are those of the key, taken apart, and its unit.
import { describe, expect, it } from 'vitest';
import * as z from 'zod';
import { siteSchema } from '#libs/contract/site-schema.js';
import { GERMAN } from './german/german.js';
import { type Catalogue, inLanguage } from './language.js';
import { codeWords, expectedWords, keyWords, partWords, pathWords } from './path-words.js';
import { standingName } from './standing-name.js';

describe('the words of a path', () => {
  it.each([
    ['bank.stages[0].ratedKvar', 'bank, group 1, rated (kvar)'],
    ['supply.faultLevelMva.min', 'supply, fault level (MVA), least'],
    ['control.reconnectDelayS', 'control, reconnect delay (s)'],
    ['loads.backgroundPct[1].orderH', 'loads, background (%) 2, order'],
    ['timeZone', 'time zone'],
    ['duties[2].name', 'duty 3, name'],
    ['network.buses[1].name', 'network, bus 2, name'],
    ['network.levels[12].voltageDistortionPct', 'network, level 13, voltage distortion (%)'],
  ])('says of %s: %s', (path, words) => {
    expect(pathWords(path)).toBe(words);
  });

  it('takes no unit off a word that only ends in its letter', () => {
    expect(keyWords('class')).toBe('class');
    expect(keyWords('V')).toBe('v');
  });

  it('says a part by its fields, and a list by its entries', () => {
    const stage = { count: 3, ratedKvar: 50, reactorPct: undefined };
    expect(partWords([stage, { count: 1 }], String)).toBe('count 3, rated (kvar) 50; count 1');
    expect(partWords(undefined, String)).toBe('undefined');
  });

  it('says a code in words, and leaves a name as somebody gave it', () => {
    expect(codeWords('nearestLevel')).toBe('nearest level');
    expect(codeWords('six-pulse-choke')).toBe('six pulse choke');
    expect(codeWords('EN 50160:2010')).toBe('EN 50160:2010');
    expect(codeWords('Line 2, hall B')).toBe('Line 2, hall B');
  });
});

const LIST = '"type":"array","items":{"type":"object"';

/** Keys of the site file and its codes, from the schema itself. */
function partsOfSite(): { keys: Set<string>; lists: Set<string>; codes: Set<string> } {
  const found = { keys: new Set<string>(), lists: new Set<string>(), codes: new Set<string>() };
  const visit = (node: unknown): void => {
    if (node === null || typeof node !== 'object') return;
    const { properties, enum: codes } = node as { properties?: object; enum?: unknown[] };
    const named = Object.entries(properties ?? {});
    const lists = named.filter(([, value]) => JSON.stringify(value).includes(LIST));
    for (const [key] of named) found.keys.add(key);
    for (const [key] of lists) found.lists.add(key);
    for (const code of (codes ?? []).map(String).filter((one) => /^[a-z]{2}/.test(one))) found.codes.add(code);
    for (const value of Object.values(node)) visit(value);
  };
  visit(z.toJSONSchema(siteSchema, { unrepresentable: 'any', io: 'input' }));
  return found;
}

/** Words of which none is the catalogue's: what is said while each of its entries is replaced by a sign. */
function unsaid(words: readonly (() => string)[], { fields, texts, ...rest }: Catalogue): string[] {
  const signs = (table: Readonly<Record<string, string>>) =>
    Object.fromEntries(Object.keys(table).map((key) => [key, '#']));
  const marked: Catalogue = { ...rest, fields: signs(fields), texts: signs(texts) };
  return inLanguage(marked, () => words.map((said) => said()).filter((said) => /[a-z]{3}/.test(said)));
}

describe('the words of a path in another language', () => {
  const { keys, lists, codes } = partsOfSite();
  const said = [
    ...[...keys].map((key) => () => keyWords(key)),
    ...[...lists].map((key) => () => pathWords(`${key}[0]`)),
    ...[...codes].map((code) => () => codeWords(code)),
  ];

  it('are there for every key, entry and code of the site file', () => {
    expect(keys.size).toBeGreaterThan(200);
    expect(lists.size).toBeGreaterThan(10);
    // Units and kVA, kW and their like are the same in any language.
    expect(unsaid(said, GERMAN).filter((one) => !/^(#( \((W\/)?kvarh?\))?|kvarh?)( \d+)?$/.test(one))).toEqual([]);
  });

  it('stand in what a refusal asks for, where it names another field', () => {
    expect(expectedWords('at most supply.faultLevelMva.max, 250')).toBe(
      'at most 250, the “supply, fault level (MVA), greatest”',
    );
    expect(expectedWords('a bank, in bank.stages[1].count or none')).toBe('a bank, in “bank, group 2, count” or none');
    for (const plain of ['a time zone such as "Europe/Dublin" or "+10:00"', 'at most 2.5 MVA', 'one of "a.b", "c"'])
      expect(expectedWords(plain)).toBe(plain);
  });

  it('are found wanting where one is missing (control)', () => {
    const { ventilation: _, ...fields } = GERMAN.fields;
    expect(unsaid(said, { ...GERMAN, fields })).toContain('ventilation');
  });

  it('read as a German reader has them', () => {
    const german = (path: string) => inLanguage(GERMAN, () => pathWords(path));
    expect(german('bank.stages[0].ratedKvar')).toBe('Anlage, Gruppe 1, Bemessung (kvar)');
    expect(german('supply.faultLevelMva.min')).toBe('Netzanschluss, Kurzschlussleistung (MVA), kleinster Wert');
    expect(inLanguage(GERMAN, () => codeWords('nearestLevel'))).toBe('nächstliegende Leistung');
    expect(inLanguage(GERMAN, () => standingName('Q1 closed, transformer 2 out'))).toBe(
      'Q1 geschlossen, Transformator 2 außer Betrieb',
    );
    expect(inLanguage(GERMAN, () => standingName('2 of C1'))).toBe('2 von C1');
    expect(standingName('Bank 2 with 1 + 3 stages in, 2 of C1')).toBe('Bank 2 with 1 + 3 stages in, 2 of C1');
    expect(standingName('Bank 2 with 1 stages in')).toBe('Bank 2 with one stage in');
  });
});
