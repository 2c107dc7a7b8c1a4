import { describe, expect, it } from 'vitest';
import { plainName, printable } from './plain-name.js';

describe('a name fit to be printed', () => {
  it('keeps letters of every script', () => {
    expect(plainName('Łódź „Walcownia” – Ωμέγα 日本 שלום')).toBe('Łódź „Walcownia” – Ωμέγα 日本 שלום');
  });

  it('drops marks that would reverse what stands around them', () => {
    expect(plainName('safe\u202egnissim\u202c')).toBe('safegnissim');
    expect(plainName('a\u2066b\u2069\u200f\ufeff')).toBe('ab');
  });

  it('turns control characters and line ends into one space', () => {
    expect(plainName('hall 2\r\n\t\u0000press\u001b[31m')).toBe('hall 2 press [31m');
  });

  it('composes letters and their marks, and shows a broken character as such', () => {
    expect(plainName('Cafe\u0301')).toBe('Café');
    expect(plainName('x\ud800y')).toBe('x\ufffdy');
  });

  it('leaves the gap between number and unit alone', () => {
    expect(printable('\u00a0kvar')).toBe('\u00a0kvar');
  });
});
