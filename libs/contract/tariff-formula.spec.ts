import { describe, expect, it } from 'vitest';
import { InputProblem } from '#libs/engine/index.js';
import { readSite } from './read-site.js';

function problemsOf(expression: string) {
  const tariff = { windows: [{ name: 'day' }], clauses: [{ name: 'f', kind: 'formula', expression }] };
  const site = {
    name: 'Invented Mill',
    timeZone: 'Europe/Dublin',
    rules: 'iec',
    frequencyHz: 50,
    bus: { nominalV: 400 },
    supply: { faultLevelMva: { max: 250 } },
    tariff,
  };
  try {
    readSite(site);
  } catch (error) {
    if (error instanceof InputProblem) return error.problems;
    throw error;
  }
  return [];
}

describe('a formula in a tariff', () => {
  it.each([
    ['breaks off', 'max(maxKw, 1', 'unreadable'],
    ['names an unknown quantity', 'kw * 2', 'inconsistent'],
    ['names an unknown window', 'maxKw.evening', 'inconsistent'],
    ['reaches for the machine', 'process', 'inconsistent'],
    ['is nested too deep', `${'('.repeat(60)}1${')'.repeat(60)}`, 'too-large'],
  ])('that %s is refused at its path', (_what, expression, code) => {
    expect(problemsOf(expression)).toEqual([expect.objectContaining({ code, path: 'tariff.clauses[0].expression' })]);
  });

  it('of known names, windows of the tariff among them, is accepted', () => {
    expect(problemsOf('if(month == 1, maxKw.day, 0) + 2 × billSoFar')).toEqual([]);
  });
});
