import { describe, expect, it } from 'vitest';
import { FINANCE_DEFAULTS, remark } from '#libs/engine/index.js';
import { MESSAGES } from './message-catalogue.js';
import { remarkSentence } from './remark-words.js';

describe('what is said of money', () => {
  it('has a sentence for every default of the finance', () => {
    const codes = Object.keys(FINANCE_DEFAULTS).map((key) => `default.finance.${key}`);
    expect(codes.filter((code) => MESSAGES[code] === undefined)).toEqual([]);
  });

  it('names an amount with its currency and a share with its sign', () => {
    expect(remarkSentence(remark('search.newBank', { value: 1250 }, { unit: 'EUR' }))).toMatch(/1\D?250\sEUR\.$/);
    expect(remarkSentence(remark('default.finance.discountPct', { value: 8 }, { unit: '%' }))).toContain('8');
  });
});
