import { resistanceGrowth } from '../quantity/resistance-growth.js';
import type { Flow } from './bus-flow.js';
import type { NetworkModel } from './network-model.js';
import { combine } from './summation.js';

/**
 * Harmonic voltages at the transformers' primary of a site with one bus, on the flow of the bus. With the network's part of
 * the way n = Z_net/Z_s and w = Z_s/Z: from the loads V_p = |Z_net|·I_s, from the background
 * V_p = |E·(1 − n·(1 − 1/w))|; the two combined with the order's exponent.
 * @param model the network without the bank
 * @param flow a flow whose bus voltages are filled; `primary` is filled
 * @param bankRe Y of the bank at the orders present, real part [S]
 * @param bankIm imaginary part [S]
 * @source method-network
 */
export function primaryVoltagesInto(model: NetworkModel, flow: Flow, bankRe: Float64Array, bankIm: Float64Array): void {
  const { voltageV } = flow.primary!;
  const { source, bus } = model.atOrders[flow.corner.network]!;
  const { path } = model.corners.networks[flow.corner.network]!;
  const { injectedA, backgroundV, exponent, ordersH } = model.excitation;
  for (let i = 0; i < ordersH.length; i++) {
    const h = ordersH[i]!;
    const netRe = path.source.rOhm * resistanceGrowth(h, path.resistanceExponent);
    const netIm = path.source.xOhm * h;
    const sRe = source.re[i]!;
    const sIm = source.im[i]!;
    const yRe = bus.re[i]! + bankRe[i]!;
    const yIm = bus.im[i]! + bankIm[i]!;
    // w = Z_s·Y; E·(1 − n·(1 − 1/w)) = E·(w − n·(w − 1))/w
    const wRe = sRe * yRe - sIm * yIm;
    const wIm = sRe * yIm + sIm * yRe;
    const square = sRe * sRe + sIm * sIm;
    const nRe = (netRe * sRe + netIm * sIm) / square;
    const nIm = (netIm * sRe - netRe * sIm) / square;
    const leftRe = wRe - (nRe * (wRe - 1) - nIm * wIm);
    const leftIm = wIm - (nRe * wIm + nIm * (wRe - 1));
    const wSize = Math.sqrt(wRe * wRe + wIm * wIm);
    const ofLoads = (Math.sqrt(netRe * netRe + netIm * netIm) / wSize) * injectedA[i]!;
    const ofBackground = (Math.sqrt(leftRe * leftRe + leftIm * leftIm) / wSize) * backgroundV[i]!;
    voltageV[i] = combine(ofLoads, ofBackground, exponent[i]!);
  }
}
