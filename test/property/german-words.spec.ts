// Every word of a paper in German: the keys are read from the source by the TypeScript compiler, the messages by code.
import { describe, expect, it } from 'vitest';
import { GERMAN } from '#libs/present/german/german.js';
import type { Catalogue, Translation } from '#libs/present/language.js';
import { MESSAGES } from '#libs/present/message-catalogue.js';
import { type SourceTexts, sourceTexts, textsInto } from '../support/source-texts.js';

/** Names of the values in a text, in order of the alphabet. */
function places(text: string): string[] {
  return [...text.matchAll(/\{(\w+)(?:[:}])/g)].map(([, name]) => name!).sort();
}

/** The values of each part that may be left out. */
function optionalParts(text: string): string[] {
  return [...text.matchAll(/\[([^\]]*)\]/g)].map(([, part]) => places(part!).join()).sort();
}

function unlike(english: string, german: string): boolean {
  const ends = (text: string) => [text.startsWith(' '), text.endsWith(' '), /[.:]\]?\s?$/.test(text)];
  return (
    german.trim() === '' ||
    places(english).join() !== places(german).join() ||
    optionalParts(english).join('|') !== optionalParts(german).join('|') ||
    (english.length > 24 && ends(english)[2] !== ends(german)[2])
  );
}

function wrongTexts(
  texts: SourceTexts,
  { texts: german }: Catalogue,
): { missing: string[]; unused: string[]; unlike: string[] } {
  const keys = [...texts.keys()];
  return {
    missing: keys.filter((key) => german[key] === undefined),
    unused: Object.keys(german).filter((key) => !texts.has(key)),
    unlike: keys.filter((key) => german[key] !== undefined && unlike(key, german[key])),
  };
}

function wrongMessages({ messages }: Catalogue): string[] {
  const codes = new Set([...Object.keys(MESSAGES), ...Object.keys(messages)]);
  return [...codes].filter((code) => {
    const english: Partial<Translation> | undefined = MESSAGES[code];
    const german: Partial<Translation> | undefined = messages[code];
    if (english === undefined || german === undefined) return true;
    return (['text', 'consequence', 'subject'] as const).some((part) => {
      const [said = '', inGerman = ''] = [english[part], german[part]];
      return said === '' ? inGerman !== '' : unlike(said, inGerman);
    });
  });
}

describe('the German catalogue', () => {
  const texts = sourceTexts();

  it('finds the texts of the source at all', () => {
    expect(texts.size).toBeGreaterThan(1100);
    expect(texts.get('page {0} of {1}')).toEqual(['page-header.ts']);
    expect(texts.has('kvar of a stage')).toBe(true);
  });

  it('has an entry for every text, with the same values, and none that nothing asks for', () => {
    expect(wrongTexts(texts, GERMAN)).toEqual({ missing: [], unused: [], unlike: [] });
  });

  it('has every message, with the same values and the same parts that may be left out', () => {
    expect(Object.keys(MESSAGES).length).toBeGreaterThan(250);
    expect(wrongMessages(GERMAN)).toEqual([]);
  });

  it('has an entry for no code that stands beside words in a table', () => {
    for (const code of ['left', 'right', 'center']) expect(GERMAN.texts[code]).toBeUndefined();
  });

  it('keeps hazard words in the cautions, as in English', () => {
    const others = Object.entries(GERMAN.messages).filter(([code]) => !code.startsWith('caution.'));
    const said = others.flatMap(([, { text, consequence, subject = '' }]) => [text, consequence, subject]);
    const hazard = /\b(Gefahr|Warnung|Vorsicht|Lebensgefahr)/i;
    expect([...said, ...Object.values(GERMAN.texts)].filter((text) => hazard.test(text))).toEqual([]);
    expect(GERMAN.messages['caution.storedCharge']!.text).toMatch(hazard);
  });

  it('is found wanting where an entry, a value or an optional part is missing (control)', () => {
    const [key] = texts.keys();
    const { [key!]: _, ...fewer } = GERMAN.texts;
    expect(wrongTexts(texts, { ...GERMAN, texts: fewer }).missing).toEqual([key]);
    const spoilt = { ...GERMAN.texts, 'page {0} of {1}': 'Seite {0}', 'never asked for': 'nie' };
    const found = wrongTexts(texts, { ...GERMAN, texts: spoilt });
    expect(found).toEqual({ missing: [], unused: ['never asked for'], unlike: ['page {0} of {1}'] });
    const near = GERMAN.messages['limit.near']!;
    const { 'verdict.avoid': __, ...messages } = GERMAN.messages;
    const cut = { ...messages, 'limit.near': { ...near, text: near.text.replace('[, Gruppe {group}]', '') } };
    expect(wrongMessages({ ...GERMAN, messages: cut })).toEqual(['verdict.avoid', 'limit.near']);
  });

  it('reads texts put together and broken over lines as one (control)', () => {
    const read: SourceTexts = new Map();
    textsInto(read, 'one.ts', "words({ x: 'a ' + 'b', align: 'right' }); say`c $" + '{1}\n    d`;');
    expect([...read.keys()]).toEqual(['a b', 'c {0} d']);
  });
});
