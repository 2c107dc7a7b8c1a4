// Right by reading: the words are those of the key, taken apart, and its unit.
import { describe, expect, it } from 'vitest';
import { keyWords, partWords, pathWords } from './path-words.js';

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
});
