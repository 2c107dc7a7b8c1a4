import type { Bank } from '../layout/bank.js';
import type { Level } from '../layout/levels.js';
import { bankColumn, busColumns } from './bus-columns.js';
import type { Corner } from './corners.js';
import type { NetworkModel } from './network-model.js';
import { stageAdmittance, stageBranch } from './stage-admittance.js';

/** What a bank leaves of a ripple-control signal. */
export interface RippleShare {
  /** voltage at the bank's bus with the bank in, over that with it out */
  share: number;
  levelKvar: number;
  corner: Corner;
}

/**
 * What is left at the bank's bus of a signal that comes from behind the source, the least over levels above 0 and corners:
 * |Z|/|Z₀| = |Y₀|/|Y₀ + Y|, since the transfer from the source changes as the bus's own impedance does.
 * @param model the network without the bank
 * @param bank the bank
 * @param levels its levels
 * @param orderH frequency of the signal [order]
 * @returns the least share with where it is met, null without a level above 0
 * @source method-network
 */
export function rippleShare(
  model: NetworkModel,
  bank: Bank,
  levels: readonly Level[],
  orderH: number,
): RippleShare | null {
  const ordersH = Float64Array.of(orderH);
  const { corners, factors, networks } = model.corners;
  const exponent = networks[0]!.path.resistanceExponent;
  const without = networks.map((_, network) => busColumns(model, network, model.bankBus, ordersH).bank);
  const stages = factors.map((at) =>
    bank.groups.map((group) => stageAdmittance(stageBranch(group, at, exponent), ordersH)),
  );
  let least: RippleShare | null = null;
  for (const { levelKvar, vectors } of levels) {
    if (levelKvar === 0) continue;
    for (const { corner, network, factors: at } of corners) {
      const { re, im } = without[network]!;
      for (const vector of vectors) {
        const bankS = bankColumn(stages[at]!, vector, 1);
        const all = Math.sqrt((re[0]! + bankS.re[0]!) ** 2 + (im[0]! + bankS.im[0]!) ** 2);
        const share = Math.sqrt(re[0]! ** 2 + im[0]! ** 2) / all;
        if (least === null || share < least.share * (1 - 1e-9)) least = { share, levelKvar, corner };
      }
    }
  }
  return least;
}
