import type { DistortingLoad, OrderPct, SpectrumName } from './loads.js';

/** Highest order that is computed. */
export const HIGHEST_ORDER_H = 50;

function spectrum(orders: readonly number[], pct: readonly number[]): OrderPct[] {
  return orders.map((orderH, i) => ({ orderH, pct: pct[i]! }));
}

const SIX_PULSE_ORDERS = Array.from({ length: 8 }, (_, k) => [6 * (k + 1) - 1, 6 * (k + 1) + 1]).flat();
const TO_25 = [5, 7, 11, 13, 17, 19, 23, 25];
const TO_19 = [5, 7, 11, 13, 17, 19];

/** Magnitudes in % of the fundamental current; each list's source stands in SOURCES.md. */
export const SPECTRA: Record<SpectrumName, { source: string; orders: OrderPct[] }> = {
  'six-pulse-ideal': {
    source: 'spectrum-ideal',
    orders: SIX_PULSE_ORDERS.map((orderH) => ({ orderH, pct: 100 / orderH })),
  },
  'six-pulse': { source: 'ieee-519-1992', orders: spectrum(TO_25, [17.5, 11.1, 4.5, 2.9, 1.5, 1.0, 0.9, 0.8]) },
  'drive-benchmark': {
    source: 'ieee-task-force-1999',
    orders: spectrum(
      [...TO_25, 29, 31, 35, 37],
      [18.24, 11.9, 5.73, 4.01, 1.93, 1.39, 0.94, 0.86, 0.71, 0.62, 0.44, 0.38],
    ),
  },
  'six-pulse-no-choke': { source: 'spectrum-practice', orders: spectrum(TO_19, [63, 54, 10, 6.1, 6.7, 4.8]) },
  'six-pulse-choke': { source: 'spectrum-practice', orders: spectrum(TO_19, [30, 12, 8.9, 5.6, 4.4, 4.1]) },
  'twelve-pulse': { source: 'spectrum-practice', orders: spectrum(TO_19, [3.6, 2.6, 7.5, 5.2, 1.2, 1.3]) },
  'active-front-end': { source: 'spectrum-practice', orders: spectrum(TO_19, [2.6, 3.4, 3.0, 0.1, 2.1, 2.2]) },
  'single-phase-electronic': {
    source: 'ieee-1100',
    orders: spectrum([3, 5, 7, 9, 11, 13, 15], [81, 60.6, 37, 15.7, 2.4, 6.3, 7.9]),
  },
};

/**
 * The orders a load injects into the bank's network, % of its fundamental. Triplens of the single-phase spectrum are
 * zero sequence and kept out; orders given by the user are what the bank sees, unless they are said to be zero sequence.
 * @param load a distorting load
 * @returns orders up to 50, ascending
 * @source method-network
 */
export function injectedOrders(load: DistortingLoad): OrderPct[] {
  const orders =
    load.orders ??
    (load.spectrum === undefined ? [] : SPECTRA[load.spectrum].orders.filter(isBankSequence(load.spectrum)));
  return orders
    .filter(({ orderH, pct, sequence }) => sequence !== 'zero' && orderH <= HIGHEST_ORDER_H && pct > 0)
    .sort((a, b) => a.orderH - b.orderH);
}

/**
 * The orders of a load that are zero sequence and add in the neutral, % of its fundamental.
 * @param load a distorting load
 * @returns triplens of the single-phase spectrum, or the given orders that are said to be
 * @source method-network
 */
export function zeroSequenceOrders(load: DistortingLoad): OrderPct[] {
  if (load.orders !== undefined) return load.orders.filter(({ sequence }) => sequence === 'zero');
  if (load.spectrum !== 'single-phase-electronic') return [];
  return SPECTRA[load.spectrum].orders.filter(({ orderH }) => orderH % 3 === 0);
}

function isBankSequence(name: SpectrumName): (order: OrderPct) => boolean {
  return ({ orderH }) => name !== 'single-phase-electronic' || orderH % 3 !== 0;
}
