import type { Bank, StageGroup } from '../layout/bank.js';
import { ratedA } from '../layout/stage.js';
import type { Flow } from '../network/bus-flow.js';
import type { NetworkModel } from '../network/network-model.js';
import { branchRatio, type StageBranch, stageBranch } from '../network/stage-admittance.js';
import { type Duty, DutyRow, NEAR_RATIO, type Place, ratioVerdict } from './duty-row.js';
import { CAPACITOR_RULES, type CapacitorRules, type RuleSet } from './rules.js';

/** Voltages the duties of a stage are taken at [V]. */
export interface DutyVoltages {
  nominalV: number;
  highestV: number;
}

const SQRT3 = Math.sqrt(3);

/** The electrical state of one stage in one flow. */
interface StageState {
  /** fundamental voltage on the capacitor at the highest and at nominal bus voltage, line to line [V] */
  highestV: number;
  nominalV: number;
  /** fundamental current at the highest bus voltage [A] */
  fundamentalA: number;
  branch: StageBranch;
}

/** Collects the duties of one group's stages over every flow in which one of them is connected. */
export class StageDuties {
  readonly #group: StageGroup;
  readonly #index: number;
  readonly #rules: CapacitorRules;
  readonly #states: StageState[];
  readonly #rows: Record<'continuous' | 'highest' | 'crest' | 'current' | 'power' | 'reactor', DutyRow>;

  /**
   * @param model the network without the bank
   * @param bank the bank
   * @param index entry of `bank.groups`
   * @param basis rule set and voltages
   */
  constructor(model: NetworkModel, bank: Bank, index: number, basis: { rules: RuleSet; voltages: DutyVoltages }) {
    this.#group = bank.groups[index]!;
    this.#index = index;
    this.#rules = CAPACITOR_RULES[basis.rules];
    const exponent = model.corners.networks[0]!.path.resistanceExponent;
    this.#states = model.corners.factors.map((factors) => {
      const branch = stageBranch(this.#group, factors, exponent);
      const netOhm = branch.capacitiveOhm * (1 - branchRatio(branch));
      return {
        branch,
        highestV: basis.voltages.highestV / (1 - branchRatio(branch)),
        nominalV: basis.voltages.nominalV / (1 - branchRatio(branch)),
        fundamentalA: basis.voltages.highestV / SQRT3 / netOhm,
      };
    });
    const head = (name: string, unit: string, nearRatio: number): DutyRow =>
      new DutyRow({ name, group: index, unit, source: this.#rules.source, nearRatio });
    this.#rows = {
      continuous: head('capacitor voltage, continuous', 'V', NEAR_RATIO.voltage),
      highest: head('capacitor voltage, highest', 'V', NEAR_RATIO.voltage),
      crest: head('capacitor voltage, crest', 'V', NEAR_RATIO.voltage),
      current: head('capacitor current', 'A', NEAR_RATIO.other),
      power: head('capacitor reactive power', 'kvar', NEAR_RATIO.other),
      reactor: head('reactor current', 'A', NEAR_RATIO.other),
    };
  }

  /** @param flow the next flow; ignored unless a stage of the group is connected in it */
  take(flow: Flow): void {
    if (flow.connected[this.#index] === 0) return;
    const { highestV, nominalV, fundamentalA, branch } = this.#states[flow.corner.factors]!;
    const currents = flow.stageA[this.#index]!;
    const { ordersH } = flow;
    let voltageSquare = highestV * highestV;
    let voltageSum = highestV;
    let currentSquare = fundamentalA * fundamentalA;
    let powerVa = highestV * fundamentalA;
    for (let i = 0; i < currents.length; i++) {
      const harmonicV = (SQRT3 * currents[i]! * branch.capacitiveOhm) / ordersH[i]!;
      voltageSquare += harmonicV * harmonicV;
      voltageSum += harmonicV;
      currentSquare += currents[i]! * currents[i]!;
      powerVa += harmonicV * currents[i]!;
    }
    const { ratedV } = this.#group;
    const { continuousVoltageRatio, highestVoltageRatio, crestVoltageRatio } = this.#rules;
    if (continuousVoltageRatio !== null) {
      this.#takeInto(this.#rows.continuous, flow, nominalV, continuousVoltageRatio * ratedV);
    }
    this.#takeInto(this.#rows.highest, flow, Math.sqrt(voltageSquare), highestVoltageRatio * ratedV);
    if (crestVoltageRatio !== null) {
      this.#takeInto(this.#rows.crest, flow, Math.SQRT2 * voltageSum, crestVoltageRatio * Math.SQRT2 * ratedV);
    }
    this.#takeCurrents(flow, Math.sqrt(currentSquare), (SQRT3 * powerVa) / 1000);
  }

  #takeCurrents(flow: Flow, rmsA: number, powerKvar: number): void {
    const rules = this.#rules;
    const { ratedKvar, reactorPct, reactorMaxA } = this.#group;
    const growth = rules.currentGrowsWithCapacitance ? flow.corner.corner.capacitanceFactor : 1;
    this.#takeInto(this.#rows.current, flow, rmsA, rules.currentRatio * ratedA(this.#group) * growth);
    if (rules.reactivePowerRatio !== null) {
      this.#takeInto(this.#rows.power, flow, powerKvar, rules.reactivePowerRatio * ratedKvar);
    }
    if (reactorPct === 0) return;
    const { reactor } = this.#rows;
    if (reactorMaxA !== null) this.#takeInto(reactor, flow, rmsA, reactorMaxA);
    else if (reactor.isMost(rmsA)) reactor.takeUnjudged(rmsA, placeOf(flow));
  }

  #takeInto(row: DutyRow, flow: Flow, value: number, limit: number): void {
    const ratio = value / limit;
    if (row.counts(ratio, ratioVerdict(ratio, row.head.nearRatio))) row.keep(value, limit, placeOf(flow));
  }

  /** @returns the rows that were taken */
  duties(): Duty[] {
    return Object.values(this.#rows).flatMap((row) => row.duty() ?? []);
  }
}

function placeOf(flow: Flow): Place {
  return { levelKvar: flow.levelKvar, corner: flow.corner.corner, orderH: null };
}
