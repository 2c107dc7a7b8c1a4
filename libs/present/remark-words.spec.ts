import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { remark } from '#libs/engine/index.js';
import { NOTE_CODES, RECORD_NOTE_CODES } from '#libs/meter-files/note-codes.js';
import { MESSAGES } from './message-catalogue.js';
import { neededNames, remarkConsequence, remarkSentence, remarkSubject } from './remark-words.js';

const LIBS = fileURLToPath(new URL('..', import.meta.url));

/** Every source of the engine, specs left out. */
function engineSources(): string[] {
  const files = readdirSync(join(LIBS, 'engine'), { recursive: true, encoding: 'utf8' });
  return files
    .filter((file) => file.endsWith('.ts') && !file.endsWith('.spec.ts'))
    .map((file) => join(LIBS, 'engine', file));
}

/** Names of an object literal's own keys, as far as they stand in the source. */
function keysOf(literal: string): string[] {
  return [...literal.matchAll(/(?:^|[{,]\s*)(\w+)(?=\s*[:,}])/g)].map(([, name]) => name!);
}

/** Codes that stand in the source as they are, with the values given beside them. */
function literalRemarks(): { code: string; values: string }[] {
  const pattern = /\bremark\(\s*'([\w.]+)'(?:,\s*(\{[^}]*\}|\w+))?/g;
  return engineSources().flatMap((file) =>
    [...readFileSync(file, 'utf8').matchAll(pattern)].map(([, code, values]) => ({
      code: code!,
      values: values ?? '{}',
    })),
  );
}

/** Paths of defaults: `defaults.take(given, otherwise, 'path', …)`, `part('name')`, `note('code', …)`. */
function defaultCodes(): string[] {
  const settle = readFileSync(join(LIBS, 'engine/plan/settle-site.ts'), 'utf8');
  const taken = [...settle.matchAll(/\.take\([^;]*?'([\w.]+\.[\w.]+)'/g)].map(([, path]) => `default.${path}`);
  const parts = [...settle.matchAll(/part\('(\w+)'\)/g)].map(([, name]) => `default.supply.transformers.${name}`);
  const notes = [...settle.matchAll(/\.note\('([\w.]+)'/g)].map(([, code]) => code!);
  const control = ['setPointPowerFactor', 'mode', 'responseRatio', 'stepDelayS', 'reconnectDelayS', 'wear'];
  const catalogue = ['stageKvar', 'ratedV', 'reactorPct', 'maxStages'];
  return [
    ...taken,
    ...parts,
    ...notes,
    ...control.map((key) => `default.control.${key}`),
    ...catalogue.map((key) => `default.catalogue.${key}`),
  ];
}

const ALL_NOTES = { ...NOTE_CODES, ...RECORD_NOTE_CODES };

describe('the catalogue of messages', () => {
  const literal = literalRemarks();

  it('finds the engine’s remarks at all', () => {
    expect(literal.length).toBeGreaterThan(15);
    expect(defaultCodes().length).toBeGreaterThan(20);
  });

  it('has a sentence for every code of the engine', () => {
    const composed = [
      'limit.exceeded',
      'limit.near',
      'limit.exceededAlready',
      'inrush.assumedInductance',
      'layout.onlyWatch',
      'layout.targetOutOfReach',
      'layout.onlyAvoid',
    ];
    const codes = [...literal.map(({ code }) => code), ...composed, ...defaultCodes()];
    expect(codes.filter((code) => MESSAGES[code] === undefined)).toEqual([]);
  });

  it('has a sentence for every note of a reader', () => {
    expect(Object.keys(ALL_NOTES).filter((code) => MESSAGES[code] === undefined)).toEqual([]);
  });

  it('asks a reader’s note for no value that does not come with it', () => {
    for (const [code, given] of Object.entries(ALL_NOTES)) {
      const { text, consequence } = MESSAGES[code]!;
      const missing = [...neededNames(text), ...neededNames(consequence)].filter(
        (name) => !(given as readonly string[]).includes(name),
      );
      expect({ code, missing }).toEqual({ code, missing: [] });
    }
  });

  it('asks the engine for no value that is not given where the code stands', () => {
    for (const { code, values } of literal) {
      // values named elsewhere are covered by the outcomes below
      if (!values.startsWith('{') || values.includes('...')) continue;
      const { text, consequence } = MESSAGES[code]!;
      const given = keysOf(values);
      const missing = [...neededNames(text), ...neededNames(consequence)].filter((name) => !given.includes(name));
      expect({ code, missing }).toEqual({ code, missing: [] });
    }
  });

  it('keeps hazard words in the cautions', () => {
    for (const [code, message] of Object.entries(MESSAGES)) {
      if (code.startsWith('caution.')) continue;
      expect(`${message.text} ${message.consequence} ${message.subject ?? ''}`).not.toMatch(
        /\b(danger|warning|caution)/i,
      );
    }
  });

  it('ends every sentence', () => {
    for (const { text, consequence } of Object.values(MESSAGES)) {
      expect(text).toMatch(/[.]\]?$/);
      if (consequence !== '') expect(consequence).toMatch(/[.]$/);
    }
  });
});

describe('a remark in words', () => {
  it('puts values in with the unit of their name', () => {
    const words = remarkSentence(remark('operation.overCorrection', { overKvar: 41.25, smallestKvar: 12.5 }));
    expect(words).toContain('41.25\u00a0kvar of leading');
    expect(words).toContain('12.5\u00a0kvar');
  });

  it('takes the remark’s own unit for a value and its limit, and keeps them apart', () => {
    const near = remark(
      'limit.near',
      { duty: 'capacitor current', group: 2, value: 85.96, limit: 86, levelKvar: 37.3 },
      { unit: 'A' },
    );
    expect(remarkSentence(near)).toBe(
      'Near its limit: capacitor current, group 2, 85.96\u00a0A against 86\u00a0A, met with 37.3\u00a0kvar connected.',
    );
    expect(remarkSubject(near)).toBe('Capacitor current, group 2, met with 37.3\u00a0kvar connected');
    expect(remarkConsequence(near)).toContain('Accept');
  });

  it('leaves out parts whose values are absent', () => {
    const bare = remark('limit.exceeded', { duty: 'voltage distortion', value: 9, limit: 8 }, { unit: '%' });
    expect(remarkSentence(bare)).toBe('Over its limit: voltage distortion, 9.00\u00a0% against 8\u00a0%.');
  });

  it('counts one and many', () => {
    expect(remarkSentence(remark('record.short', { days: 1 }))).toContain('1\u00a0day:');
    expect(remarkSentence(remark('record.short', { days: 3 }))).toContain('3\u00a0days:');
  });

  it('strips a name in a value of what would reverse or break the line', () => {
    const words = remarkSentence(remark('file-read-as', { format: 'csv', columns: 'kW\u202e\n' }));
    expect(words).toBe('The file was read as csv: kW.');
  });

  it('reads as its code and values where the catalogue holds no sentence', () => {
    expect(remarkSentence(remark('a.code.of.tomorrow', { levelKvar: 50 }))).toBe(
      'a.code.of.tomorrow: levelKvar 50\u00a0kvar.',
    );
  });
});
