import type { StageGroup } from '../layout/bank.js';
import { ratedA } from '../layout/stage.js';
import type { Flow } from '../network/bus-flow.js';
import type { NetworkModel } from '../network/network-model.js';
import { branchRatio, stageAdmittance, stageBranch } from '../network/stage-admittance.js';
import { NAMEPLATE, type ToleranceFactors } from '../network/tolerance-factors.js';
import type { Topology } from '../network/topology.js';
import { BASELINE_SHARE, type Duty, DutyRow, NEAR_RATIO, ratioVerdict } from './duty-row.js';
import { CAPACITOR_RULES, type CapacitorRules, type RuleSet, type Verdict } from './rules.js';
import type { DutyVoltages } from './stage-duties.js';

const SQRT3 = Math.sqrt(3);

/** What one of the network's capacitors carries. */
interface Carried {
  /** rms, line to line [V] */
  voltage: number;
  /** all orders at their crests together [V] */
  crest: number;
  /** rms [A] */
  current: number;
  /** √3·Σ U_h·I_h [kvar] */
  power: number;
}

type Quantity = keyof Carried;

const QUANTITIES: readonly Quantity[] = ['voltage', 'crest', 'current', 'power'];
const UNITS: Record<Quantity, string> = { voltage: 'V', crest: 'V', current: 'A', power: 'kvar' };
const NAMES: Record<Quantity, string> = {
  voltage: 'network capacitor voltage',
  crest: 'network capacitor voltage, crest',
  current: 'network capacitor current',
  power: 'network capacitor reactive power',
};

/** One set of capacitors at one end of its tolerance. */
interface Standing {
  /** |y| at the orders present [S] */
  siemens: Float64Array;
  capacitiveOhm: number;
  /** fundamental voltage on the capacitor at the highest bus voltage, line to line [V] */
  highestV: number;
  /** fundamental current at the highest bus voltage [A] */
  fundamentalA: number;
  limits: Record<Quantity, number | null>;
}

/**
 * Duties of the capacitors that stand in the network apart from the bank: a bank moves the resonance they are part of, and
 * may overload them though it carries little itself. Judged like the limits of the network: what they carry with the bank
 * out is not the bank's doing.
 */
export class NetworkCapacitorDuties {
  readonly #model: NetworkModel;
  readonly #known: boolean;
  readonly #capacitors: Topology['capacitors'];
  /** [capacitors][network], null where they are out */
  readonly #standings: (Standing | null)[][];
  /** the same with the bank out, [capacitors][network] */
  readonly #without: Carried[][];
  readonly #rows: Record<Quantity, DutyRow>[];
  /** exceeded somewhere, and by no more than without the bank */
  exceededAlready = false;

  /**
   * @param model the network without the bank
   * @param basis rule set and voltages
   * @param known false where loads or background are unknown: then nothing is judged clear
   */
  constructor(model: NetworkModel, basis: { rules: RuleSet; voltages: DutyVoltages }, known: boolean) {
    this.#model = model;
    this.#known = known;
    this.#capacitors = model.nodal?.topology.capacitors ?? [];
    const rules = CAPACITOR_RULES[basis.rules];
    this.#standings = this.#capacitors.map(({ group }, c) => {
      const made = new Map<string, Standing>();
      return model.corners.networks.map(({ state }) => {
        if (state === null || state.capacitorsIn[c] === 0) return null;
        const factors = state.tolerance ?? NAMEPLATE;
        const key = `${factors.capacitanceFactor} ${factors.inductanceFactor}`;
        const standing = made.get(key) ?? standingOf(model, group, { factors, rules, voltages: basis.voltages });
        made.set(key, standing);
        return standing;
      });
    });
    this.#without = this.#capacitors.map(() => []);
    this.#rows = this.#capacitors.map(() => rowsOf(rules.source));
  }

  /** @param flow the next flow; level 0 first */
  take(flow: Flow): void {
    for (let c = 0; c < this.#capacitors.length; c++) {
      const standing = this.#standings[c]![flow.corner.network]!;
      if (standing === null) continue;
      if (flow.level === 0) this.#without[c]![flow.corner.network] ??= this.#carried(c, standing, flow);
      else this.#takeLevel(c, standing, flow);
    }
  }

  #takeLevel(c: number, standing: Standing, flow: Flow): void {
    const without = this.#without[c]![flow.corner.network]!;
    const carried = this.#carried(c, standing, flow);
    for (const quantity of QUANTITIES) {
      const limit = standing.limits[quantity];
      if (limit === null) continue;
      const value = carried[quantity];
      const row = this.#rows[c]![quantity];
      const byTheBank = value - without[quantity] > BASELINE_SHARE * limit;
      if (!row.counts(value / limit, this.#verdict(value / limit, row.head.nearRatio, byTheBank))) continue;
      const bus = this.#model.buses[this.#capacitors[c]!.bus]!;
      row.keep(value, limit, { levelKvar: flow.levelKvar, corner: flow.corner.corner, orderH: null, bus });
    }
  }

  #verdict(ratio: number, nearRatio: number, byTheBank: boolean): Verdict {
    const verdict = ratioVerdict(ratio, nearRatio);
    if (byTheBank || verdict === 'clear') return verdict;
    if (verdict === 'watch') return 'clear';
    this.exceededAlready = true;
    return 'watch';
  }

  #carried(c: number, { siemens, capacitiveOhm, highestV, fundamentalA }: Standing, flow: Flow): Carried {
    const { voltageV } = flow.buses[this.#capacitors[c]!.bus]!;
    let voltageSquare = highestV * highestV;
    let voltageSum = highestV;
    let currentSquare = fundamentalA * fundamentalA;
    let powerVa = highestV * fundamentalA;
    for (let i = 0; i < voltageV.length; i++) {
      const currentA = voltageV[i]! * siemens[i]!;
      const harmonicV = (SQRT3 * currentA * capacitiveOhm) / flow.ordersH[i]!;
      voltageSquare += harmonicV * harmonicV;
      voltageSum += harmonicV;
      currentSquare += currentA * currentA;
      powerVa += harmonicV * currentA;
    }
    return {
      voltage: Math.sqrt(voltageSquare),
      crest: Math.SQRT2 * voltageSum,
      current: Math.sqrt(currentSquare),
      power: (SQRT3 * powerVa) / 1000,
    };
  }

  /** @returns the rows; with unknown loads what was found within limits is not judged */
  duties(): Duty[] {
    return this.#rows
      .flatMap((rows, c) =>
        QUANTITIES.flatMap((quantity) => {
          const duty = rows[quantity].duty();
          return duty === null ? [] : [{ ...duty, capacitors: this.#capacitors[c]!.name }];
        }),
      )
      .map((duty) => (this.#known || duty.verdict !== 'clear' ? duty : { ...duty, verdict: null }));
  }
}

function rowsOf(source: string): Record<Quantity, DutyRow> {
  const row = (quantity: Quantity): DutyRow => {
    const nearRatio = UNITS[quantity] === 'V' ? NEAR_RATIO.voltage : NEAR_RATIO.other;
    return new DutyRow({ name: NAMES[quantity], group: null, unit: UNITS[quantity], source, nearRatio });
  };
  return { voltage: row('voltage'), crest: row('crest'), current: row('current'), power: row('power') };
}

function standingOf(
  model: NetworkModel,
  group: StageGroup,
  { factors, rules, voltages }: { factors: ToleranceFactors; rules: CapacitorRules; voltages: DutyVoltages },
): Standing {
  const branch = stageBranch(group, factors, model.corners.networks[0]!.path.resistanceExponent);
  const { re, im } = stageAdmittance(branch, model.excitation.ordersH);
  const leftShare = 1 - branchRatio(branch);
  const growth = rules.currentGrowsWithCapacitance ? factors.capacitanceFactor : 1;
  return {
    siemens: re.map((g, i) => Math.sqrt(g * g + im[i]! ** 2)),
    capacitiveOhm: branch.capacitiveOhm,
    highestV: voltages.highestV / leftShare,
    fundamentalA: voltages.highestV / SQRT3 / (branch.capacitiveOhm * leftShare),
    limits: {
      voltage: rules.highestVoltageRatio * group.ratedV,
      crest: rules.crestVoltageRatio === null ? null : rules.crestVoltageRatio * Math.SQRT2 * group.ratedV,
      current: rules.currentRatio * ratedA(group) * growth,
      power: rules.reactivePowerRatio === null ? null : rules.reactivePowerRatio * group.ratedKvar,
    },
  };
}
