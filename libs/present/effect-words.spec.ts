import { describe, expect, it } from 'vitest';
import { effectWords } from './effect-words.js';

const GAP = '\u00a0';

describe('what an assumption moves', () => {
  // A duty is a share of its limit, so a ratio of 0.62 is 62 %; an amount of money is an amount.
  it.each([
    ['duties.inrush current', 0.62, 1.04, `Inrush current 62${GAP}% to 104${GAP}% of its limit`],
    ['duties.inrush current', 0.5, 0.5, `Inrush current stays at 50${GAP}% of its limit`],
    ['money.npv', 43_605.21, 64_139.33, `Net present value 43${GAP}605 to 64${GAP}139`],
    ['money.savingPerYear', -120, 9_800, `Saving a year −120 to 9${GAP}800`],
    ['', 0, 0, 'No row moves'],
  ])('%j from %d to %d is told in its own unit', (figure, low, high, told) => {
    expect(effectWords({ figure, low, high, changesVerdict: false }).replaceAll('\u202f', GAP)).toBe(told);
    expect(effectWords({ figure, low, high, changesVerdict: true })).toMatch(/, and the verdict changes$/);
  });
});
