import { resistanceGrowth } from '../quantity/resistance-growth.js';
import type { Supply } from '../supply/supply.js';
import { type DampingModel, type NetworkTable, networkTable } from './bus-admittance.js';
import { type CornerSet, cornerSet } from './corners.js';
import { EliminatedNetwork } from './eliminated-network.js';
import type { Loads } from './loads.js';
import { networkStates, withTolerances } from './network-states.js';
import { type NodalCase, nodalCase } from './nodal-case.js';
import { type NodalTable, nodalTable } from './nodal-impedance.js';
import { type NodeCurrents, nodeCurrents } from './node-currents.js';
import { type BusInjection, busInjection, combine, type Excitation, excitation } from './summation.js';
import type { Topology } from './topology.js';

/** What drives a network at each order present, bank left out; length n. */
export interface Drive {
  /** |Z_s| [Ω] */
  sourceOhm: Float64Array;
  /** E/|Z_s|, the background as a current [A] */
  backgroundA: Float64Array;
  /** loads and background combined as a current at the bus [A] */
  equivalentA: Float64Array;
}

/** The part of a model that only a network of several buses has. */
export interface NodalModel {
  topology: Topology;
  /** per network */
  cases: NodalCase[];
  /** per network, seen from the bank's bus */
  eliminated: EliminatedNetwork[];
  /** per network, at the orders present */
  tables: NodalTable[];
  /** per network: what the loads inject at its nodes at the orders present */
  currents: NodeCurrents[];
}

/** Everything about the network that does not depend on the bank, tabled once. */
export interface NetworkModel {
  nominalV: number;
  damping: DampingModel;
  corners: CornerSet;
  excitation: Excitation;
  /** per network, at the orders present */
  atOrders: NetworkTable[];
  /** per network, at the orders present */
  drives: Drive[];
  /** I_L, the load current distortion is held against [A]; 0 where nothing flows */
  loadA: number;
  /** null where there is one bus */
  nodal: NodalModel | null;
  /** names of the buses */
  buses: string[];
  /** index of the bank's bus */
  bankBus: number;
  /** the transformers' primary is the point of coupling, and judged too */
  primary: boolean;
}

/**
 * The network of a site with one bus, without its bank.
 * @param supply settled supply
 * @param loads settled loads
 * @param nominalV bus voltage [V]
 * @param loadA I_L [A]
 * @returns corners, excitation and tables at the orders present
 * @source method-network
 */
export function networkModel(supply: Supply, loads: Loads, nominalV: number, loadA: number): NetworkModel {
  return siteNetwork(supply, loads, { nominalV, loadA, topology: null });
}

/**
 * The network of a site without its bank.
 * @param supply settled supply
 * @param loads settled loads
 * @param site bus voltage [V], I_L [A], the topology, null where there is one bus, and whether the transformers' primary is
 *   judged too
 * @returns corners, excitation and tables at the orders present
 * @source method-network
 */
export function siteNetwork(
  supply: Supply,
  loads: Loads,
  site: { nominalV: number; loadA: number; topology: Topology | null; primary?: boolean },
): NetworkModel {
  const { nominalV, loadA, topology } = site;
  const damping = { nominalV, motorSharePct: loads.motorSharePct };
  const corners = siteCorners(supply, loads, site);
  const present = excitation(loads, nominalV);
  const nodal = topology === null ? null : nodalModel({ topology, corners, loads, damping, present });
  const model: NetworkModel = {
    nominalV,
    damping,
    corners,
    excitation: present,
    atOrders: [],
    drives: [],
    loadA,
    nodal,
    buses: topology === null ? ['main'] : topology.buses,
    bankBus: topology?.bankBus ?? 0,
    primary: (site.primary === true || capacitorsAtPrimary(topology)) && supply.transformers.length > 0,
  };
  model.atOrders = corners.networks.map((_, network) => tableAt(model, network, present.ordersH));
  model.drives = model.atOrders.map((table) => drive(table, present));
  return model;
}

/**
 * The corners of a site: of one bus, or of every way its network can stand.
 * @param supply settled supply
 * @param loads settled loads
 * @param site bus voltage [V] and the topology, null where there is one bus
 * @returns corners with their networks and factors
 * @source method-network
 */
export function siteCorners(
  supply: Supply,
  loads: Loads,
  { nominalV, topology }: { nominalV: number; topology: Topology | null },
): CornerSet {
  if (topology === null) return cornerSet(supply, loads, nominalV);
  const states = withTolerances(topology, networkStates(topology));
  return cornerSet(supply, withListed(loads, topology), nominalV, states);
}

/**
 * Z_s and Y₀ at the bank's bus over orders, whatever the network's shape: the only place that fills the table.
 * @param model the network without the bank
 * @param network index into the corners' networks
 * @param ordersH orders h ≥ 1
 * @returns tables of the same length
 * @source method-network
 */
export function tableAt(model: NetworkModel, network: number, ordersH: Float64Array): NetworkTable {
  if (model.nodal === null) return networkTable(model.corners.networks[network]!, model.damping, ordersH);
  const { source, resistanceExponent } = model.nodal.cases[network]!;
  return {
    ordersH,
    source: {
      re: ordersH.map((h) => source.rOhm * resistanceGrowth(h, resistanceExponent)),
      im: ordersH.map((h) => source.xOhm * h),
    },
    bus: model.nodal.eliminated[network]!.bankAdmittance(ordersH),
  };
}

function nodalModel(parts: {
  topology: Topology;
  corners: CornerSet;
  loads: Loads;
  damping: DampingModel;
  present: Excitation;
}): NodalModel {
  const { topology, corners, loads, damping, present } = parts;
  const mostKw = withListed(loads, topology).dampingKw.max;
  const cases = corners.networks.map(({ path, dampingKw, state }) => {
    const listedShare = mostKw > 0 ? dampingKw / mostKw : 0;
    const atBankKw = listedShare * loads.dampingKw.max;
    return nodalCase(topology, state!, path, { ...damping, dampingKw: atBankKw, listedShare });
  });
  const injected = topology.buses.map((name, bus) => injectedAt(loads, present, { name, first: bus === 0 }));
  return {
    topology,
    cases,
    eliminated: cases.map((nodal) => new EliminatedNetwork(nodal, nodal.busNode[topology.bankBus]!)),
    tables: cases.map((nodal) => nodalTable(nodal, present.ordersH)),
    currents: cases.map((nodal) => nodeCurrents(nodal, injected, present.exponent)),
  };
}

// Capacitors at the primary are judged by the voltage there.
function capacitorsAtPrimary(topology: Topology | null): boolean {
  return topology?.capacitors.some(({ bus }) => bus === 'primary') ?? false;
}

// A corner's damping is the whole site's, so the undamped one has neither the damping load nor what is listed.
function withListed(loads: Loads, { motorKw, resistiveKw }: Topology): Loads {
  const listedKw = [...motorKw, ...resistiveKw].reduce((sum, kw) => sum + kw, 0);
  return { ...loads, dampingKw: { min: loads.dampingKw.min, max: loads.dampingKw.max + listedKw } };
}

function injectedAt(loads: Loads, present: Excitation, bus: { name: string; first: boolean }): BusInjection {
  const here = (loads.distorting ?? []).filter((load) => (load.bus === undefined ? bus.first : load.bus === bus.name));
  return busInjection({ ...loads, distorting: here }, present);
}

function drive({ source }: NetworkTable, { injectedA, backgroundV, exponent }: Excitation): Drive {
  const sourceOhm = source.re.map((re, i) => Math.sqrt(re * re + source.im[i]! ** 2));
  const backgroundA = sourceOhm.map((ohm, i) => backgroundV[i]! / ohm);
  return { sourceOhm, backgroundA, equivalentA: injectedA.map((a, i) => combine(a, backgroundA[i]!, exponent[i]!)) };
}
