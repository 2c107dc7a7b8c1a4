import { energyPowerFactor } from '../quantity/power-factor.js';
import { type ClauseGround, pricedParts, type ReadyClause, selectionOf } from './clause-ground.js';
import type { EnergyReading } from './energy-reading.js';
import type {
  EnergyByFactorClause,
  EnergyClause,
  FixedClause,
  KvarhBeyondRatioClause,
  ReactiveBasis,
} from './papers.js';
import { scalePct } from './scale.js';
import { product, put, sum } from './working.js';

/** Excess energy below this is none [kvarh]. */
export const EXCESS_WIDTH_KVARH = 1e-9;

/**
 * An amount a month, by the share of the month that is covered.
 * @param clause the clause
 * @returns it, ready
 * @source method-money
 */
export function fixedClause(clause: FixedClause): ReadyClause {
  return {
    unit: 'month',
    carries: false,
    price(run) {
      run.quantity = run.month.coverage;
      if (run.say) run.working = product(clause.amountPerMonth, run.quantity);
      return clause.amountPerMonth * run.quantity;
    },
  };
}

interface Block {
  upTo: number;
  pricePerUnit: number;
}

/**
 * Energy times its price: kWh, or √(E_p² + E_q²) of each period; blocks up to their limits by the share of the month.
 * @param ground what the tariff's clauses are made ready on
 * @param clause the clause
 * @param path its path, for a refusal
 * @returns it, ready
 * @throws InputProblem where priced windows don't share out its intervals
 * @source method-money
 */
export function energyClause(ground: ClauseGround, clause: EnergyClause, path: string): ReadyClause {
  const of = clause.of ?? 'kWh';
  const basis = clause.reactive ?? 'lagging';
  const blocks = clause.blocks?.map((block) => ({ ...block, upTo: block.upTo ?? Number.POSITIVE_INFINITY }));
  const parts = pricedParts(ground, clause, path).map(({ selection, pricePerUnit }) => {
    const list: Block[] = blocks ?? [{ upTo: Number.POSITIVE_INFINITY, pricePerUnit }];
    const reading = ground.readings.energy(selection, clause.per ?? 'month');
    return { reading, blocks: list, slices: new Float64Array(list.length) };
  });
  return {
    unit: of,
    carries: false,
    price(run) {
      let amount = 0;
      let quantity = 0;
      for (const part of parts) {
        part.slices.fill(0);
        for (let period = 0; period < part.reading.periods; period++) {
          const energy = energyOf(part.reading, of, basis, period);
          quantity += energy;
          sliceInto(part.slices, part.blocks, energy, run.month.coverage);
        }
        for (const [b, block] of part.blocks.entries()) amount += part.slices[b]! * block.pricePerUnit;
      }
      run.quantity = quantity;
      if (run.say) run.working = sum(parts.flatMap((part) => slicesWorking(part.slices, part.blocks)));
      return amount;
    },
  };
}

function energyOf(reading: EnergyReading, of: 'kWh' | 'kVAh', basis: ReactiveBasis, period: number): number {
  const active = reading.activeKwh(period);
  if (of === 'kWh') return active;
  const reactive = reading.reactiveKvarh(basis, period);
  return Math.sqrt(active * active + reactive * reactive);
}

// Adds what of an energy falls into each block.
function sliceInto(slices: Float64Array, blocks: readonly Block[], energy: number, coverage: number): void {
  let begin = 0;
  for (let b = 0; b < blocks.length && energy > begin; b++) {
    const end = blocks[b]!.upTo * coverage;
    slices[b]! += Math.min(energy, end) - begin;
    begin = end;
  }
}

function slicesWorking(slices: Float64Array, priced: readonly { pricePerUnit: number }[]): string[] {
  const taken = [...priced.entries()].filter(([b]) => b === 0 || slices[b] !== 0);
  return taken.map(([b, { pricePerUnit }]) => product(slices[b]!, pricePerUnit));
}

/**
 * Energy of each period times the percentage of its own power factor: Σ E_p·pct(λ)/100, times the price.
 * @param ground what the tariff's clauses are made ready on
 * @param clause the clause
 * @returns it, ready
 * @source method-money
 */
export function energyByFactorClause(ground: ClauseGround, clause: EnergyByFactorClause): ReadyClause {
  const reading = ground.readings.energy(selectionOf(ground, clause), clause.per ?? 'month');
  const basis = clause.reactive ?? 'lagging';
  const pct = scalePct(clause.scale);
  const pctOf = (period: number): number =>
    pct(energyPowerFactor(reading.activeKwh(period), reading.reactiveKvarh(basis, period)));
  return {
    unit: 'kWh',
    carries: false,
    price(run) {
      let quantity = 0;
      for (let period = 0; period < reading.periods; period++) {
        quantity += (reading.activeKwh(period) * pctOf(period)) / 100;
      }
      run.quantity = quantity;
      if (run.say) {
        run.working =
          reading.periods === 1
            ? `${product(reading.activeKwh(0), pctOf(0))} / 100 · ${put(clause.pricePerUnit)}`
            : product(quantity, clause.pricePerUnit);
      }
      return quantity * clause.pricePerUnit;
    },
  };
}

interface Tier {
  aboveRatio: number;
  pricePerUnit: number;
}

/**
 * Reactive energy beyond a share of the active, per period and, with `byWindow`, per window: E_q − r₁·E_p where it is
 * more than 10⁻⁹. Tiers price each slice, or, not cumulative, the whole excess at the price of the last tier passed.
 * @param ground what the tariff's clauses are made ready on
 * @param clause the clause
 * @returns it, ready
 * @source method-money
 */
export function kvarhClause(ground: ClauseGround, clause: KvarhBeyondRatioClause): ReadyClause {
  const basis = clause.reactive ?? 'lagging';
  const tiers: Tier[] = clause.tiers ?? [{ aboveRatio: clause.freeRatio ?? 0, pricePerUnit: clause.pricePerUnit ?? 0 }];
  const selections =
    clause.byWindow === true
      ? (clause.windows ?? []).map((window) => ground.masks.selection({ union: [window], within: null }))
      : [selectionOf(ground, clause)];
  const readings = selections.map((selection) => ground.readings.energy(selection, clause.per ?? 'month'));
  const excessInto = clause.cumulative === false ? wholeExcessInto : slicedExcessInto;
  const slices = new Float64Array(tiers.length);
  return {
    unit: 'kvarh',
    carries: false,
    price(run) {
      slices.fill(0);
      for (const reading of readings) excessesInto(slices, reading, { tiers, basis, excessInto });
      let amount = 0;
      let quantity = 0;
      for (const [k, tier] of tiers.entries()) {
        quantity += slices[k]!;
        amount += slices[k]! * tier.pricePerUnit;
      }
      run.quantity = quantity;
      if (run.say) {
        const only = readings.length === 1 && readings[0]!.periods === 1 ? readings[0]! : null;
        run.working =
          only === null
            ? sum(slicesWorking(slices, tiers))
            : excessWorking(
                slices,
                tiers,
                { kvarh: only.reactiveKvarh(basis, 0), kwh: only.activeKwh(0) },
                clause.cumulative !== false,
              );
      }
      return amount;
    },
  };
}

type ExcessInto = (slices: Float64Array, tiers: readonly Tier[], kvarh: number, kwh: number) => void;

function excessesInto(
  slices: Float64Array,
  reading: EnergyReading,
  { tiers, basis, excessInto }: { tiers: readonly Tier[]; basis: ReactiveBasis; excessInto: ExcessInto },
): void {
  for (let period = 0; period < reading.periods; period++) {
    excessInto(slices, tiers, reading.reactiveKvarh(basis, period), reading.activeKwh(period));
  }
}

function slicedExcessInto(slices: Float64Array, tiers: readonly Tier[], kvarh: number, kwh: number): void {
  if (kvarh - tiers[0]!.aboveRatio * kwh <= EXCESS_WIDTH_KVARH) return;
  for (let k = 0; k < tiers.length; k++) {
    const begin = tiers[k]!.aboveRatio * kwh;
    if (kvarh <= begin) return;
    const end = k + 1 < tiers.length ? tiers[k + 1]!.aboveRatio * kwh : Number.POSITIVE_INFINITY;
    slices[k]! += Math.min(kvarh, end) - begin;
  }
}

function wholeExcessInto(slices: Float64Array, tiers: readonly Tier[], kvarh: number, kwh: number): void {
  const excess = kvarh - tiers[0]!.aboveRatio * kwh;
  if (excess <= EXCESS_WIDTH_KVARH) return;
  let passed = 0;
  for (let k = 1; k < tiers.length; k++) {
    if (kvarh - tiers[k]!.aboveRatio * kwh > EXCESS_WIDTH_KVARH) passed = k;
  }
  slices[passed]! += excess;
}

function excessWorking(
  slices: Float64Array,
  tiers: readonly Tier[],
  { kvarh, kwh }: { kvarh: number; kwh: number },
  cumulative: boolean,
): string {
  const taken = [...tiers.entries()].filter(([k]) => slices[k] !== 0);
  const first = tiers[0]!;
  if (taken.length === 0)
    return `max(${put(kvarh)} − ${product(first.aboveRatio, kwh)}, 0) · ${put(first.pricePerUnit)}`;
  return sum(
    taken.map(([k, tier]) => {
      const next = cumulative ? tiers[k + 1] : undefined;
      const top = next !== undefined && kvarh > next.aboveRatio * kwh ? product(next.aboveRatio, kwh) : put(kvarh);
      const bottom = product(cumulative ? tier.aboveRatio : first.aboveRatio, kwh);
      return `(${top} − ${bottom}) · ${put(tier.pricePerUnit)}`;
    }),
  );
}
