import { type Bill, billYear } from '../money/bill.js';
import type { CostBasis } from '../money/capital.js';
import { type SettledFinance, settleFinance } from '../money/cash-flow.js';
import { type PreparedTariff, prepareTariff } from '../money/prepare-tariff.js';
import { type Remark, remark } from '../problem.js';
import type { Site } from './site.js';
import type { Study } from './study.js';

/** A site's money before any bank: the tariff on the record, the bills as metered, prices and finance. */
export interface MoneyStudy {
  prepared: PreparedTariff;
  /** bills of the record as metered */
  before: Bill;
  /** null where the site gives no prices: bills only */
  prices: Omit<CostBasis, 'switchKind'> | null;
  finance: SettledFinance;
  /** defaults taken, and what is to be known of the price book */
  assumptions: Remark[];
}

/**
 * Prices the record as metered.
 * @param study site and record
 * @param site validated site
 * @returns the money without a bank, or null without a tariff
 * @throws InputProblem where the tariff does not fit the record
 * @source method-money
 */
export function moneyStudy(study: Study, site: Site): MoneyStudy | null {
  if (site.tariff === undefined) return null;
  const prepared = prepareTariff(site.tariff, study.record, study.zone);
  const { finance, absent } = settleFinance(site.finance);
  const prices = site.prices === undefined ? null : { prices: site.prices, cabinets: site.catalogue?.cabinets ?? [] };
  return {
    prepared,
    before: billYear(prepared, study.record, true),
    prices,
    finance,
    assumptions: [
      ...paperLines(site),
      ...tariffLines(site, prepared),
      ...(prices === null ? [] : absent.map((key) => financeLine(key, finance[key]))),
      ...priceLines(site),
      // What every saving rests on.
      remark('money.idealControl'),
      remark('money.sameLoad'),
    ],
  };
}

// Shared papers that were looked up: which version, and from when it holds.
function paperLines({ papers }: Site): Remark[] {
  return (['tariff', 'prices'] as const).flatMap((kind) => {
    const { name, version, date } = papers?.[kind] ?? {};
    if (name === undefined || version === undefined || date === undefined) return [];
    return [remark(`papers.${kind}`, { name, version, date }, { path: `papers.${kind}` })];
  });
}

function tariffLines(site: Site, prepared: PreparedTariff): Remark[] {
  const { tariff } = site;
  const lines: Remark[] = [];
  if (tariff?.decimals === undefined) {
    lines.push(remark('default.tariff.decimals', { value: prepared.decimals ?? 0 }, { path: 'tariff.decimals' }));
  }
  if (tariff?.taxPct === undefined) {
    lines.push(remark('default.tariff.taxPct', { value: 0 }, { path: 'tariff.taxPct', unit: '%' }));
  }
  if (tariff?.demandS === undefined) {
    lines.push(remark('default.tariff.demandS', { value: prepared.demandS }, { path: 'tariff.demandS', unit: 's' }));
  }
  return lines;
}

function financeLine(key: keyof SettledFinance, value: number): Remark {
  const place = { path: `finance.${key}` };
  return remark(`default.finance.${key}`, { value }, key === 'horizonYears' ? place : { ...place, unit: '%' });
}

function priceLines({ prices, asOf }: Site): Remark[] {
  if (prices === undefined) return [];
  const { validFrom, validTo } = prices;
  const early = asOf !== undefined && validFrom !== undefined && asOf < validFrom;
  const late = asOf !== undefined && validTo !== undefined && asOf > validTo;
  const dates = { asOf: asOf ?? '', validFrom: validFrom ?? '', validTo: validTo ?? '' };
  return [
    ...(prices.invented === true ? [remark('prices.invented', {}, { path: 'prices.invented' })] : []),
    ...(early ? [remark('prices.notYetValid', dates, { path: 'prices.validFrom' })] : []),
    ...(late ? [remark('prices.outOfDate', dates, { path: 'prices.validTo' })] : []),
  ];
}

/**
 * Kind of switch of a bank the site gives: its own, else the first of the price book, else of the catalogue.
 * @param site validated site
 * @returns the kind, or null where there is none
 * @source method-money
 */
export function siteSwitchKind(site: Site): string | null {
  return site.bank?.switchKind ?? site.prices?.switches?.[0]?.kind ?? site.catalogue?.switches?.[0]?.kind ?? null;
}
