import type { Supply } from '../supply/supply.js';
import { type DampingModel, type NetworkTable, networkTable } from './bus-admittance.js';
import { type CornerSet, cornerSet } from './corners.js';
import type { Loads } from './loads.js';
import { combine, type Excitation, excitation } from './summation.js';

/** What drives a network at each order present, bank left out; length n. */
export interface Drive {
  /** |Z_s| [Ω] */
  sourceOhm: Float64Array;
  /** E/|Z_s|, the background as a current [A] */
  backgroundA: Float64Array;
  /** loads and background combined as a current at the bus [A] */
  equivalentA: Float64Array;
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
}

/**
 * The network of a site without its bank.
 * @param supply settled supply
 * @param loads settled loads
 * @param nominalV bus voltage [V]
 * @param loadA I_L [A]
 * @returns corners, excitation and tables at the orders present
 * @source method-network
 */
export function networkModel(supply: Supply, loads: Loads, nominalV: number, loadA: number): NetworkModel {
  const damping = { nominalV, motorSharePct: loads.motorSharePct };
  const corners = cornerSet(supply, loads, nominalV);
  const present = excitation(loads, nominalV);
  const atOrders = corners.networks.map((network) => networkTable(network, damping, present.ordersH));
  const drives = atOrders.map((table) => drive(table, present));
  return { nominalV, damping, corners, excitation: present, atOrders, drives, loadA };
}

function drive({ source }: NetworkTable, { injectedA, backgroundV, exponent }: Excitation): Drive {
  const sourceOhm = source.re.map((re, i) => Math.sqrt(re * re + source.im[i]! ** 2));
  const backgroundA = sourceOhm.map((ohm, i) => backgroundV[i]! / ohm);
  return { sourceOhm, backgroundA, equivalentA: injectedA.map((a, i) => combine(a, backgroundA[i]!, exponent[i]!)) };
}
