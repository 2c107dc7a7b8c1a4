import type { BusFlow, Flow } from '../network/bus-flow.js';
import type { NetworkModel } from '../network/network-model.js';
import { type CurrentLimits, chosenCurrentLimits } from './current-limits.js';
import { type Duty, DutyRow, NEAR_RATIO, type Place, ratioVerdict } from './duty-row.js';
import { type LimitChoice, limitChoice } from './limit-editions.js';
import type { RuleSet, Verdict } from './rules.js';
import { chosenVoltageLimits, type VoltageLimits } from './voltage-limits.js';

/** A limit exceeded without the bank already counts against the bank only beyond this share of the limit. */
const BASELINE_SHARE = 0.01;

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

/** Voltages at one point, beside the same without the bank and their limits. */
interface MetVoltages extends BusFlow {
  without: { distortionPct: number; voltagePct: Float64Array };
  limits: VoltageLimits<number | null>;
  rows: VoltageRows;
}

interface VoltageRows {
  distortion: DutyRow;
  voltage: DutyRow;
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
    const place: Place = { levelKvar: flow.levelKvar, corner: flow.corner.corner, orderH: null };
    for (const [bus, found] of flow.buses.entries()) {
      const without = { distortionPct: baseline.distortionPct[bus]!, voltagePct: baseline.voltagePct[bus]! };
      this.#takeVoltages(
        flow,
        { ...found, without, limits: this.#limits.voltage, rows: this.#rows.buses },
        this.#at(place, bus),
      );
    }
    if (flow.primary !== null) {
      const met = {
        ...flow.primary,
        without: baseline.primary!,
        limits: this.#limits.primary,
        rows: this.#rows.primary,
      };
      this.#takeVoltages(flow, met, { ...place, bus: 'primary' });
    }
    this.#takeCurrents(flow, baseline, place);
  }

  // The name of the bus is worth saying only where there are several.
  #at(place: Place, bus: number): Place {
    return this.#model.buses.length === 1 ? place : { ...place, bus: this.#model.buses[bus]! };
  }

  #takeVoltages({ ordersH }: Flow, met: MetVoltages, place: Place): void {
    const { voltageV, voltageDistortionPct, without, limits, rows } = met;
    this.#takeAgainst(rows.distortion, place, {
      value: voltageDistortionPct,
      limit: limits.distortionPct,
      without: without.distortionPct,
    });
    for (let i = 0; i < ordersH.length; i++) {
      const orderH = ordersH[i]!;
      const limit = limits.orderPct(orderH);
      if (limit === null) continue;
      const value = this.#voltagePct(voltageV[i]!);
      this.#takeAgainst(rows.voltage, { ...place, orderH }, { value, limit, without: without.voltagePct[i]! });
    }
  }

  #takeCurrents(flow: Flow, baseline: Baseline, place: Place): void {
    const { current } = this.#limits;
    if (current === null || flow.ordersH.length === 0) return;
    for (let i = 0; i < flow.ordersH.length; i++) {
      const orderH = flow.ordersH[i]!;
      const limit = current.orderPct(orderH);
      if (limit === null) continue;
      const value = this.#sourcePct(flow.sourceA[i]!);
      this.#takeAgainst(this.#rows.current, { ...place, orderH }, { value, limit, without: baseline.sourcePct[i]! });
    }
    this.#takeAgainst(this.#rows.currentDistortion, place, {
      value: flow.currentDistortionPct,
      limit: current.totalPct,
      without: baseline.currentPct,
    });
  }

  #takeAgainst(row: DutyRow, place: Place, met: { value: number; limit: number | null; without: number }): void {
    const { limit } = met;
    if (limit === null) row.takeUnjudged(met.value, place);
    else row.take(met.value, limit, place, (ratio) => this.#judge(ratio, { ...met, limit }));
  }

  #judge(ratio: number, met: { value: number; limit: number; without: number }): Verdict {
    const verdict = ratioVerdict(ratio, NEAR_RATIO.other);
    if (verdict !== 'avoid' || met.value - met.without > BASELINE_SHARE * met.limit) return verdict;
    this.exceededAlready = true;
    return 'watch';
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
