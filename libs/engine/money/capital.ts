import type { Bank } from '../layout/bank.js';
import type { CatalogueInput } from '../layout/catalogue.js';
import type { PriceBook } from './papers.js';
import { bracketed, product, put, sum } from './working.js';

/** Items of what a new bank costs, in this order. */
export const CAPITAL_ITEMS = [
  'capacitors',
  'stages',
  'reactors',
  'switches',
  'cabinets',
  'installation',
  'controller and engineering',
  'contingency',
] as const;

/** One item of the capital. */
export interface CapitalLine {
  item: (typeof CAPITAL_ITEMS)[number];
  amount: number;
  working: string;
}

/** What a new bank costs. */
export interface Capital {
  total: number;
  lines: CapitalLine[];
}

/** What a bank is paid from: a price book, the cabinets it may stand in, and the kind of its switches. */
export interface CostBasis {
  prices: PriceBook;
  cabinets: NonNullable<CatalogueInput['cabinets']>;
  switchKind: string | null;
}

/** A total this little beyond what a cabinet holds still fits [share]. */
const FIT_WIDTH = 1e-9;

/**
 * Rated kvar of a bank: ΣQ_N.
 * @param bank the bank
 * @returns [kvar]
 */
export function ratedTotalKvar(bank: Bank): number {
  return bank.groups.reduce((total, group) => total + group.count * group.ratedKvar, 0);
}

/**
 * Physical stages of a bank.
 * @param bank the bank
 * @returns count
 */
export function stageCount(bank: Bank): number {
  return bank.groups.reduce((total, group) => total + group.count, 0);
}

/**
 * What a bank costs new, item by item; absent prices are 0. Per kvar is per rated kvar.
 * @param bank the bank
 * @param basis price book, cabinets, switch kind
 * @returns items with their workings, and their total
 * @source method-money
 */
export function capitalOf(bank: Bank, basis: CostBasis): Capital {
  const { prices } = basis;
  const kvar = ratedTotalKvar(bank);
  const stages = stageCount(bank);
  const before: CapitalLine[] = [
    line('capacitors', [[kvar, prices.perKvar]]),
    line('stages', [[stages, prices.perStage]]),
    line('reactors', reactorTerms(bank, prices)),
    line('switches', switchTerms(basis, stages, kvar)),
    line('cabinets', cabinetTerms(basis, stages, kvar)),
    line('installation', [
      [1, prices.installationFixed],
      [kvar, prices.installationPerKvar],
    ]),
    line('controller and engineering', [[1, prices.fixed]]),
  ];
  const rest = before.reduce((total, { amount }) => total + amount, 0);
  const pct = prices.contingencyPct ?? 0;
  const terms = before.filter(({ amount }) => amount !== 0).map(({ amount }) => put(amount));
  const contingency: CapitalLine = {
    item: 'contingency',
    amount: (pct / 100) * rest,
    working: `${put(pct)} / 100 · ${bracketed(terms.length === 0 ? ['0'] : terms)}`,
  };
  return { total: rest + contingency.amount, lines: [...before, contingency] };
}

/**
 * What a bank of one reactor ratio costs new, as a number: the total of `capitalOf` to its last bits.
 * @param sums ΣQ_N, stages and reactor ratio of the bank
 * @param basis price book, cabinets, switch kind
 * @returns total
 * @source method-money
 */
export function capitalTotal(
  { ratedKvar, stages, reactorPct }: { ratedKvar: number; stages: number; reactorPct: number },
  basis: CostBasis,
): number {
  const { prices } = basis;
  const reactor = prices.reactors?.find((entry) => entry.reactorPct === reactorPct);
  const kind = prices.switches?.find((entry) => entry.kind === basis.switchKind);
  const cabinet = cheapestCabinets(basis, stages, ratedKvar);
  const perKvar =
    (prices.perKvar ?? 0) + (reactor?.perKvar ?? 0) + (kind?.perKvar ?? 0) + (prices.installationPerKvar ?? 0);
  const perStage = (prices.perStage ?? 0) + (kind?.perStage ?? 0);
  const fixed = (prices.installationFixed ?? 0) + (prices.fixed ?? 0);
  const cabinets = cabinet === null ? 0 : cabinet.count * cabinet.price;
  return (perKvar * ratedKvar + perStage * stages + cabinets + fixed) * (1 + (prices.contingencyPct ?? 0) / 100);
}

type Term = [quantity: number, price: number | undefined];

function line(item: CapitalLine['item'], terms: readonly Term[]): CapitalLine {
  const priced = terms.filter(([, price]) => price !== undefined) as [number, number][];
  return {
    item,
    amount: priced.reduce((total, [quantity, price]) => total + quantity * price, 0),
    working: sum(priced.map(([quantity, price]) => product(quantity, price))),
  };
}

// A reactor's price is that of its exact ratio.
function reactorTerms(bank: Bank, prices: PriceBook): Term[] {
  return bank.groups.flatMap((group): Term[] => {
    const entry = prices.reactors?.find(({ reactorPct }) => reactorPct === group.reactorPct);
    return entry === undefined ? [] : [[group.count * group.ratedKvar, entry.perKvar]];
  });
}

function switchTerms({ prices, switchKind }: CostBasis, stages: number, kvar: number): Term[] {
  const entry = prices.switches?.find(({ kind }) => kind === switchKind);
  return [
    [stages, entry?.perStage],
    [kvar, entry?.perKvar],
  ];
}

function cabinetTerms(basis: CostBasis, stages: number, kvar: number): Term[] {
  const best = cheapestCabinets(basis, stages, kvar);
  return best === null ? [] : [[best.count, best.price]];
}

// n cabinets of one kind hold all rated kvar and all stages: the least price, then fewer, then the first.
function cheapestCabinets(
  { prices, cabinets }: CostBasis,
  stages: number,
  kvar: number,
): { count: number; price: number } | null {
  let best: { count: number; price: number } | null = null;
  for (const cabinet of cabinets) {
    const count = Math.max(
      Math.ceil(kvar / cabinet.maxKvar - FIT_WIDTH),
      Math.ceil(stages / cabinet.maxStages - FIT_WIDTH),
    );
    const price = prices.cabinets?.find(({ name }) => name === cabinet.name)?.price ?? 0;
    const saves = best === null ? 1 : best.count * best.price - count * price;
    if (best === null || saves > 0 || (saves === 0 && count < best.count)) best = { count, price };
  }
  return best;
}
