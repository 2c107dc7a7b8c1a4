import type { EstimateOutcome, Outcome, Recommended, Verdict } from '#libs/engine/index.js';
import { formatFixed, formatNumber } from './format-number.js';
import { formatMoney, formatPayback } from './money-words.js';
import { plainName } from './plain-name.js';
import { headlineSaving, WAY_WORDS } from './saving-words.js';
import { finished, tableLines } from './terminal-lines.js';
import { noPermission, verdictWords } from './verdict-words.js';

/** One site of several: what is proposed, and what it is worth. */
export interface SiteRow {
  name: string;
  verdict: Verdict;
  isEstimate: boolean;
  effectiveKvar: number;
  stages: number;
  /** null where nothing was to be chosen */
  recommended: Recommended | null;
  currency: string | null;
  /** null without prices */
  capital: number | null;
  /** the saving told first; null without a tariff */
  savingPerYear: number | null;
  npv: number | null;
  paybackYears: number | null;
}

/**
 * A site's row in the table of several.
 * @param outcome plan or judgement, with a record or without
 * @returns the row
 */
export function siteRow(outcome: Outcome | EstimateOutcome): SiteRow {
  const { site, result, bank } = outcome;
  const money = 'series' in outcome ? outcome.result.money : null;
  return {
    name: site.name,
    verdict: result.verdict,
    isEstimate: result.record === null,
    effectiveKvar: result.bank.effectiveKvar,
    stages: bank.groups.reduce((sum, { count }) => sum + count, 0),
    recommended: money?.recommended ?? null,
    currency: site.currency ?? null,
    capital: money?.capital?.total ?? null,
    savingPerYear: money === null ? null : headlineSaving(money),
    npv: money?.npv ?? null,
    paybackYears: money?.paybackYears ?? null,
  };
}

const HEAD = [
  'site',
  'verdict',
  'kvar',
  'stages',
  'advice',
  'capital',
  'saving a year',
  'net present value',
  'payback',
];

/**
 * Several sites in one table, with a sum for each currency.
 * @param rows one a site
 * @returns lines of plain text, ending in a line end
 */
export function sitesReport(rows: readonly SiteRow[]): string {
  const cells = [...rows.map(cellsOf), ...currenciesOf(rows).map((currency) => sumOf(rows, currency))];
  // names stand to the left, everything else to the right
  const width = Math.max(...[HEAD, ...cells].map(([name]) => name!.length));
  const flush = ([name, ...rest]: readonly string[]): string[] => [name!.padEnd(width), ...rest];
  return finished([
    ...tableLines(flush(HEAD), cells.map(flush)),
    '',
    ...(rows.some(({ isEstimate }) => isEstimate) ? ['A site without a meter’s record is an estimate.'] : []),
    noPermission(),
  ]);
}

function cellsOf(row: SiteRow): string[] {
  const { currency } = row;
  return [
    plainName(row.name),
    verdictWords(row.verdict) + (row.isEstimate ? ', estimate' : ''),
    formatNumber(row.effectiveKvar),
    `${row.stages}`,
    row.recommended === null ? '–' : WAY_WORDS[row.recommended],
    formatMoney(row.capital, currency ?? ''),
    formatMoney(row.savingPerYear, currency ?? ''),
    formatMoney(row.npv, currency ?? ''),
    row.paybackYears === null ? '–' : formatPayback(row.paybackYears),
  ];
}

// Amounts of different currencies are never added.
function currenciesOf(rows: readonly SiteRow[]): (string | null)[] {
  const priced = rows.filter(({ savingPerYear }) => savingPerYear !== null);
  return [...new Set(priced.map(({ currency }) => currency))].filter(
    (currency) => priced.filter((row) => row.currency === currency).length > 1,
  );
}

function sumOf(rows: readonly SiteRow[], currency: string | null): string[] {
  const own = rows.filter((row) => row.currency === currency);
  const sum = (key: 'capital' | 'savingPerYear' | 'npv'): string => {
    const known = own.flatMap((row) => row[key] ?? []);
    return known.length === 0
      ? '–'
      : formatMoney(
          known.reduce((total, value) => total + value, 0),
          currency ?? '',
        );
  };
  const kvar = formatNumber(own.reduce((total, { effectiveKvar }) => total + effectiveKvar, 0));
  const stages = formatFixed(
    own.reduce((total, row) => total + row.stages, 0),
    0,
  );
  const name = currency === null ? 'together' : `together, ${currency}`;
  return [name, '', kvar, stages, '', sum('capital'), sum('savingPerYear'), sum('npv'), ''];
}
