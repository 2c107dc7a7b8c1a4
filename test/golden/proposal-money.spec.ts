// The money of a paper against the result it was drawn from, read back by a text extractor (poppler's pdftotext); every
// amount has to stand behind its own label, to the digit it is printed with.
import { beforeAll, describe, expect, it } from 'vitest';
import type { Money, Outcome, Site, Worth } from '#libs/engine/index.js';
import { formatFixed } from '#libs/present/format-number.js';
import { formatMonth } from '#libs/present/local-stamp.js';
import { formatPayback } from '#libs/present/money-words.js';
import { renderProposal } from '#libs/proposal/render-proposal.js';
import { MADE_BANK, MADE_PLAIN_BANK, madeFrame, madeOutcome } from '../support/outcome.js';
import { printedNumber, squeezed, textOf } from '../support/pdf-text.js';

const TARIFF: Site['tariff'] = {
  name: 'made-up supply',
  decimals: 2,
  taxPct: 20,
  clauses: [
    { name: 'standing', kind: 'fixed', amountPerMonth: 140 },
    { name: 'energy used', kind: 'energy', pricePerUnit: 0.13 },
    { name: 'apparent demand', kind: 'demand', basis: 'kVA', pricePerUnit: 2.5 },
    { name: 'reactive beyond', kind: 'kvarhBeyondRatio', freeRatio: 0.33, pricePerUnit: 0.006 },
  ],
};

const PRICES: Site['prices'] = {
  name: 'made-up book',
  invented: true,
  currency: 'EUR',
  validFrom: '2026-01-01',
  validTo: '2026-12-31',
  perKvar: 9,
  perStage: 55,
  reactors: [{ reactorPct: 7, perKvar: 11.5 }],
  installationFixed: 700,
  fixed: 850,
  contingencyPct: 5,
  switches: [{ kind: 'contactor', perStage: 38, lifeSwitchings: 60_000 }],
  maintenancePerYear: 120,
  lossWPerKvar: { plain: 1.8, reactor: 6.5 },
  lossPricePerKwh: 0.11,
  capacitorLifeYears: 8.5,
};

type Row = [label: string, ...texts: string[]];

async function paperOf(outcome: Outcome): Promise<string> {
  const text = squeezed(textOf(await renderProposal(outcome, madeFrame())));
  return text.slice(text.indexOf(squeezed('11Money:')), text.indexOf(squeezed('12Limits of validity')));
}

/** Rows that are not on the paper, label and texts next to each other. */
function missing(text: string, rows: readonly Row[]): string[] {
  return rows.map((row) => squeezed(row.join(''))).filter((row) => !text.includes(row));
}

/** With a range the lower of the ideal controller's saving and the late one's. */
function toldFirst({ savingRange, savingPerYear }: Money): number {
  const [ideal, late] = savingRange?.cases ?? [];
  return ideal === undefined || late === undefined ? savingPerYear : Math.min(ideal.savingPerYear, late.savingPerYear);
}

/** Every table row that a priced result has to print, as formatted. */
function expectedRows(money: Money & Worth): Row[] {
  const cents = (value: number) => formatFixed(value, 2);
  const whole = (value: number) => formatFixed(value, 0);
  const { before, after } = money.bills;
  return [
    ...before.months.map(({ month, total, partial }, at): Row => {
      const left = after.months[at]!.total;
      return [formatMonth(month) + (partial ? '*' : ''), cents(total), cents(left), cents(total - left)];
    }),
    ['together', cents(before.total), cents(after.total), cents(before.total - after.total)],
    ...before.months[0]!.lines.map(({ clause }, at): Row => {
      const sum = (bill: typeof before) => bill.months.reduce((total, { lines }) => total + lines[at]!.amount, 0);
      return [clause, cents(sum(before)), cents(sum(after)), cents(sum(before) - sum(after))];
    }),
    ...money.capital.lines.map(({ item, amount }): Row => [item, whole(amount)]),
    ['capital, together', whole(money.capital.total)],
    ['maintenance a year', whole(money.running.maintenancePerYear)],
    ...money.cashFlow.years.map(({ year, net }): Row => {
      const months = money.cashFlow.months.slice(12 * (year - 1), 12 * year);
      const discounted = months.reduce((sum, month) => sum + month.discounted, 0);
      return [String(year), whole(net), whole(discounted), whole(months.at(-1)!.cumulative)];
    }),
    ['capital', whole(money.capital.total), 'EUR', 'net present value', whole(money.npv), 'EUR'],
    ['saving a year', whole(toldFirst(money)), 'EUR', 'the same as a yearly amount', whole(money.annuityPerYear)],
  ];
}

describe('the money of a judged bank on paper', () => {
  let outcome: Outcome;
  let money: Money & Worth;
  let text: string;

  beforeAll(async () => {
    outcome = madeOutcome({ bank: MADE_BANK, tariff: TARIFF, prices: PRICES }, { days: 75 });
    money = outcome.result.money as Money & Worth;
    text = await paperOf(outcome);
  });

  it('prints every bill, clause, item and year as the result has it', () => {
    const rows = expectedRows(money);
    expect(rows.length).toBeGreaterThan(25);
    expect(missing(text, rows)).toEqual([]);
    // the control: the same rows of a result that is a hundredth off
    const off = { ...money, npv: money.npv + 1, capital: { ...money.capital, total: money.capital.total + 1 } };
    expect(missing(text, expectedRows(off))).not.toEqual([]);
  });

  it('prints when the capital is back to a tenth of a month, and the rate of return', () => {
    expect(money.paybackYears).not.toBeNull();
    expect(text).toContain(squeezed(`payback${formatPayback(money.paybackYears!)}`));
    const printed = /internalrateofreturn(−?[\d.]+)%ayear/.exec(text)!;
    const { value, half } = printedNumber(printed[1]!);
    expect(Math.abs(value - money.irrPct!)).toBeLessThanOrEqual(half * (1 + 1e-9));
  });

  it('names tariff and price book, its dates, that it is invented, and that nothing is guaranteed', () => {
    for (const part of [
      'Tariff: “made-up supply”, 4 clauses, tax 20 %.',
      'Price book: “made-up book”, valid from 1 Jan 2026 until 31 Dec 2026. The prices are invented',
      'an estimate, not a guarantee',
      'The record lacks 9 of the twelve months',
      'Nothing else was weighed',
    ]) {
      expect(text).toContain(squeezed(part));
    }
  });

  it('calls the money of a bank over a limit no offer', async () => {
    const over = madeOutcome({ bank: MADE_PLAIN_BANK, tariff: TARIFF, prices: PRICES }, { days: 40 });
    expect(over.result.verdict).toBe('avoid');
    expect(await paperOf(over)).toContain(squeezed('is no offer'));
    expect(text).not.toContain(squeezed('is no offer'));
  });
});

describe('the money of a search on paper', () => {
  it('names the three ways with the reasons between them, and the proof', async () => {
    const catalogue = { stageKvar: [50], ratedV: [480], reactorPct: [7], maxStages: 7, setPoints: [0.97] };
    const outcome = madeOutcome({ tariff: TARIFF, prices: PRICES, catalogue }, { days: 40 });
    const { alternatives, proof, recommended } = outcome.result.money!;
    expect(recommended).toBe('new bank');
    const text = await paperOf(outcome);
    const nothing = alternatives.find(({ name }) => name === 'do nothing')!;
    const built = alternatives.find(({ name }) => name === 'new bank')!;
    expect(nothing.targetMet).toBe(false);
    expect(
      missing(text, [
        ['Do nothing', '0', '0', 'missed', 'within limits', 'Not to be taken: it misses the target'],
        ['Keep today’s bank', '–', '–', '–', '–', 'The site has no bank today.'],
        [
          'Build the new bank, recommended',
          formatFixed(built.capital, 0),
          formatFixed(built.npv, 0),
          'held',
          'within limits',
          'The only way that holds.',
        ],
        [`Proof: of ${proof!.candidates} candidates ${proof!.refused} w`],
        [`${proof!.simulated} ${proof!.simulated === 1 ? 'was' : 'were'} simulated through the whole record`],
      ]),
    ).toEqual([]);
  });
});

describe('a paper without money', () => {
  it.each([
    [{}, 'No tariff and no prices were given'],
    [{ prices: PRICES }, 'No tariff was given'],
  ])('says what was not given, and prints no amount', async (parts, words) => {
    const text = await paperOf(madeOutcome({ bank: MADE_BANK, ...parts }, { days: 20 }));
    expect(text).toContain(squeezed(words));
    expect(text).not.toMatch(/EUR/);
  });

  it('prints bills alone where there are no prices', async () => {
    const text = await paperOf(madeOutcome({ bank: MADE_BANK, tariff: TARIFF }, { days: 20 }));
    expect(text).toContain(squeezed('No prices were given, so the bank itself is not priced.'));
    expect(text).toContain(squeezed('together'));
    expect(text).not.toContain(squeezed('net present value'));
  });
});
