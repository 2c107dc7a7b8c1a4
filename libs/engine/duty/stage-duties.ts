import type { Bank, StageGroup } from '../layout/bank.js';
import { ratedA } from '../layout/stage.js';
import type { Flow } from '../network/bus-flow.js';
import type { NetworkModel } from '../network/network-model.js';
import { branchRatio, type StageBranch, stageBranch } from '../network/stage-admittance.js';
import { type Duty, DutyRow, NEAR_RATIO } from './duty-row.js';
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
    const state = this.#states[flow.corner.factors]!;
    const place = { levelKvar: flow.levelKvar, corner: flow.corner.corner, orderH: null };
    const currents = flow.stageA[this.#index]!;
    let voltageSquare = state.highestV ** 2;
    let voltageSum = state.highestV;
    let currentSquare = state.fundamentalA ** 2;
    let powerVa = state.highestV * state.fundamentalA;
    for (let i = 0; i < currents.length; i++) {
      const harmonicV = (SQRT3 * currents[i]! * state.branch.capacitiveOhm) / flow.ordersH[i]!;
      voltageSquare += harmonicV ** 2;
      voltageSum += harmonicV;
      currentSquare += currents[i]! ** 2;
      powerVa += harmonicV * currents[i]!;
    }
    this.#judge(flow, place, {
      nominalV: state.nominalV,
      rmsV: Math.sqrt(voltageSquare),
      crestV: Math.SQRT2 * voltageSum,
      rmsA: Math.sqrt(currentSquare),
      powerKvar: (SQRT3 * powerVa) / 1000,
    });
  }

  #judge(flow: Flow, place: Parameters<DutyRow['take']>[2], met: Record<string, number>): void {
    const rules = this.#rules;
    const { ratedV, ratedKvar, reactorPct, reactorMaxA } = this.#group;
    if (rules.continuousVoltageRatio !== null) {
      this.#rows.continuous.take(met.nominalV!, rules.continuousVoltageRatio * ratedV, place);
    }
    this.#rows.highest.take(met.rmsV!, rules.highestVoltageRatio * ratedV, place);
    if (rules.crestVoltageRatio !== null) {
      this.#rows.crest.take(met.crestV!, rules.crestVoltageRatio * Math.SQRT2 * ratedV, place);
    }
    const growth = rules.currentGrowsWithCapacitance ? flow.corner.corner.capacitanceFactor : 1;
    this.#rows.current.take(met.rmsA!, rules.currentRatio * ratedA(this.#group) * growth, place);
    if (rules.reactivePowerRatio !== null) {
      this.#rows.power.take(met.powerKvar!, rules.reactivePowerRatio * ratedKvar, place);
    }
    if (reactorPct === 0) return;
    if (reactorMaxA === null) this.#rows.reactor.takeUnjudged(met.rmsA!, place);
    else this.#rows.reactor.take(met.rmsA!, reactorMaxA, place);
  }

  /** @returns the rows that were taken */
  duties(): Duty[] {
    return Object.values(this.#rows).flatMap((row) => row.duty() ?? []);
  }
}
