// Expected texts are worked out by hand from the numbers put in.
import { describe, expect, it } from 'vitest';
import type { Alternative, Money } from '#libs/engine/index.js';
import { moneyPapers } from '#libs/engine/index.js';
import { GAP } from './format-number.js';
import { formatMoney, formatPayback, namedPicks, priceBookWords, proofWords } from './money-words.js';

const plain = (text: string) => text.replaceAll(GAP, ' ');
const PAPERS = moneyPapers({ currency: 'EUR' });

function way(parts: Partial<Alternative> & { name: string }): Alternative {
  return {
    capital: 0,
    npv: 0,
    laggingKvarh: 0,
    totalSwitchings: 0,
    voltageDistortionPct: 1,
    targetMet: true,
    verdict: 'clear',
    sample: false,
    ...parts,
  };
}

function reasons(recommended: Money['recommended'], alternatives: Alternative[], papers = PAPERS): string[] {
  return namedPicks({ recommended, alternatives } as Money, papers).map(({ reason }) => plain(reason));
}

describe('a time to pay back', () => {
  it.each([
    [0, '0.0 months'],
    [0.4654, '5.6 months'],
    [1, '1 year 0.0 months'],
    [1.1805, '1 year 2.2 months'],
    // 11.99 months round to a whole year, never to "12.0 months"
    [2.9992, '3 years 0.0 months'],
  ])('of %d years reads "%s"', (years, text) => {
    expect(plain(formatPayback(years))).toBe(text);
  });
});

describe('an amount', () => {
  it('has its decimals fixed, a true minus, and no minus before nothing', () => {
    expect(plain(formatMoney(-1234.5, 'EUR', 2))).toBe('−1 234.50 EUR');
    expect(plain(formatMoney(-0.4, 'EUR'))).toBe('0 EUR');
    expect(formatMoney(null, 'EUR')).toBe('–');
    expect(formatMoney(12, '')).toBe('12');
  });
});

describe('the reasons between the three ways', () => {
  const nothing = way({ name: 'do nothing' });
  const keep = way({ name: "keep today's bank", npv: 900 });
  const built = way({ name: 'new bank', npv: 2150, capital: 5000 });

  it('say how much the taken one is ahead of the next that holds', () => {
    expect(reasons('new bank', [nothing, keep, built])).toEqual([
      'Worth 2 150 EUR less.',
      'Worth 1 250 EUR less.',
      'Worth 1 250 EUR more than the next way that holds.',
    ]);
  });

  it('say why a way that is worth more is not taken', () => {
    const over = way({ name: "keep today's bank", npv: 9000, verdict: 'avoid', targetMet: false });
    expect(reasons('new bank', [nothing, over, built])[1]).toBe(
      'Not to be taken: it is over a limit, and it misses the target, which is demanded in every month.',
    );
  });

  it('leave the target out where it is not demanded', () => {
    const missing = way({ name: "keep today's bank", targetMet: false, npv: 100 });
    const papers = moneyPapers({ currency: 'EUR', catalogue: { mustMeetTarget: false } });
    expect(reasons('new bank', [nothing, missing, built], papers)[1]).toBe('Worth 2 050 EUR less.');
  });

  it('name all three where two are not there', () => {
    const missing = way({ name: 'do nothing', targetMet: false });
    expect(reasons('do nothing', [missing])).toEqual([
      'Nothing else may be taken; it misses the target all the same.',
      'The site has no bank today.',
      'No candidate of the catalogue holds.',
    ]);
  });

  it('are none where nothing was compared', () => {
    expect(reasons(null, [])).toEqual([]);
  });
});

describe('what the money rests on', () => {
  it('counts every candidate of the proof, and its margin to the cent', () => {
    const proof = {
      candidates: 1200,
      refused: 199,
      boundedAway: 990,
      partlySimulated: 10,
      simulated: 1,
      lowerBoundMargin: 1.634,
    };
    expect(plain(proofWords(proof, 'EUR'))).toBe(
      'Proof: of 1 200 candidates 199 were refused by a limit or the target, 990 were bounded away, ' +
        '10 were given up part of the way, 1 was simulated through the whole record; ' +
        'by its bound, the best of the rest falls short of it by at least 1.63 EUR.',
    );
    expect(proofWords({ ...proof, lowerBoundMargin: null }, 'EUR')).toContain('none of the rest was left unsettled');
  });

  it('calls an invented price book invented, and only that', () => {
    const book = { name: 'list', validFrom: '2026-01-01' };
    expect(plain(priceBookWords(moneyPapers({ prices: { ...book, invented: true } })))).toBe(
      'Price book: “list”, valid from 1 Jan 2026. The prices are invented: they show the reckoning, not what things cost.',
    );
    expect(plain(priceBookWords(moneyPapers({ prices: book })))).toBe('Price book: “list”, valid from 1 Jan 2026.');
  });
});
