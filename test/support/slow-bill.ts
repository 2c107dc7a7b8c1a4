import type {
  BilledQuantity,
  Clause,
  ContractedDemandClause,
  DemandClause,
  EnergyByFactorClause,
  EnergyClause,
  KvarBeyondRatioClause,
  KvarhBeyondRatioClause,
  Tariff,
} from '#libs/engine/index.js';
import type { MadeMeter } from './priced-meter.js';
import { slowFormula } from './slow-formula.js';
import { type Reading, SlowMeter, slowReactive } from './slow-readings.js';
import { slowPct, slowRound } from './slow-scale.js';

/*
 * Bills worked out the long way, clause by clause over lists of readings, as a person with the tariff on the desk would:
 * nothing prepared, nothing shared. The second method of the bill's tests.
 */

/** A month's bill as lists of amounts. */
export interface SlowMonth {
  month: string;
  coverage: number;
  lines: { clause: string; quantity: number; amount: number }[];
  tax: number;
  total: number;
}

/**
 * The bills of a meter, month by month.
 * @param tariff the tariff
 * @param meter the meter
 * @param zone IANA name
 * @returns months in time order
 */
export function slowBills(tariff: Tariff, meter: MadeMeter, zone: string): SlowMonth[] {
  return new Clerk(tariff, new SlowMeter(tariff, meter, zone)).months();
}

interface Priced {
  quantity: number;
  amount: number;
}

interface MonthAt {
  month: string;
  readings: Reading[];
  c: number;
  lines: SlowMonth['lines'];
}

class Clerk {
  readonly #tariff: Tariff;
  readonly #meter: SlowMeter;
  readonly #decimals: number | null;
  /** own quantities by clause and window, then by month */
  readonly #own = new Map<string, Map<string, number>>();

  constructor(tariff: Tariff, meter: SlowMeter) {
    this.#tariff = tariff;
    this.#meter = meter;
    this.#decimals = tariff.decimals === undefined ? 2 : tariff.decimals;
  }

  months(): SlowMonth[] {
    const names = [...new Set(this.#meter.readings.map(({ month }) => month))];
    return names.map((month) => this.#month(month));
  }

  #month(month: string): SlowMonth {
    const readings = this.#meter.readings.filter((reading) => reading.month === month);
    const coverage = this.#meter.coverage(month);
    const lines: SlowMonth['lines'] = [];
    const clauses = this.#tariff.clauses ?? [];
    for (const clause of clauses) {
      const holds = clause.months?.includes(Number(month.slice(5))) ?? true;
      const { quantity, amount } = this.#clause(clause, { month, readings, c: coverage, lines });
      const rounded = slowRound(amount, this.#decimals);
      lines.push({ clause: clause.name, quantity: holds ? quantity : 0, amount: holds ? rounded : 0 });
    }
    const add = (list: SlowMonth['lines']): number => list.reduce((sum, { amount }) => sum + amount, 0);
    const taxable = add(lines.filter((_, k) => clauses[k]!.taxed !== false));
    const tax = slowRound(((this.#tariff.taxPct ?? 0) / 100) * taxable, this.#decimals);
    return { month, coverage, lines, tax, total: add(lines) + tax };
  }

  #clause(clause: Clause, at: MonthAt): Priced {
    const { windows } = clause;
    const readings = at.readings.filter((r) => windows?.some((name) => this.#meter.inWindow(r, name)) ?? true);
    switch (clause.kind) {
      case 'fixed':
        return { quantity: at.c, amount: clause.amountPerMonth * at.c };
      case 'energy':
        return this.#energy(clause, readings, at.c);
      case 'energyByFactor':
        return this.#energyByFactor(clause, readings);
      case 'kvarhBeyondRatio':
        return this.#kvarh(clause, readings, at.readings);
      case 'kvarBeyondRatio':
        return this.#kvar(clause, readings, at);
      case 'demand':
        return this.#demand(clause, readings, at);
      case 'contractedDemand':
        return this.#contracted(clause, readings, at.c);
      case 'percent': {
        const base = at.lines.filter((line) => clause.applies === 'all' || clause.applies.includes(line.clause));
        const pct = slowPct(clause.scale, this.#meter.factor(readings));
        return { quantity: pct, amount: (pct / 100) * base.reduce((sum, { amount }) => sum + amount, 0) };
      }
      case 'formula': {
        const amount = slowFormula(clause.expression, (name) => this.#named(name, clause, readings, at));
        return { quantity: amount, amount };
      }
    }
  }

  #priced(clause: EnergyClause | DemandClause, readings: Reading[]) {
    if (clause.prices === undefined) return [{ name: '', price: clause.pricePerUnit ?? 0, readings }];
    return Object.entries(clause.prices).map(([name, price]) => ({
      name,
      price,
      readings: readings.filter((reading) => this.#meter.inWindow(reading, name)),
    }));
  }

  #energy(clause: EnergyClause, readings: Reading[], c: number): Priced {
    const parts = this.#priced(clause, readings).flatMap((part) =>
      this.#meter.periods(clause.per ?? 'month', part.readings).map((period) => {
        const { kwh, lagging, leading } = this.#meter.energies(period);
        const reactive = slowReactive(clause.reactive ?? 'lagging', lagging, leading);
        const energy = clause.of === 'kVAh' ? Math.sqrt(kwh * kwh + reactive * reactive) : kwh;
        return { energy, amount: clause.blocks ? inBlocks(energy, clause.blocks, c) : energy * part.price };
      }),
    );
    return {
      quantity: parts.reduce((sum, { energy }) => sum + energy, 0),
      amount: parts.reduce((sum, { amount }) => sum + amount, 0),
    };
  }

  #energyByFactor(clause: EnergyByFactorClause, readings: Reading[]): Priced {
    let quantity = 0;
    for (const period of this.#meter.periods(clause.per ?? 'month', readings)) {
      const { kwh, lagging, leading } = this.#meter.energies(period);
      const reactive = slowReactive(clause.reactive ?? 'lagging', lagging, leading);
      const factor = kwh > 0 ? kwh / Math.sqrt(kwh * kwh + reactive * reactive) : null;
      quantity += (kwh * slowPct(clause.scale, factor)) / 100;
    }
    return { quantity, amount: quantity * clause.pricePerUnit };
  }

  #kvarh(clause: KvarhBeyondRatioClause, own: Reading[], month: Reading[]): Priced {
    const parts = clause.byWindow
      ? clause.windows!.map((name) => month.filter((reading) => this.#meter.inWindow(reading, name)))
      : [own];
    const priced: Priced = { quantity: 0, amount: 0 };
    for (const period of parts.flatMap((part) => this.#meter.periods(clause.per ?? 'month', part))) {
      const { kwh, lagging, leading } = this.#meter.energies(period);
      const kvarh = slowReactive(clause.reactive ?? 'lagging', lagging, leading);
      const { quantity, amount } = excess(clause, kvarh, kwh);
      priced.quantity += quantity;
      priced.amount += amount;
    }
    return priced;
  }

  #kvar(clause: KvarBeyondRatioClause, readings: Reading[], at: MonthAt): Priced {
    const quantity = this.#billed(clause, '', at, () =>
      this.#meter.periods(clause.per ?? 'month', readings).map((period) => {
        const { maxKw, maxKvar, kvarAtMaxKw } = this.#meter.maxima(period, clause.reactive ?? 'lagging');
        return Math.max((clause.at === 'maxKw' ? kvarAtMaxKw : maxKvar) - clause.ratio * maxKw, 0);
      }),
    );
    return { quantity, amount: quantity * clause.pricePerUnit * at.c };
  }

  #demand(clause: DemandClause, readings: Reading[], at: MonthAt): Priced {
    const formed = (period: Reading[]): number => {
      const { maxKw, maxKva } = this.#meter.maxima(period, 'lagging');
      const bases = { kW: maxKw, kVA: maxKva, kWOrKvaShare: Math.max(maxKw, (clause.kvaShare ?? 0) * maxKva) };
      const pct = clause.scale === undefined ? 0 : slowPct(clause.scale, this.#meter.factor(period));
      return bases[clause.basis] * (1 + pct / 100);
    };
    const parts = this.#priced(clause, readings).map(({ name, price, readings: own }) => {
      const periods = this.#meter.periods(clause.per ?? 'month', own);
      const billed = this.#billed(clause, name, at, () => periods.map(formed));
      return { billed, amount: billed * price * at.c };
    });
    return {
      quantity: Math.max(0, ...parts.map(({ billed }) => billed)),
      amount: parts.reduce((sum, { amount }) => sum + amount, 0),
    };
  }

  // three stretches of the demand: under the contract's floor, up to the tolerance, beyond it
  #contracted(clause: ContractedDemandClause, readings: Reading[], c: number): Priced {
    const { maxKw, maxKva } = this.#meter.maxima(readings, 'lagging');
    const bases = { kW: maxKw, kVA: maxKva, kWOrKvaShare: Math.max(maxKw, (clause.kvaShare ?? 0) * maxKva) };
    const own = wholeUnits(clause, bases[clause.basis]);
    const floor = (clause.contracted * (clause.leastPct ?? 100)) / 100;
    const top = clause.contracted + (clause.contracted * (clause.tolerancePct ?? 0)) / 100;
    if (own <= floor) return { quantity: floor, amount: floor * clause.pricePerUnit * c };
    if (own <= top) return { quantity: own, amount: own * clause.pricePerUnit * c };
    const atPrice = top * clause.pricePerUnit;
    return { quantity: own, amount: (atPrice + (own - top) * clause.overrunPricePerUnit) * c };
  }

  #billed(clause: Clause & BilledQuantity, part: string, at: MonthAt, formed: () => number[]): number {
    const key = `${clause.name}/${part}`;
    const memory = this.#own.get(key) ?? new Map<string, number>();
    this.#own.set(key, memory);
    const ratchet = ratchetOf(clause, memory, at.month);
    const owns = formed().map((quantity) => wholeUnits(clause, quantity));
    memory.set(at.month, Math.max(0, ...owns));
    return owns.reduce((sum, own) => sum + Math.max(own, clause.minimum ?? 0, ratchet), 0);
  }

  #named(name: string, clause: Clause, own: Reading[], at: MonthAt): number {
    const [quantity, ...rest] = name.split('.');
    const window = rest.join('.');
    const readings = window === '' ? own : at.readings.filter((reading) => this.#meter.inWindow(reading, window));
    const energies = this.#meter.energies(readings);
    const values: Record<string, number> = {
      ...this.#meter.maxima(readings, clause.reactive ?? 'lagging'),
      activeKwh: energies.kwh,
      laggingKvarh: energies.lagging,
      leadingKvarh: energies.leading,
      powerFactor: this.#meter.factor(readings) ?? 1,
      hours: readings.length * this.#meter.hours(),
      days: new Set(readings.map(({ date }) => date)).size,
      coverage: at.c,
      month: Number(at.month.slice(5)),
      billSoFar: at.lines.reduce((sum, { amount }) => sum + amount, 0),
    };
    return values[quantity!]!;
  }
}

function inBlocks(energy: number, blocks: { upTo: number | null; pricePerUnit: number }[], c: number): number {
  let left = energy;
  let begin = 0;
  let amount = 0;
  for (const { upTo, pricePerUnit } of blocks) {
    const taken = Math.min(left, upTo === null ? Infinity : (upTo - begin) * c);
    amount += taken * pricePerUnit;
    left -= taken;
    begin = upTo ?? begin;
  }
  return amount;
}

function excess(clause: KvarhBeyondRatioClause, kvarh: number, kwh: number): Priced {
  const tiers = clause.tiers ?? [{ aboveRatio: clause.freeRatio!, pricePerUnit: clause.pricePerUnit! }];
  const over = (ratio: number): number => Math.max(kvarh - ratio * kwh, 0);
  const quantity = kvarh - tiers[0]!.aboveRatio * kwh;
  if (!(quantity > 1e-9)) return { quantity: 0, amount: 0 };
  if (clause.cumulative === false) {
    const passed = tiers.filter(({ aboveRatio }) => over(aboveRatio) > 1e-9);
    return { quantity, amount: quantity * passed[passed.length - 1]!.pricePerUnit };
  }
  const slices = tiers.map(({ aboveRatio }, k) => {
    const next = tiers[k + 1];
    return over(aboveRatio) - (next === undefined ? 0 : over(next.aboveRatio));
  });
  return { quantity, amount: slices.reduce((sum, slice, k) => sum + slice * tiers[k]!.pricePerUnit, 0) };
}

function ratchetOf({ ratchet }: BilledQuantity, memory: Map<string, number>, month: string): number {
  if (ratchet === undefined) return 0;
  const count = (name: string): number => Number(name.slice(0, 4)) * 12 + Number(name.slice(5));
  const remembered = [...memory].filter(
    ([name]) => count(month) - count(name) <= ratchet.months && (ratchet.of?.includes(Number(name.slice(5))) ?? true),
  );
  return (ratchet.pct / 100) * Math.max(0, ...remembered.map(([, own]) => own));
}

function wholeUnits(rule: BilledQuantity, quantity: number): number {
  const whole = Math.round(quantity);
  switch (rule.wholeUnits) {
    case undefined:
      return quantity;
    case 'up':
      return Math.abs(quantity - whole) <= 1e-9 ? whole : Math.ceil(quantity);
    case 'down':
      return Math.abs(quantity - whole) <= 1e-9 ? whole : Math.floor(quantity);
    case 'nearest':
      return Math.floor(quantity + 0.5 + 1e-9);
  }
}
