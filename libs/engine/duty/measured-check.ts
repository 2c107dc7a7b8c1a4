import type { Bank } from '../layout/bank.js';
import type { Level } from '../layout/levels.js';
import type { Flow } from '../network/bus-flow.js';
import { bankModel, eachFlow } from '../network/flow.js';
import type { MeasuredDistortion } from '../network/loads.js';
import type { NetworkModel } from '../network/network-model.js';

/** One order as an instrument read it beside the model with the same kvar connected. */
export interface MeasuredRow {
  quantity: 'voltage' | 'current';
  orderH: number;
  /** "%" of nominal, or "A" per phase */
  unit: string;
  measured: number;
  /** in the nominal case; 0 where the model has nothing at this order */
  computed: number;
  /** least and greatest over all corners */
  low: number;
  high: number;
  /** measured less computed, % of computed; null where the model has nothing */
  differencePct: number | null;
  standing: 'within' | 'above' | 'below';
}

/** A measurement beside the model. */
export interface MeasuredCheck {
  bus: string;
  /** "fit": the loads' currents were scaled to meet it, and agreement is no check */
  use: 'check' | 'fit';
  /** the level that was compared; null where the bank has none within half a kvar */
  levelKvar: number | null;
  rows: MeasuredRow[];
}

/** A level this near to the one that was in counts as the same [kvar]. */
const LEVEL_REACH_KVAR = 0.5;
/** Beyond every corner by more than this share of the range's end, or of the least that is read, a reading disagrees. */
const READING_SHARE = 0.1;
/** Readings below this are noise [% of nominal, % of the greatest current read]. */
const LEAST_READ = { voltagePct: 0.1, currentSharePct: 1 } as const;

/**
 * Holds a measurement against the model with the same kvar connected: nominal case and the range of all corners. It is
 * never added to the sources.
 * @param model the network without the bank
 * @param bank the bank
 * @param levels its levels
 * @param measured what was read
 * @returns one row an order, voltages first
 * @source method-measured
 */
export function measuredCheck(
  model: NetworkModel,
  bank: Bank,
  levels: Level[],
  measured: MeasuredDistortion,
): MeasuredCheck {
  const found = measured.place === undefined ? model.bankBus : model.buses.indexOf(measured.place);
  const bus = found < 0 ? model.bankBus : found;
  const level = levels.find(({ levelKvar }) => Math.abs(levelKvar - measured.bankKvar) <= LEVEL_REACH_KVAR);
  const check: MeasuredCheck = {
    bus: model.buses[bus]!,
    use: measured.use ?? 'check',
    levelKvar: level?.levelKvar ?? null,
    rows: [],
  };
  if (level === undefined) return check;
  const ranges = new Ranges(model, bus);
  eachFlow(model, bankModel(model, bank, [level]), (flow) => ranges.take(flow));
  const greatestA = Math.max(0, ...(measured.currentA ?? []).map(({ a }) => a));
  const leastA = (LEAST_READ.currentSharePct / 100) * greatestA;
  check.rows = [
    ...(measured.voltagePct ?? []).map(({ orderH, pct }) =>
      row(
        { quantity: 'voltage', unit: '%', orderH, measured: pct, least: LEAST_READ.voltagePct },
        ranges.voltage(orderH),
      ),
    ),
    ...(measured.currentA ?? []).map(({ orderH, a }) =>
      row({ quantity: 'current', unit: 'A', orderH, measured: a, least: leastA }, ranges.current(orderH)),
    ),
  ];
  return check;
}

interface Range {
  nominal: number;
  low: number;
  high: number;
}

function row(
  read: Pick<MeasuredRow, 'quantity' | 'unit' | 'orderH' | 'measured'> & { least: number },
  { nominal, low, high }: Range,
): MeasuredRow {
  const { least, ...head } = read;
  const slack = (end: number): number => Math.max(READING_SHARE * end, least);
  const standing = head.measured > high + slack(high) ? 'above' : head.measured < low - slack(low) ? 'below' : 'within';
  return {
    ...head,
    computed: nominal,
    low,
    high,
    differencePct: nominal > 0 ? (100 * (head.measured - nominal)) / nominal : null,
    standing,
  };
}

/** Voltage and supply current at every order present, over the flows that pass; the first is the nominal case. */
class Ranges {
  readonly #model: NetworkModel;
  readonly #bus: number;
  readonly #voltages: Range[] = [];
  readonly #currents: Range[] = [];

  constructor(model: NetworkModel, bus: number) {
    this.#model = model;
    this.#bus = bus;
  }

  take(flow: Flow): void {
    const phaseV = this.#model.nominalV / Math.sqrt(3);
    for (let i = 0; i < flow.ordersH.length; i++) {
      widen(this.#voltages, i, (100 * flow.buses[this.#bus]!.voltageV[i]!) / phaseV);
      widen(this.#currents, i, flow.sourceA[i]!);
    }
  }

  voltage(orderH: number): Range {
    return this.#at(this.#voltages, orderH);
  }

  current(orderH: number): Range {
    return this.#at(this.#currents, orderH);
  }

  #at(ranges: readonly Range[], orderH: number): Range {
    return ranges[this.#model.excitation.ordersH.indexOf(orderH)] ?? { nominal: 0, low: 0, high: 0 };
  }
}

function widen(ranges: Range[], i: number, value: number): void {
  const range = ranges[i];
  if (range === undefined) {
    ranges[i] = { nominal: value, low: value, high: value };
    return;
  }
  range.low = Math.min(range.low, value);
  range.high = Math.max(range.high, value);
}
