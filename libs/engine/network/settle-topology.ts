import type { Bank, StageGroup, StageGroupInput } from '../layout/bank.js';
import { bankLevels } from '../layout/levels.js';
import { InputProblem, type Problem } from '../problem.js';
import { bankStates, stageKinds } from './stage-kinds.js';
import type { FurtherBank, NetworkInput, Topology } from './topology.js';

/** What a topology is settled with. */
export interface TopologyBasis {
  nominalV: number;
  frequencyHz: number;
  /** bus named by each transformer of the supply, in order */
  transformerBuses: readonly (string | undefined)[];
  /** where the meter stands; at the primary that is the point of coupling unless another is named */
  meteredAt?: 'bus' | 'primary';
  /** fills in a capacitor's defaults; the path is where it stands in the site file */
  group(input: StageGroupInput, path: string): StageGroup;
}

/** Generator resistance where none is stated: R″ = 0.15·x″, customary for low-voltage machines. */
const GENERATOR_R_OVER_X = 0.15;

/**
 * Resolves a network's names and fills in defaults.
 * @param input the site file's network part
 * @param basis voltage, transformers' buses
 * @returns the topology
 * @throws InputProblem naming every part that stands nowhere, twice, or without impedance
 * @source method-network
 */
export function settleTopology(input: NetworkInput, basis: TopologyBasis): Topology {
  const names = new Names(input.buses.map(({ name }) => name));
  if (input.buses.length === 0) throw new InputProblem(names.problems);
  const topology: Topology = {
    buses: input.buses.map(({ name }) => name),
    couplers: (input.couplers ?? []).map((coupler, i) => ({
      name: coupler.name ?? `coupler ${i + 1}`,
      ...names.ends(coupler.between, `network.couplers[${i}].between`),
      state: coupler.state,
    })),
    cables: (input.cables ?? []).map((cable, i) => ({
      name: cable.name ?? `cable ${i + 1}`,
      ...names.ends(cable.between, `network.cables[${i}].between`),
      rOhm: (cable.resistanceOhmPerKm * cable.lengthM) / 1000 / (cable.parallel ?? 1),
      xOhm: (cable.reactanceOhmPerKm * cable.lengthM) / 1000 / (cable.parallel ?? 1),
    })),
    generators: (input.generators ?? []).map((generator, i) => {
      const xOhm = ((generator.subtransientPct / 100) * basis.nominalV ** 2) / (generator.ratedKva * 1000);
      return {
        name: generator.name ?? `generator ${i + 1}`,
        bus: names.at(generator.bus, `network.generators[${i}].bus`),
        rOhm: (generator.rOverX ?? GENERATOR_R_OVER_X) * xOhm,
        xOhm,
        state: generator.state,
      };
    }),
    motorKw: names.perBus(input.motors ?? [], 'network.motors'),
    resistiveKw: names.perBus(input.resistive ?? [], 'network.resistive'),
    ...capacitorsOf(input, names, basis),
    transformerBus: basis.transformerBuses.map((bus, i) =>
      bus === undefined && input.buses.length === 1 ? 0 : names.at(bus, `supply.transformers[${i}].bus`),
    ),
    bankBus: input.bankBus === undefined ? 0 : names.at(input.bankBus, 'network.bankBus'),
    couplingPoint: couplingPoint(input, names, basis),
    transformerOut: input.transformerOut ?? false,
  };
  names.problems.push(...couplerProblems(topology), ...cableProblems(topology));
  if (names.problems.length > 0) throw new InputProblem(names.problems);
  return topology;
}

function capacitorsOf(input: NetworkInput, names: Names, basis: TopologyBasis): Pick<Topology, 'capacitors' | 'banks'> {
  const capacitors = (input.capacitors ?? []).map((capacitor, i) => ({
    name: capacitor.name ?? `capacitors ${i + 1}`,
    bus: names.at(capacitor.bus, `network.capacitors[${i}].bus`),
    group: basis.group(capacitor, `network.capacitors[${i}]`),
    switched: capacitor.switched ?? false,
  }));
  const banks: FurtherBank[] = [];
  for (const [i, further] of (input.banks ?? []).entries()) {
    const path = `network.banks[${i}]`;
    const name = further.name ?? `bank ${i + 1}`;
    const bus = names.at(further.bus, `${path}.bus`);
    const groups = further.stages.map((stage, g) => basis.group(stage, `${path}.stages[${g}]`));
    banks.push({ name, bus, firstEntry: capacitors.length, vectors: furtherStates(groups, basis.nominalV) });
    for (const [g, group] of groups.entries()) {
      const part = groups.length === 1 ? name : `${name}, group ${g + 1}`;
      capacitors.push({ name: part, bus, group, switched: false });
    }
  }
  return { capacitors, banks };
}

// What the network can tell apart of a further bank's levels.
function furtherStates(groups: StageGroup[], nominalV: number): Int32Array[] {
  const bank: Bank = { groups, interStageUh: 0, interStageGiven: false, ambientCategory: null };
  const vectors = bankLevels(bank, nominalV).flatMap((level) => level.vectors);
  const states = bankStates(stageKinds(bank), vectors).map(({ vector }) => vector);
  return [states[states.length - 1]!, ...states.slice(0, -1)];
}

function couplingPoint(input: NetworkInput, names: Names, basis: TopologyBasis): Topology['couplingPoint'] {
  const metered = basis.meteredAt === 'primary' && basis.transformerBuses.length > 0 ? 'primary' : undefined;
  const place = input.couplingPoint ?? metered ?? input.bankBus ?? input.buses[0]!.name;
  if (place !== 'primary') return names.at(place, 'network.couplingPoint');
  if (basis.transformerBuses.length > 0) return 'primary';
  names.problems.push({
    code: 'inconsistent',
    path: 'network.couplingPoint',
    expected: 'a bus, since there is no transformer',
    found: '"primary"',
  });
  return 0;
}

class Names {
  readonly problems: Problem[] = [];
  readonly #index = new Map<string, number>();

  constructor(names: readonly string[]) {
    for (const [i, name] of names.entries()) {
      if (this.#index.has(name)) {
        const path = `network.buses[${i}].name`;
        this.problems.push({ code: 'inconsistent', path, expected: 'a name of its own', found: `"${name}"` });
      }
      this.#index.set(name, i);
    }
    if (names.length === 0) {
      this.problems.push({ code: 'missing', path: 'network.buses', expected: 'at least one bus', found: 'none' });
    }
  }

  at(name: string | undefined, path: string): number {
    const index = name === undefined ? undefined : this.#index.get(name);
    if (index !== undefined) return index;
    const expected = `one of the buses ${[...this.#index.keys()].map((known) => `"${known}"`).join(', ')}`;
    const found = name === undefined ? 'nothing' : `"${name}"`;
    this.problems.push({ code: name === undefined ? 'missing' : 'inconsistent', path, expected, found });
    return 0;
  }

  ends(between: readonly [string, string], path: string): { from: number; to: number } {
    const from = this.at(between[0], `${path}[0]`);
    const to = this.at(between[1], `${path}[1]`);
    if (between[0] === between[1]) {
      this.problems.push({
        code: 'inconsistent',
        path,
        expected: 'two different buses',
        found: `"${between[0]}" twice`,
      });
    }
    return { from, to };
  }

  perBus(loads: readonly { bus: string; kw: number }[], path: string): Float64Array {
    const kw = new Float64Array(Math.max(1, this.#index.size));
    for (const [i, load] of loads.entries()) kw[this.at(load.bus, `${path}[${i}].bus`)]! += load.kw;
    return kw;
  }
}

// Couplers that can close a ring make a loop without impedance; two between the same buses contradict each other.
function couplerProblems({ couplers, buses }: Topology): Problem[] {
  const group = buses.map((_, i) => i);
  const problems: Problem[] = [];
  for (const [i, { name, from, to, state }] of couplers.entries()) {
    if (state === 'open') continue;
    if (group[from] === group[to]) {
      problems.push({
        code: 'inconsistent',
        path: `network.couplers[${i}]`,
        expected: 'couplers that close no loop without impedance',
        found: `"${name}", which closes one`,
      });
    }
    const merged = group[to];
    for (let k = 0; k < group.length; k++) if (group[k] === merged) group[k] = group[from]!;
  }
  const seen = new Map<string, string>();
  for (const [i, { name, from, to }] of couplers.entries()) {
    const key = [from, to].sort((a, b) => a - b).join('-');
    const other = seen.get(key);
    if (other !== undefined) {
      problems.push({
        code: 'inconsistent',
        path: `network.couplers[${i}]`,
        expected: `one coupler between two buses, there is "${other}" already`,
        found: `"${name}"`,
      });
    }
    seen.set(key, name);
  }
  return problems;
}

function cableProblems({ cables }: Topology): Problem[] {
  return cables.flatMap(({ name, rOhm, xOhm }, i) =>
    rOhm > 0 || xOhm > 0
      ? []
      : [
          {
            code: 'inconsistent' as const,
            path: `network.cables[${i}]`,
            expected: 'a cable with impedance; a coupler has none',
            found: `"${name}" with none`,
          },
        ],
  );
}
