import type { Supply } from '../supply/supply.js';
import { type DampingModel, type NetworkTable, networkTable } from './bus-admittance.js';
import { type CornerSet, cornerSet } from './corners.js';
import type { Loads } from './loads.js';
import { type Excitation, excitation } from './summation.js';

/** Everything about the network that does not depend on the bank, tabled once. */
export interface NetworkModel {
  nominalV: number;
  damping: DampingModel;
  corners: CornerSet;
  excitation: Excitation;
  /** per network, at the orders present */
  atOrders: NetworkTable[];
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
  return {
    nominalV,
    damping,
    corners,
    excitation: present,
    atOrders: corners.networks.map((network) => networkTable(network, damping, present.ordersH)),
    loadA,
  };
}
