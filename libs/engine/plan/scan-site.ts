import { type BusColumns, bankColumn, networkColumns, seenSquareInto } from '../network/bus-columns.js';
import type { Corner } from '../network/corners.js';
import { PeakFinder } from '../network/peaks.js';
import { stageAdmittance, stageBranch } from '../network/stage-admittance.js';
import { chosenCorner, chosenLevel, chosenOrders, networkScene } from './network-scene.js';
import type { Site } from './site.js';

/** |Z| at the bus over order, in one corner. */
export interface ScannedLevel {
  bus: string;
  levelKvar: number;
  corner: Corner;
  parallelOrderH: number | null;
  peakOhm: number | null;
  orders: number[];
  impedanceOhm: number[];
}

/** What a scan may be asked for. */
export interface ScanOptions {
  /** the bank's highest where absent [kvar] */
  levelKvar?: number;
  /** place in the list of corners, 0 the nominal one; every corner where absent */
  corner?: number;
  /** orders h ≥ 1 to compute */
  ordersH: Float64Array;
}

/**
 * Network impedance over order at one level, nominal and every corner, at every bus. Without a record the damping load
 * is 0 unless the site gives it.
 * @param site validated site
 * @param options level, corner, orders
 * @returns one entry a bus and corner, nominal first
 * @throws InputProblem where no level is within 0.5 kvar of the one asked for, there is no such corner, or an order is below 1
 * @source method-network
 */
export function scanSite(site: Site, options: ScanOptions): { levels: ScannedLevel[] } {
  const { site: settled, bank, levels, model } = networkScene(site);
  const ordersH = chosenOrders(options.ordersH);
  const level = chosenLevel(levels, options.levelKvar);
  const corners = options.corner === undefined ? model.corners.corners : [chosenCorner(model, options.corner)];
  const vector = level.vectors[0]!;
  const finder = new PeakFinder(model, bank);
  const square = new Float64Array(ordersH.length);
  const exponent = settled.supply.resistanceExponent;
  const perNetwork: BusColumns[][] = [];
  const scanned = corners.map((corner) => {
    perNetwork[corner.network] ??= networkColumns(model, corner.network, ordersH);
    const columns = perNetwork[corner.network]!;
    const factors = model.corners.factors[corner.factors]!;
    const stages = bank.groups.map((group) => stageAdmittance(stageBranch(group, factors, exponent), ordersH));
    const connected = bankColumn(stages, vector, ordersH.length);
    return model.buses.map((bus, k): ScannedLevel => {
      seenSquareInto(columns[k]!, connected, square);
      const peak = finder.greatest(vector, corner, k);
      return {
        bus,
        levelKvar: level.levelKvar,
        corner: corner.corner,
        parallelOrderH: peak?.orderH ?? null,
        peakOhm: peak?.impedanceOhm ?? null,
        orders: Array.from(ordersH),
        impedanceOhm: Array.from(square, (y) => 1 / Math.sqrt(y)),
      };
    });
  });
  return { levels: model.buses.flatMap((_, k) => scanned.map((buses) => buses[k]!)) };
}
