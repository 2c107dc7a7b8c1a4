import type { BreakEven, Outcome, WayRobustness } from '#libs/engine/index.js';
import { formatNumber, formatQuantity } from './format-number.js';
import { plainName } from './plain-name.js';
import { MONEY_QUANTITY_WORDS, pickChangeWords, savingWords, WAY_WORDS } from './saving-words.js';

/** A line of a report: what it is, and what is said of it. */
export interface MoneyLine {
  label: string;
  text: string;
}

/**
 * What a result says of money, for a terminal.
 * @param outcome plan or judgement
 * @returns lines, none without a tariff
 */
export function moneyLines({ result, site, priced }: Outcome): MoneyLine[] {
  const { money } = result;
  if (money === null) return [];
  const amount = (value: number): string => formatQuantity(value, site.currency ?? '', 'whole');
  const { bills, npv, capital, savingRange, robustness } = money;
  const lines: MoneyLine[] = [
    { label: 'bills', text: `${amount(bills.before.total)} before, ${amount(bills.after.total)} after` },
  ];
  if (savingRange !== null) {
    const [headline, ...cases] = savingWords(savingRange, site.currency);
    lines.push({ label: 'saving', text: headline! }, ...cases.map((text) => ({ label: '', text })));
  }
  if (npv !== null && capital !== null) {
    lines.push({ label: 'net present value', text: `${amount(npv)} for ${amount(capital.total)} of capital` });
  }
  const way = robustness?.ways.find(({ name }) => name === priced?.chosen);
  if (way !== undefined) lines.push(...movedLines(way, amount));
  for (const { clause, unit, contracted, after } of money.contracts) {
    const values = `${formatQuantity(contracted, unit, 'given')} now, ${formatQuantity(after.proposed, unit)} would cost least`;
    const amounts = `${amount(after.amount)} and ${amount(after.amountProposed)} over the record`;
    lines.push({ label: `contracted, ${plainName(clause)}`, text: `${values} after the bank: ${amounts}` });
  }
  const changes = (robustness?.pickChanges ?? []).flatMap(pickChangeWords);
  if (changes.length > 0) lines.push({ label: 'would be better', text: changes.join('; ') });
  return lines;
}

function movedLines({ name, moved, breakEvens }: WayRobustness, amount: (value: number) => string): MoneyLine[] {
  const npvs = moved.flatMap(({ npv }) => npv ?? []);
  const lines: MoneyLine[] = [];
  if (npvs.length > 0) {
    const range = `${amount(Math.min(...npvs))} to ${amount(Math.max(...npvs))}`;
    lines.push({ label: 'with inputs moved', text: `${range}, for ${WAY_WORDS[name]}` });
  }
  const even = breakEvens.flatMap(evenWords);
  if (even.length > 0) lines.push({ label: 'breaks even at', text: even.join('; ') });
  return lines;
}

function evenWords({ quantity, lowFactor, highFactor }: BreakEven): string[] {
  const factors = [lowFactor, highFactor].flatMap((factor) => factor ?? []);
  return factors.map((factor) => `${MONEY_QUANTITY_WORDS[quantity]} × ${formatNumber(factor)}`);
}
