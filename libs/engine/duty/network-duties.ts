import type { BusFlow, Flow } from '../network/bus-flow.js';
import type { NetworkModel } from '../network/network-model.js';
import { type CurrentLimits, chosenCurrentLimits } from './current-limits.js';
import { BASELINE_SHARE, type Duty, DutyRow, NEAR_RATIO, type Place, ratioVerdict } from './duty-row.js';
import { type LimitChoice, limitChoice } from './limit-editions.js';
import type { RuleSet } from './rules.js';
import { chosenVoltageLimits, type VoltageLimits } from './voltage-limits.js';

/** A primary is taken for medium voltage: no edition is milder there than at low voltage. */
const MEDIUM_V = 10_000;

/** The same quantities with the bank out, per network. */
interface Baseline {
  /** per bus */
  distortionPct: number[];
  currentPct: number;
  /** per bus and order */
  voltagePct: Float64Array[];
  primary: { distortionPct: number; voltagePct: Float64Array } | null;
  sourcePct: Float64Array;
}

interface VoltageRows {
  distortion: DutyRow;
  voltage: DutyRow;
}

/** The orders present that have a limit, and the limit of each [%]; one length. */
interface JudgedOrders {
  places: Int32Array;
  limitPct: Float64Array;
}

/** Limits of the network at the bus. */
export interface NetworkLimits {
  voltage: VoltageLimits<number | null>;
  /** at a transformers' primary, whose voltage is not stated: the row from 1 to 69 kV where the edition has one */
  primary: VoltageLimits<number | null>;
  /** null where the edition has no current limits or no load current is known */
  current: CurrentLimits<number | null> | null;
}

/**
 * The limits that apply at the bus; I_sc/I_L is taken at the least fault level.
 * @param basis rules, edition, bus voltage, class, least fault level [MVA] and I_L [A]
 * @returns limits with their editions
 * @source ieee-519-2022, iec-61000-2-4
 */
export function networkLimits(basis: {
  rules: RuleSet;
  nominalV: number;
  emcClass: 1 | 2 | 3;
  limits?: LimitChoice;
  shortCircuitMinMva: number;
  loadA: number;
}): NetworkLimits {
  const shortCircuitA = (basis.shortCircuitMinMva * 1e6) / (Math.sqrt(3) * basis.nominalV);
  const choice = basis.limits ?? limitChoice(basis.rules, undefined);
  return {
    voltage: chosenVoltageLimits(basis.nominalV, basis.emcClass, choice),
    primary: chosenVoltageLimits(Math.max(basis.nominalV, MEDIUM_V), basis.emcClass, choice),
    current: basis.loadA > 0 ? chosenCurrentLimits(shortCircuitA / basis.loadA, choice) : null,
  };
}

/** Collects the network's duties over levels above 0; level 0 is the baseline of its own network. */
export class NetworkDuties {
  readonly #model: NetworkModel;
  readonly #limits: NetworkLimits;
  readonly #known: boolean;
  readonly #baselines: Baseline[] = [];
  readonly #judged: Record<'voltage' | 'primary' | 'current', JudgedOrders>;
  readonly #rows: Record<'currentDistortion' | 'current', DutyRow> & { buses: VoltageRows; primary: VoltageRows };
  /** exceeded somewhere, and by no more than without the bank */
  exceededAlready = false;

  /**
   * @param model the network without the bank
   * @param limits limits at the bus
   * @param known false where loads or background are unknown: then nothing is judged clear
   */
  constructor(model: NetworkModel, limits: NetworkLimits, known: boolean) {
    this.#model = model;
    this.#limits = limits;
    this.#known = known;
    const head = (name: string, source: string): DutyRow =>
      new DutyRow({ name, group: null, unit: '%', source, nearRatio: NEAR_RATIO.other });
    const currentSource = limits.current?.source ?? '';
    const { ordersH } = model.excitation;
    this.#judged = {
      voltage: judgedOrders(ordersH, limits.voltage),
      primary: judgedOrders(ordersH, limits.primary),
      current: judgedOrders(ordersH, limits.current),
    };
    this.#rows = {
      buses: {
        distortion: head('voltage distortion', limits.voltage.source),
        voltage: head('harmonic voltage', limits.voltage.source),
      },
      primary: {
        distortion: head('voltage distortion at the primary', limits.primary.source),
        voltage: head('harmonic voltage at the primary', limits.primary.source),
      },
      currentDistortion: head('current distortion', currentSource),
      current: head('harmonic current', currentSource),
    };
  }

  /** @param flow the next flow; level 0 first */
  take(flow: Flow): void {
    if (flow.level === 0) this.#takeBaseline(flow);
    else this.#takeLevel(flow);
  }

  #takeBaseline(flow: Flow): void {
    if (this.#baselines[flow.corner.network] !== undefined) return;
    this.#baselines[flow.corner.network] = {
      distortionPct: flow.buses.map((bus) => bus.voltageDistortionPct),
      currentPct: flow.currentDistortionPct,
      voltagePct: flow.buses.map((bus) => bus.voltageV.map((v) => this.#voltagePct(v))),
      primary: flow.primary && {
        distortionPct: flow.primary.voltageDistortionPct,
        voltagePct: flow.primary.voltageV.map((v) => this.#voltagePct(v)),
      },
      sourcePct: flow.sourceA.map((a) => this.#sourcePct(a)),
    };
  }

  #takeLevel(flow: Flow): void {
    const baseline = this.#baselines[flow.corner.network]!;
    // The name of the bus is worth saying only where there are several.
    const buses = this.#model.buses.length === 1 ? null : this.#model.buses;
    for (let bus = 0; bus < flow.buses.length; bus++) {
      const without = { distortionPct: baseline.distortionPct[bus]!, voltagePct: baseline.voltagePct[bus]! };
      this.#takeVoltages(flow, flow.buses[bus]!, { without, point: 'voltage', bus: buses?.[bus] });
    }
    if (flow.primary !== null) {
      this.#takeVoltages(flow, flow.primary, { without: baseline.primary!, point: 'primary', bus: 'primary' });
    }
    this.#takeCurrents(flow, baseline);
  }

  #takeVoltages(
    flow: Flow,
    { voltageV, voltageDistortionPct }: BusFlow,
    {
      without,
      point,
      bus,
    }: { without: NonNullable<Baseline['primary']>; point: 'voltage' | 'primary'; bus: string | undefined },
  ): void {
    const rows = point === 'voltage' ? this.#rows.buses : this.#rows.primary;
    const { distortionPct } = this.#limits[point];
    if (distortionPct === null) rows.distortion.takeUnjudged(voltageDistortionPct, placeOf(flow, null, bus));
    else if (this.#isWorst(rows.distortion, voltageDistortionPct, distortionPct, without.distortionPct)) {
      rows.distortion.keep(voltageDistortionPct, distortionPct, placeOf(flow, null, bus));
    }
    const { places, limitPct } = this.#judged[point];
    for (let k = 0; k < places.length; k++) {
      const i = places[k]!;
      const value = this.#voltagePct(voltageV[i]!);
      const limit = limitPct[k]!;
      if (!this.#isWorst(rows.voltage, value, limit, without.voltagePct[i]!)) continue;
      rows.voltage.keep(value, limit, placeOf(flow, flow.ordersH[i]!, bus));
    }
  }

  #takeCurrents(flow: Flow, baseline: Baseline): void {
    const { current } = this.#limits;
    if (current === null || flow.ordersH.length === 0) return;
    const { places, limitPct } = this.#judged.current;
    for (let k = 0; k < places.length; k++) {
      const i = places[k]!;
      const value = this.#sourcePct(flow.sourceA[i]!);
      const limit = limitPct[k]!;
      if (!this.#isWorst(this.#rows.current, value, limit, baseline.sourcePct[i]!)) continue;
      this.#rows.current.keep(value, limit, placeOf(flow, flow.ordersH[i]!));
    }
    const { totalPct } = current;
    const total = flow.currentDistortionPct;
    const row = this.#rows.currentDistortion;
    if (totalPct === null) row.takeUnjudged(total, placeOf(flow, null));
    else if (this.#isWorst(row, total, totalPct, baseline.currentPct)) row.keep(total, totalPct, placeOf(flow, null));
  }

  #isWorst(row: DutyRow, value: number, limit: number, without: number): boolean {
    const ratio = value / limit;
    const verdict = ratioVerdict(ratio, NEAR_RATIO.other);
    if (verdict !== 'avoid' || value - without > BASELINE_SHARE * limit) return row.counts(ratio, verdict);
    this.exceededAlready = true;
    return row.counts(ratio, 'watch');
  }

  #voltagePct(phaseV: number): number {
    return (100 * phaseV * Math.sqrt(3)) / this.#model.nominalV;
  }

  #sourcePct(phaseA: number): number {
    return this.#model.loadA > 0 ? (100 * phaseA) / this.#model.loadA : 0;
  }

  /** @returns the rows; with unknown loads what was found within limits is not judged */
  duties(): Duty[] {
    const { buses, primary, currentDistortion, current } = this.#rows;
    return [...Object.values(buses), ...Object.values(primary), currentDistortion, current]
      .flatMap((row) => row.duty() ?? [])
      .map((duty) => (this.#known || duty.verdict !== 'clear' ? duty : { ...duty, verdict: null }));
  }
}

function judgedOrders(ordersH: Float64Array, limits: { orderPct(orderH: number): number | null } | null): JudgedOrders {
  const limitPct = Array.from(ordersH, (orderH) => limits?.orderPct(orderH) ?? null);
  const places = [...limitPct.keys()].filter((i) => limitPct[i] !== null);
  return { places: Int32Array.from(places), limitPct: Float64Array.from(places, (i) => limitPct[i]!) };
}

function placeOf(flow: Flow, orderH: number | null, bus?: string): Place {
  const place = { levelKvar: flow.levelKvar, corner: flow.corner.corner, orderH };
  return bus === undefined ? place : { ...place, bus };
}
