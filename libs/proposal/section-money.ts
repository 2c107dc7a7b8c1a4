import type { Bill, EstimateOutcome, MoneyPapers, Outcome } from '#libs/engine/index.js';
import { isEstimate } from '#libs/engine/index.js';
import { billsByMonth } from '#libs/present/bills-by-month.js';
import { cashFlowFigure, isPriced, type PricedMoney } from '#libs/present/cash-flow-figure.js';
import { engineName } from '#libs/present/engine-name.js';
import { lowered } from '#libs/present/first-letter.js';
import { formatFixed, formatNumber, formatQuantity } from '#libs/present/format-number.js';
import { say } from '#libs/present/language.js';
import {
  billDecimals,
  clauseSums,
  financeWords,
  formatMoney,
  formatPayback,
  noGuarantee,
  namedPicks,
  paybackWords,
  priceBookWords,
  proofWords,
  returnWords,
  tariffWords,
} from '#libs/present/money-words.js';
import { plainName } from '#libs/present/plain-name.js';
import { headlineSaving, SAVING_CASE_WORDS } from '#libs/present/saving-words.js';
import { VERDICT_WORDS } from '#libs/present/verdict-words.js';
import { drawFigureBeside, halves } from './figure-block.js';
import { NOTE, type Paper, STRONG } from './paper.js';
import { type Column, drawTable } from './table.js';
import { BODY, type Style } from './typesetter.js';

const SMALL: Style = { ...BODY, size: 8.6 };
const TIGHT = { style: SMALL, padding: 1.6, after: 6 };

/** Bills before and after, what the bank costs, its cash flow, and the ways that were weighed. */
export function drawMoney(paper: Paper, outcome: Outcome | EstimateOutcome): void {
  const { papers } = outcome.site;
  if (outcome.result.money === null) {
    paper.heading('11', say`Money: not reckoned`);
    paper.paragraph([unpricedWords(outcome)]);
    return;
  }
  if (isEstimate(outcome)) {
    paper.heading('11', say`Money: bills by the estimate, ${noGuarantee()}`, { keep: 240 });
    paper.paragraph([say`${tariffWords(papers)} The bills rest on the estimate, so no saving is given.`]);
    drawBills(paper, outcome.result.money.bills, papers);
    return;
  }
  drawPriced(paper, outcome);
}

function unpricedWords({ site: { papers }, kind }: Outcome | EstimateOutcome): string {
  const given = kind === 'plan' ? say`designed` : say`judged`;
  if (papers.tariff !== null) return say`The tariff could not be used here; the findings say why.`;
  const prices = papers.prices === null ? say`No tariff and no prices were given` : say`No tariff was given`;
  return say`${prices}, so neither bills nor costs are reckoned: the bank was ${given} by limits and target alone.`;
}

function drawPriced(paper: Paper, outcome: Outcome): void {
  const { papers } = outcome.site;
  const money = outcome.result.money!;
  const saving = formatMoney(headlineSaving(money), papers.currency);
  paper.heading('11', say`Money: ${saving} a year saved, ${noGuarantee()}`, { keep: 280 });
  paper.paragraph([
    `${tariffWords(papers)} ${priceBookWords(papers)} ${isPriced(money) ? financeWords(papers) : ''}`.trim(),
  ]);
  if (outcome.result.verdict === 'avoid') {
    paper.paragraph([say`The bank is over a limit. Its money is shown for comparison and is no offer.`], {
      style: STRONG,
    });
  }
  if (money.monthsFilled > 0) {
    const count = formatNumber(money.monthsFilled, 'whole');
    paper.paragraph([say`The record lacks ${count} of the twelve months; they are taken as the mean of the others.`]);
  }
  if (isPriced(money)) drawWorth(paper, money, papers);
  drawBills(paper, money.bills, papers);
  if (isPriced(money)) drawCosts(paper, money, papers);
  drawPicks(paper, outcome);
}

/** The figures that decide, first. */
function drawWorth(paper: Paper, money: PricedMoney, papers: MoneyPapers): void {
  const { currency, finance } = papers;
  const discounted = money.discountedPaybackYears;
  const rows = [
    [
      say`capital`,
      formatMoney(money.capital.total, currency),
      say`net present value`,
      formatMoney(money.npv, currency),
    ],
    [
      say`saving a year`,
      formatMoney(headlineSaving(money), currency),
      say`the same as a yearly amount`,
      formatMoney(money.annuityPerYear, currency),
    ],
    [say`payback`, paybackWords(money, finance.horizonYears), say`internal rate of return`, returnWords(money)],
    [say`payback, discounted`, discounted === null ? '–' : formatPayback(discounted), '', ''],
  ];
  const columns: Column[] = [
    { head: say`what it costs and saves`, share: 20 },
    { head: '', share: 24, align: 'right' },
    { head: say`what that is worth`, share: 24 },
    { head: '', share: 26, align: 'right' },
  ];
  drawTable(paper, columns, rows, { padding: 2.2, gutter: 18 });
  drawSavingCases(paper, money, currency);
}

/** A saving rests on a controller and a bank that work: what it comes to where they work less well. */
function drawSavingCases(paper: Paper, { savingRange }: PricedMoney, currency: string): void {
  if (savingRange === null) return;
  const columns: Column[] = [
    { head: say`the saving a year`, share: 44 },
    { head: currency, share: 20, align: 'right' },
    { head: say`net present value`, share: 20, align: 'right' },
  ];
  const rows = savingRange.cases.map(({ name, savingPerYear, npv }) => [
    SAVING_CASE_WORDS[name],
    formatMoney(savingPerYear, ''),
    formatMoney(npv, ''),
  ]);
  drawTable(paper, columns, rows, { padding: 2.2, gutter: 18 });
}

function drawBills(paper: Paper, bills: { before: Bill; after: Bill }, papers: MoneyPapers): void {
  if (bills.before.months.length === 0) return;
  drawFigureBeside(paper, { number: '11.1', chart: billsByMonth(bills, papers) }, 0.5, 180);
  const sums = clauseSums(bills);
  paper.heading('11.2', say`Where the bills change, clause by clause over the record`, { level: 3, keep: 60 });
  const columns: Column[] = [
    { head: papers.currency === '' ? say`clause` : say`clause, ${papers.currency}`, share: 40 },
    ...[say`before`, say`after`, say`saved`].map((head): Column => ({ head, share: 18, align: 'right' })),
  ];
  const amount = (value: number) => formatFixed(value, billDecimals(papers));
  const row = (name: string, before: number, after: number) => [
    name,
    amount(before),
    amount(after),
    amount(before - after),
  ];
  drawTable(
    paper,
    columns,
    [
      ...sums.map(({ clause, before, after }) => row(plainName(clause), before, after)),
      row(say`together`, bills.before.total, bills.after.total),
    ],
    TIGHT,
  );
  drawBilled(paper, bills.before, papers);
}

/** Real bills beside the reckoned ones: whether the tariff was entered right. */
function drawBilled(paper: Paper, before: Bill, papers: MoneyPapers): void {
  const known = before.months.filter(({ billed }) => billed !== null);
  if (known.length === 0) return;
  const most = known.reduce((worst, month) =>
    Math.abs(month.difference!) > Math.abs(worst.difference!) ? month : worst,
  );
  const difference = formatMoney(most.difference, papers.currency, billDecimals(papers));
  const count = known.length === 1 ? say`One real bill was given` : say`${known.length} real bills were given`;
  paper.paragraph([say`${count}; the reckoned ones differ from them by at most ${difference}.`]);
}

function drawCosts(paper: Paper, money: PricedMoney, papers: MoneyPapers): void {
  const { capital, running } = money;
  const unit = papers.currency === '' ? say`amount` : papers.currency;
  const title = say`What the bank costs: ${formatMoney(capital.total, papers.currency)} to build`;
  paper.heading('11.3', title, { level: 3, keep: 160 });
  const [left, right] = halves(paper);
  const columns = (head: string): Column[] => [
    { head, share: 3 },
    { head: unit, share: 1.6, align: 'right' },
  ];
  const top = paper.y;
  const items = capital.lines.map(({ item, amount }) => [engineName(item), formatFixed(amount, 0)]);
  drawTable(paper, columns(say`capital`), [...items, [say`capital, together`, formatFixed(capital.total, 0)]], {
    ...TIGHT,
    ...left,
  });
  const end = paper.y;
  paper.y = top;
  const rows = [
    [say`maintenance a year`, formatFixed(running.maintenancePerYear, 0)],
    [say`losses a year, ${formatQuantity(running.lossKwhPerYear, 'kWh')}`, formatFixed(running.lossPerYear, 0)],
    ...replacementRows(money),
  ];
  drawTable(paper, columns(say`running`), rows, { ...TIGHT, ...right });
  const switchings = formatNumber(running.switchingsPerYear, 'whole');
  paper.paragraph([say`${switchings} switchings a year. Replacements are before any growth of costs.`], {
    style: NOTE,
    ...right,
  });
  paper.y = Math.max(paper.y, end);
  drawFigureBeside(paper, { number: '11.4', chart: cashFlowFigure(money, papers) }, 0.56, 190);
}

/** Replacements that fall into one year are one row. */
function replacementRows({ running }: PricedMoney): string[][] {
  const byYear = new Map<number, number>();
  for (const { month, amount } of running.replacements) {
    const year = Math.ceil(month / 12);
    byYear.set(year, (byYear.get(year) ?? 0) + amount);
  }
  if (byYear.size === 0) return [[say`replacements within these years`, '0']];
  return [...byYear].map(([year, amount]) => [say`replacements in year\u00a0${year}`, formatFixed(amount, 0)]);
}

function drawPicks(paper: Paper, outcome: Outcome): void {
  const { papers } = outcome.site;
  const money = outcome.result.money!;
  const picks = namedPicks(money, papers);
  if (picks.length === 0) {
    paper.paragraph([say`Nothing else was weighed: the bank that was given is priced as new.`], { style: NOTE });
    return;
  }
  const taken = picks.find(({ isRecommended }) => isRecommended)!;
  paper.heading('11.5', say`The ways that were weighed: ${lowered(taken.name)}`, { level: 3, keep: 120 });
  const columns: Column[] = [
    { head: say`way`, share: 22 },
    { head: say`capital`, share: 12, align: 'right' },
    { head: say`net present value`, share: 14, align: 'right' },
    { head: say`target`, share: 9 },
    { head: say`verdict`, share: 17 },
    { head: say`why`, share: 42 },
  ];
  const rows = picks.map(({ name, way, isRecommended, reason }) => [
    isRecommended ? [{ text: say`${name}, recommended`, weight: 'semibold' as const }] : name,
    way === null ? '–' : formatFixed(way.capital, 0),
    way === null ? '–' : formatFixed(way.npv, 0),
    way === null ? '–' : way.targetMet ? say`held` : say`missed`,
    way === null ? '–' : VERDICT_WORDS[way.verdict],
    reason,
  ]);
  drawTable(paper, columns, rows, { style: SMALL, padding: 2.4, after: 4 });
  if (money.proof !== null) paper.paragraph([proofWords(money.proof, papers.currency)]);
}
