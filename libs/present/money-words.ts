import type { Alternative, Bill, BillMonth, Money, MoneyPapers, SearchProof } from '#libs/engine/index.js';
import { formatFixed, formatNumber, formatQuantity, GAP } from './format-number.js';
import { say, words } from './language.js';
import { formatDate } from './local-stamp.js';
import { plainName } from './plain-name.js';

/** A tariff as it is being typed may say anything; more decimals than these are not printed. */
const MOST_DECIMALS = 6;

/** What every saving is called. */
export function noGuarantee(): string {
  return say`an estimate, not a guarantee`;
}

/**
 * An amount with its currency.
 * @param value amount, or null where there is none
 * @param currency its code, empty where none was given
 * @param decimals 0 for amounts over years, the tariff's for bills
 * @returns "1 234 EUR", an en dash for null
 */
export function formatMoney(value: number | null, currency: string, decimals = 0): string {
  if (value === null) return '–';
  const text = formatFixed(value, decimals);
  return currency === '' ? text : `${text}${GAP}${currency}`;
}

/**
 * Decimals a bill's amounts are printed with: what its lines are rounded to.
 * @param papers the tariff among them
 * @returns 2 where the tariff does not say, or leaves its lines unrounded
 */
export function billDecimals({ tariff }: MoneyPapers): number {
  return Math.min(Math.max(tariff?.decimals ?? 2, 0), MOST_DECIMALS);
}

/**
 * A time to pay back, to a tenth of a month.
 * @param years from the day the capital is paid
 * @returns "3 years 4.6 months"
 */
export function formatPayback(years: number): string {
  const tenths = Math.round(120 * years);
  const whole = Math.floor(tenths / 120);
  const months = say`${formatFixed((tenths - 120 * whole) / 10, 1)}\u00a0months`;
  if (whole === 0) return months;
  return `${whole}${GAP}${whole === 1 ? say`year` : say`years`}${GAP}${months}`;
}

/**
 * When the capital is back, or why it is not.
 * @param money a result's money with prices
 * @param horizonYears years looked at
 * @returns the time, or a reason
 */
export function paybackWords(money: Money, horizonYears: number): string {
  if (money.paybackYears !== null) return formatPayback(money.paybackYears);
  if (money.paybackReason === 'no capital') return say`nothing has to be paid first`;
  return say`not within ${formatQuantity(horizonYears, say`years`, 'given')}`;
}

/**
 * The internal rate of return, or why there is none.
 * @param money a result's money with prices
 * @returns "12.3 % a year", or a reason
 */
export function returnWords(money: Money): string {
  if (money.irrPct !== null) return say`${formatQuantity(money.irrPct, '%')} a year`;
  if (money.irrReason === 'several sign changes') return say`none: more than one rate brings the value to 0`;
  return say`none: no rate brings the value to 0`;
}

/**
 * The tariff by its name.
 * @param papers what the money is reckoned by
 * @returns a sentence
 */
export function tariffWords({ tariff }: MoneyPapers): string {
  if (tariff === null) return say`No tariff was given.`;
  const count = tariff.clauses?.length ?? 0;
  const clauses = `${count} ${count === 1 ? say`clause` : say`clauses`}`;
  const tax = tariff.taxPct === undefined ? say`without tax` : say`tax ${formatQuantity(tariff.taxPct, '%', 'given')}`;
  return say`Tariff: ${named(tariff.name)}, ${clauses}, ${tax}.`;
}

/**
 * The price book by its name and dates, and whether it is made up.
 * @param papers what the money is reckoned by
 * @returns a sentence or two
 */
export function priceBookWords({ prices }: MoneyPapers): string {
  if (prices === null) return say`No prices were given, so the bank itself is not priced.`;
  const { validFrom, validTo } = prices;
  const dates = [
    ...(validFrom === undefined ? [] : [say`from ${formatDate(validFrom)}`]),
    ...(validTo === undefined ? [] : [say`until ${formatDate(validTo)}`]),
  ];
  const valid = dates.length === 0 ? say`without a date` : say`valid ${dates.join(' ')}`;
  const invented =
    prices.invented === true ? say` The prices are invented: they show the reckoning, not what things cost.` : '';
  return say`Price book: ${named(prices.name)}, ${valid}.${invented}`;
}

/**
 * How money over the years is reckoned.
 * @param papers what the money is reckoned by
 * @returns a sentence
 */
export function financeWords({ finance }: MoneyPapers): string {
  const { discountPct, horizonYears, billGrowthPct, costGrowthPct } = finance;
  return say`Reckoned over ${formatQuantity(horizonYears, horizonYears === 1 ? say`year` : say`years`, 'given')} at ${formatQuantity(discountPct, '%', 'given')} a year,
      bills growing by ${formatQuantity(billGrowthPct, '%', 'given')}, costs by ${formatQuantity(costGrowthPct, '%', 'given')}; no residual value.`;
}

function named(name: string | undefined): string {
  return name === undefined ? say`without a name` : say`“${plainName(name)}”`;
}

/**
 * What became of the candidates of a search, in one sentence.
 * @param proof the search's counts
 * @param currency of the margin
 * @returns why the choice is the best of its candidates
 */
export function proofWords(proof: SearchProof, currency: string): string {
  const count = (value: number) => `${formatNumber(value, 'whole')}${GAP}${value === 1 ? say`was` : say`were`}`;
  const rest =
    proof.lowerBoundMargin === null
      ? say`none of the rest was left unsettled.`
      : say`by its bound, the best of the rest falls short of it by at least ${formatMoney(proof.lowerBoundMargin, currency, 2)}.`;
  return say`Proof: of ${formatNumber(proof.candidates, 'whole')} candidates ${count(proof.refused)} refused by a limit or the target,
      ${count(proof.boundedAway)} bounded away, ${count(proof.partlySimulated)} given up part of the way,
      ${count(proof.simulated)} simulated through the whole record; ${rest}`;
}

/** One of the three ways that are always weighed. */
export interface NamedPick {
  name: string;
  /** null where there is no such way */
  way: Alternative | null;
  isRecommended: boolean;
  /** why it is taken, or not */
  reason: string;
}

const PICKS = ['do nothing', "keep today's bank", 'new bank'] as const;
const PICK_NAMES: Record<(typeof PICKS)[number], string> = words({
  'do nothing': 'Do nothing',
  "keep today's bank": 'Keep today’s bank',
  'new bank': 'Build the new bank',
});

/**
 * Doing nothing, keeping today's bank and the best new one, with the reasons between them.
 * @param money a result's money
 * @param papers what it is reckoned by
 * @returns three, none where nothing was compared
 */
export function namedPicks(money: Money, papers: MoneyPapers): NamedPick[] {
  if (money.recommended === null) return [];
  const ways = PICKS.map((key) => money.alternatives.find((one) => !one.sample && one.name === key) ?? null);
  const taken = ways[PICKS.indexOf(money.recommended)]!;
  return PICKS.map((key, at) => {
    const name = PICK_NAMES[key];
    const way = ways[at]!;
    const isRecommended = key === money.recommended;
    const reason = isRecommended
      ? takenReason(taken, ways, papers)
      : way === null
        ? key === 'new bank'
          ? say`No candidate of the catalogue holds.`
          : say`The site has no bank today.`
        : passedReason(way, taken, papers);
    return { name, way, isRecommended, reason };
  });
}

function mayBeTaken(way: Alternative, { mustMeetTarget }: MoneyPapers): boolean {
  return (way.targetMet || !mustMeetTarget) && way.verdict !== 'avoid';
}

function takenReason(taken: Alternative, ways: readonly (Alternative | null)[], papers: MoneyPapers): string {
  const others = ways.filter((way) => way !== null && way !== taken && mayBeTaken(way, papers)) as Alternative[];
  if (papers.mustMeetTarget && !taken.targetMet)
    return say`Nothing else may be taken; it misses the target all the same.`;
  if (others.length === 0) return say`The only way that holds.`;
  const next = others.reduce((best, way) => (way.npv > best.npv ? way : best));
  const more = taken.npv - next.npv;
  if (more <= 0.005) return say`Worth no less than the other ways that hold.`;
  return say`Worth ${formatMoney(more, papers.currency)} more than the next way that holds.`;
}

function passedReason(way: Alternative, taken: Alternative, papers: MoneyPapers): string {
  const faults = [
    ...(way.verdict === 'avoid' ? [say`it is over a limit`] : []),
    ...(papers.mustMeetTarget && !way.targetMet ? [say`it misses the target, which is demanded in every month`] : []),
  ];
  if (faults.length > 0) return say`Not to be taken: ${faults.join(say`, and `)}.`;
  const less = taken.npv - way.npv;
  if (less <= 0.005) return say`Worth no more, and something would have to be done for it.`;
  return say`Worth ${formatMoney(less, papers.currency)} less.`;
}

/** A clause's amount over the record, before and after. */
export interface ClauseSum {
  clause: string;
  before: number;
  after: number;
}

/**
 * The clauses of the bills, added over the record's months; tax is the last, where there is any.
 * @param bills before and after
 * @returns one sum a clause, in the tariff's order
 */
export function clauseSums(bills: { before: Bill; after: Bill }): ClauseSum[] {
  const names = bills.before.months[0]?.lines.map(({ clause }) => clause) ?? [];
  const sum = (bill: Bill, of: (month: BillMonth) => number) =>
    bill.months.reduce((total, month) => total + of(month), 0);
  const both = (clause: string, of: (month: BillMonth) => number) => ({
    clause,
    before: sum(bills.before, of),
    after: sum(bills.after, of),
  });
  const tax = both(say`tax`, ({ tax: amount }) => amount);
  return [
    ...names.map((name, at) => both(name, ({ lines }) => lines[at]?.amount ?? 0)),
    ...(tax.before === 0 && tax.after === 0 ? [] : [tax]),
  ];
}
