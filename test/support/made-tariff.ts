import type {
  BilledQuantity,
  Clause,
  ContractedDemandClause,
  DemandClause,
  EnergyClause,
  ReactiveBasis,
  Scale,
  Tariff,
  TariffWindow,
} from '#libs/engine/index.js';
import type { Chance } from './chance.js';

/** Windows that share out every moment: two parts of working days, and the rest. */
export const SHARED_OUT: TariffWindow[] = [
  {
    name: 'peak',
    days: [1, 2, 3, 4, 5],
    hours: [
      [8, 12],
      [17, 21.5],
    ],
  },
  {
    name: 'offPeak',
    days: [1, 2, 3, 4, 5],
    hours: [
      [12, 17],
      [21.5, 8],
    ],
  },
  { name: 'rest', days: [6, 7, 8] },
];

const OTHERS: TariffWindow[] = [
  { name: 'night', hours: [[23.5, 6.25]] },
  { name: 'winter', months: [11, 12, 1, 2, 3] },
  { name: 'winterDay', months: [11, 12, 1, 2, 3], days: [1, 2, 3, 4, 5, 6], hours: [[6, 22]] },
];

const KINDS: Clause['kind'][] = [
  'fixed',
  'energy',
  'energyByFactor',
  'kvarhBeyondRatio',
  'kvarBeyondRatio',
  'demand',
  'contractedDemand',
  'percent',
  'formula',
];
const BASES: ReactiveBasis[] = ['lagging', 'leading', 'both', 'net'];
const FORMULAS = [
  'max(maxKva - 100, 0) * 1.5',
  'if(powerFactor < 0.9, (0.9 / powerFactor − 1) × billSoFar, −0.01 * billSoFar)',
  '0.02 * max(laggingKvarh.peak - 0.4 * activeKwh.peak, 0) + 12 * days * coverage',
  'round(activeKwh / max(maxKw * hours, 1), 3) * 100 + month',
  'min(sqrt(activeKwh ^ 2 + laggingKvarh ^ 2) * 1e-2, 5000) - 2 ^ 2 * leadingKvarh / 1e3',
  'floor(maxKw.winterDay / 10) + ceil(maxKvar / 7) + abs(month - 6) + (maxKw >= maxKva.night)',
];

/**
 * A tariff of no real supplier: some of every kind of clause, windows, scales, roundings.
 * @param random where the numbers come from
 * @param demandS choices for the demand block [s]
 * @returns the tariff
 */
export function madeTariff(random: Chance, demandS: readonly number[]): Tariff {
  const count = random.whole(1, 7);
  const clauses: Clause[] = [];
  for (let k = 0; k < count; k++) clauses.push(madeClause(random, `clause ${k}`, clauses));
  return {
    decimals: random.oneOf([2, 2, 2, 0, 3, null]),
    taxPct: random.oneOf([0, 20, 7.7]),
    demandS: random.oneOf(demandS),
    factor: {
      basis: random.oneOf(['energy', 'atMaxKw', 'maxima']),
      reactive: random.oneOf(BASES),
      decimals: random.oneOf([null, 2, 3, 4]),
    },
    holidays: ['2024-03-25', '2024-04-01', '2024-10-31', '2024-12-25', '2025-01-01'],
    windows: [...SHARED_OUT, ...OTHERS],
    clauses,
  };
}

function madeClause(random: Chance, name: string, before: readonly Clause[]): Clause {
  const kind = random.oneOf(KINDS);
  const common = { name, ...madeCommon(random) };
  const price = () => Number(random.between(0.001, 0.3).toFixed(4));
  switch (kind) {
    case 'fixed':
      return { ...common, kind, amountPerMonth: random.whole(-50, 500) / 4 };
    case 'energy':
      return { ...common, kind, of: random.oneOf(['kWh', 'kVAh'] as const), ...madeEnergyPrice(random, price) };
    case 'energyByFactor':
      return { ...common, kind, pricePerUnit: price(), scale: madeScale(random) };
    case 'kvarhBeyondRatio': {
      const byWindow = common.windows !== undefined && random.next() < 0.5;
      if (random.next() < 0.5) {
        return { ...common, kind, byWindow, freeRatio: random.oneOf([0, 0.33, 0.5]), pricePerUnit: price() };
      }
      const tiers = [0.2, 0.45, 0.7].map((aboveRatio) => ({ aboveRatio, pricePerUnit: price() }));
      return { ...common, kind, byWindow, tiers, cumulative: random.next() < 0.5 };
    }
    case 'kvarBeyondRatio': {
      const at = random.oneOf(['maxKvar', 'maxKw'] as const);
      const ratio = random.oneOf([0.3, 0.6197]);
      return { ...common, kind, ...madeBilled(random), ratio, at, pricePerUnit: 10 * price() };
    }
    case 'demand':
      return { ...common, kind, ...madeBilled(random), ...madeDemand(random, price) };
    case 'contractedDemand': {
      const { per: _, ...monthly } = common;
      return { ...monthly, kind, ...madeContract(random, price) };
    }
    case 'percent': {
      const names = before.map((clause) => clause.name).filter(() => random.next() < 0.6);
      const applies = names.length === 0 || random.next() < 0.4 ? ('all' as const) : names;
      return { ...common, kind, scale: madeScale(random), applies };
    }
    case 'formula':
      return { ...common, kind, expression: random.oneOf(FORMULAS) };
  }
}

function some<T>(random: Chance, share: number, part: () => T): Partial<T> {
  return random.next() < share ? part() : {};
}

function madeEnergyPrice(random: Chance, price: () => number): Partial<EnergyClause> {
  const upTo = random.whole(100, 30_000);
  return random.oneOf([
    { pricePerUnit: price() },
    { prices: { peak: price(), offPeak: price(), rest: price() } },
    {
      blocks: [
        { upTo, pricePerUnit: price() },
        { upTo: 2 * upTo, pricePerUnit: price() },
        { upTo: null, pricePerUnit: price() },
      ],
    },
  ]);
}

function madeBilled(random: Chance): BilledQuantity {
  return {
    ...some(random, 0.4, () => ({ wholeUnits: random.oneOf(['up', 'down', 'nearest'] as const) })),
    ...some(random, 0.3, () => ({ minimum: random.whole(50, 300) })),
    ...some(random, 0.4, () => ({
      ratchet: {
        pct: random.whole(50, 100),
        months: random.whole(1, 12),
        ...some(random, 0.5, () => ({ of: [11, 12, 1, 2, 3] })),
      },
    })),
  };
}

function madeDemand(random: Chance, price: () => number): Pick<DemandClause, 'basis'> & Partial<DemandClause> {
  return {
    basis: random.oneOf(['kW', 'kVA', 'kWOrKvaShare'] as const),
    kvaShare: 0.9,
    ...some(random, 0.5, () => ({ scale: madeScale(random) })),
    ...random.oneOf([
      { pricePerUnit: 10 * price() },
      { prices: { peak: 10 * price(), offPeak: 5 * price(), rest: price() } },
    ]),
  };
}

function madeContract(
  random: Chance,
  price: () => number,
): Omit<ContractedDemandClause, 'name' | 'kind' | 'months' | 'windows' | 'taxed' | 'per' | 'reactive'> {
  const pricePerUnit = 10 * price();
  return {
    basis: random.oneOf(['kW', 'kVA', 'kWOrKvaShare'] as const),
    kvaShare: 0.9,
    contracted: random.whole(50, 400),
    pricePerUnit,
    overrunPricePerUnit: random.oneOf([1, 2, 3]) * pricePerUnit,
    ...some(random, 0.4, () => ({ wholeUnits: random.oneOf(['up', 'down', 'nearest'] as const) })),
    ...some(random, 0.5, () => ({ tolerancePct: random.oneOf([5, 10]) })),
    ...some(random, 0.5, () => ({ leastPct: random.oneOf([0, 50, 85]) })),
  };
}

function madeCommon(random: Chance): Pick<Clause, 'months' | 'windows' | 'taxed' | 'per' | 'reactive'> {
  return {
    ...some(random, 0.2, () => ({ months: [1, 2, 3, 10, 11, 12] })),
    ...some(random, 0.3, () => ({
      windows: random.oneOf([['peak'], ['peak', 'night'], ['winterDay', 'rest'], ['offPeak']]),
    })),
    ...some(random, 0.2, () => ({ taxed: false })),
    ...some(random, 0.4, () => ({ per: random.oneOf(['month', 'day', 'hour', 'interval'] as const) })),
    ...some(random, 0.5, () => ({ reactive: random.oneOf(BASES) })),
  };
}

/**
 * A scale of any form.
 * @param random where the numbers come from
 * @returns the scale
 */
export function madeScale(random: Chance): Scale {
  const bounds = {
    ...(random.next() < 0.4 ? { pctDecimals: random.whole(0, 3) } : {}),
    ...(random.next() < 0.3 ? { minPct: -2.5 } : {}),
    ...(random.next() < 0.3 ? { maxPct: 25 } : {}),
  };
  switch (random.whole(0, 2)) {
    case 0:
      return {
        form: 'points',
        reference: random.oneOf([0.9, 0.92, 0.95]),
        below: [
          { downTo: 0.85, pctPerPoint: random.oneOf([0.5, 1, 1.5]) },
          { downTo: random.oneOf([0.5, 0.7]), pctPerPoint: 2 },
        ],
        above: [
          { upTo: 0.97, pctPerPoint: -0.25 },
          { upTo: 1, pctPerPoint: -0.5 },
        ],
        cumulative: random.next() < 0.6,
        count: random.oneOf(['exact', 'orPart', 'whole']),
        ...bounds,
      };
    case 1:
      return {
        form: 'steps',
        steps: [
          { from: 0, pct: 12 },
          { from: 0.8, pct: 5.5 },
          { from: 0.9, pct: 0 },
          { from: 0.95, pct: -1.5 },
        ],
        ...bounds,
      };
    default:
      return { form: 'ratio', reference: 0.92, belowPct: 60, abovePct: random.oneOf([0, 25, 100]), ...bounds };
  }
}
