import type { ReactiveBasis, Tariff } from '#libs/engine/index.js';
import type { MadeMeter } from './priced-meter.js';
import { slowRound } from './slow-scale.js';

/** One interval as a clerk would list it. */
export interface Reading {
  kw: number;
  lagging: number;
  leading: number;
  month: string;
  date: string;
  /** 1 Monday … 7 Sunday, 8 a holiday */
  kind: number;
  /** hours since local midnight by the clock */
  hour: number;
}

/** A tariff's ways of looking at lists of readings; local time is the run-time's own. */
export class SlowMeter {
  readonly #tariff: Tariff;
  readonly #meter: MadeMeter;
  readonly #clock: Intl.DateTimeFormat;
  /** every valid interval */
  readonly readings: Reading[];

  constructor(tariff: Tariff, meter: MadeMeter, zone: string) {
    this.#tariff = tariff;
    this.#meter = meter;
    this.#clock = new Intl.DateTimeFormat('en-GB', {
      timeZone: zone,
      hourCycle: 'h23',
      year: 'numeric',
      month: '2-digit',
      day: '2-digit',
      hour: '2-digit',
      minute: '2-digit',
      second: '2-digit',
    });
    this.readings = [...meter.span.beginS].map((beginS, index) => this.#reading(beginS, index));
  }

  #local(atS: number): { date: string; hour: number } {
    const part = Object.fromEntries(this.#clock.formatToParts(atS * 1000).map(({ type, value }) => [type, value]));
    const hour = (Number(part.hour) * 3600 + Number(part.minute) * 60 + Number(part.second)) / 3600;
    return { date: `${part.year}-${part.month}-${part.day}`, hour };
  }

  #reading(beginS: number, index: number): Reading {
    const { date, hour } = this.#local(beginS);
    const weekday = new Date(`${date}T12:00Z`).getUTCDay();
    const holiday = (this.#tariff.holidays ?? []).includes(date);
    const { columns } = this.#meter;
    return {
      kw: columns.activeKw[index]!,
      lagging: columns.laggingKvar[index]!,
      leading: columns.leadingKvar[index]!,
      month: date.slice(0, 7),
      date,
      kind: holiday ? 8 : weekday === 0 ? 7 : weekday,
      hour,
    };
  }

  // The first second that is in the month, by halving between two days that surround it.
  #monthBeginS(month: string): number {
    const about = Date.parse(`${month}-01T00:00Z`) / 1000;
    let before = about - 2 * 86_400;
    let after = about + 2 * 86_400;
    while (after - before > 1) {
      const middle = Math.floor((before + after) / 2);
      if (this.#local(middle).date < `${month}-01`) before = middle;
      else after = middle;
    }
    return after;
  }

  coverage(month: string): number {
    const [year, number] = month.split('-').map(Number);
    const next = number === 12 ? `${year! + 1}-01` : `${year}-${String(number! + 1).padStart(2, '0')}`;
    const beginS = this.#monthBeginS(month);
    const endS = this.#monthBeginS(next);
    const { span } = this.#meter;
    return (Math.min(endS, span.endS) - Math.max(beginS, span.firstS)) / (endS - beginS);
  }

  inWindow(reading: Reading, name: string): boolean {
    const window = this.#tariff.windows!.find((one) => one.name === name)!;
    const inMonth = window.months === undefined || window.months.includes(Number(reading.month.slice(5)));
    const onDay = window.days === undefined || window.days.includes(reading.kind);
    const within = ([a, b]: [number, number]): boolean =>
      a <= b ? reading.hour >= a && reading.hour < b : reading.hour >= a || reading.hour < b;
    return inMonth && onDay && (window.hours === undefined || window.hours.some(within));
  }

  hours(): number {
    return this.#meter.span.intervalS / 3600;
  }

  energies(readings: Reading[]): { kwh: number; lagging: number; leading: number } {
    const h = this.hours();
    return {
      kwh: readings.reduce((sum, { kw }) => sum + Math.max(kw, 0) * h, 0),
      lagging: readings.reduce((sum, { lagging }) => sum + lagging * h, 0),
      leading: readings.reduce((sum, { leading }) => sum + leading * h, 0),
    };
  }

  #blocks(readings: Reading[]): { kw: number; lagging: number; leading: number }[] {
    const blockHours = (this.#tariff.demandS ?? this.#meter.span.intervalS) / 3600;
    const mean = (list: Reading[], pick: (reading: Reading) => number): number =>
      list.reduce((sum, reading) => sum + pick(reading), 0) / list.length;
    return groupedBy(readings, ({ date, hour }) => `${date} ${Math.floor(hour / blockHours)}`).map((list) => ({
      kw: mean(list, ({ kw }) => kw),
      lagging: mean(list, ({ lagging }) => lagging),
      leading: mean(list, ({ leading }) => leading),
    }));
  }

  maxima(readings: Reading[], basis: ReactiveBasis) {
    const blocks = this.#blocks(readings);
    const highest = Math.max(...blocks.map(({ kw }) => kw), -Infinity);
    const first = blocks.find(({ kw }) => kw === highest) ?? { kw: 0, lagging: 0, leading: 0 };
    return {
      maxKw: Math.max(highest, 0),
      maxKva: Math.max(0, ...blocks.map(({ kw, lagging, leading }) => Math.hypot(kw, lagging - leading))),
      maxKvar: Math.max(0, ...blocks.map(({ lagging, leading }) => slowReactive(basis, lagging, leading))),
      kvarAtMaxKw: slowReactive(basis, first.lagging, first.leading),
    };
  }

  factor(readings: Reading[]): number | null {
    const { basis = 'energy', reactive = 'lagging', decimals = null } = this.#tariff.factor ?? {};
    let factor: number | null = null;
    if (basis === 'energy') {
      const { kwh, lagging, leading } = this.energies(readings);
      if (kwh > 0) factor = kwh / Math.sqrt(kwh ** 2 + slowReactive(reactive, lagging, leading) ** 2);
    } else {
      const { maxKw, maxKva, kvarAtMaxKw } = this.maxima(readings, reactive);
      if (maxKw > 0) factor = basis === 'maxima' ? maxKw / maxKva : maxKw / Math.sqrt(maxKw ** 2 + kvarAtMaxKw ** 2);
    }
    return factor === null ? null : slowRound(factor, decimals);
  }

  periods(per: 'month' | 'day' | 'hour' | 'interval', readings: Reading[]): Reading[][] {
    switch (per) {
      case 'month':
        return [readings];
      case 'day':
        return groupedBy(readings, ({ date }) => date);
      case 'hour':
        return groupedBy(readings, ({ date, hour }) => `${date} ${Math.floor(hour)}`);
      case 'interval':
        return readings.map((reading) => [reading]);
    }
  }
}

function groupedBy(readings: Reading[], key: (reading: Reading) => string): Reading[][] {
  const groups = new Map<string, Reading[]>();
  for (const reading of readings) groups.set(key(reading), [...(groups.get(key(reading)) ?? []), reading]);
  return [...groups.values()];
}

/** What counts of lagging and leading. */
export function slowReactive(basis: ReactiveBasis, lagging: number, leading: number): number {
  if (basis === 'lagging') return lagging;
  if (basis === 'leading') return leading;
  return basis === 'both' ? lagging + leading : Math.max(0, lagging - leading);
}
