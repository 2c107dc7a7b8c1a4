import { describe, expect, it } from 'vitest';
import { MADE_BANK, MADE_PLAIN_BANK, madeOutcome } from '../../test/support/outcome.js';
import { dutyBars } from './duty-bars.js';

describe('duties against their limits', () => {
  it.each([
    ['with reactors', MADE_BANK],
    ['without', MADE_PLAIN_BANK],
  ])('cross their dotted stroke where they are near, and their limit where they are over it: %s', (_, bank) => {
    const { duties } = madeOutcome({ bank }, { days: 20 }).result;
    const { bars } = dutyBars(duties);
    expect(bars).toHaveLength(duties.filter(({ ratio }) => ratio !== null).length);
    for (const { name, value, verdict, nearAt } of bars) {
      // an inrush over its limit by a customary inductance alone counts as near it; a network over its limit without
      // the bank already is judged by what the bank adds
      if (/inrush|harmonic|distortion/.test(name)) continue;
      const drawn = value > 100 ? 'avoid' : value > nearAt! ? 'watch' : 'clear';
      expect(verdict, name).toBe(drawn);
    }
  });

  it('have a row of the table each, those without a limit too', () => {
    const { duties } = madeOutcome({ bank: MADE_BANK }, { days: 20 }).result;
    expect(dutyBars(duties).table.rows).toHaveLength(duties.length);
  });
});
