import type { Loads } from './loads.js';
import { HIGHEST_ORDER_H, injectedOrders, zeroSequenceOrders } from './spectra.js';

/**
 * Summation exponent of an order: 1 below 5, 1.4 from 5 to 10, 2 above; 1 throughout for arithmetic summation.
 * @param orderH h
 * @param summation how magnitudes combine
 * @returns α
 * @source iec-tr-61000-3-6
 */
export function summationExponent(orderH: number, summation: Loads['summation']): number {
  if (summation === 'arithmetic' || orderH < 5) return 1;
  return orderH <= 10 ? 1.4 : 2;
}

/**
 * Combined magnitude: (a^α + b^α)^(1/α).
 * @param a first magnitude ≥ 0
 * @param b second magnitude ≥ 0, same unit
 * @param exponent α
 * @returns combined magnitude, same unit
 * @source iec-tr-61000-3-6
 */
export function combine(a: number, b: number, exponent: number): number {
  if (a === 0) return b;
  if (b === 0) return a;
  if (exponent === 1) return a + b;
  if (exponent === 2) return Math.sqrt(a * a + b * b);
  return (a ** exponent + b ** exponent) ** (1 / exponent);
}

/** What excites the network at each order present, ascending; length n. */
export interface Excitation {
  ordersH: Float64Array;
  /** α of each order */
  exponent: Float64Array;
  /** all distorting loads combined, per phase at the bus [A] */
  injectedA: Float64Array;
  /** background voltage behind the source, per phase [V] */
  backgroundV: Float64Array;
}

/** Currents of some loads at one order: the sum of those with angles, and every other by itself [A]. */
interface OrderCurrents {
  re: number;
  im: number;
  magnitudesA: number[];
}

// Currents with angles are one phasor sum; each of the others stands for itself.
function currentsByOrder(loads: Pick<Loads, 'distorting' | 'factors'>): Map<number, OrderCurrents> {
  const found = new Map<number, OrderCurrents>();
  for (const load of loads.distorting ?? []) {
    for (const { orderH, pct, angleDeg } of injectedOrders(load)) {
      const factor = loads.factors?.find((of) => of.orderH === orderH)?.factor ?? 1;
      const a = (factor * load.fundamentalA * pct) / 100;
      const currents = found.get(orderH) ?? { re: 0, im: 0, magnitudesA: [] };
      found.set(orderH, currents);
      if (angleDeg === undefined) {
        currents.magnitudesA.push(a);
        continue;
      }
      const angle = (angleDeg * Math.PI) / 180;
      currents.re += a * Math.cos(angle);
      currents.im += a * Math.sin(angle);
    }
  }
  return found;
}

/** What the loads of one bus inject at the orders present, per phase [A]; length n. */
export interface BusInjection {
  /** loads without angles, combined */
  magnitudeA: Float64Array;
  /** phasor sum of the loads with angles */
  re: Float64Array;
  im: Float64Array;
}

/**
 * The currents of one bus's loads, those with angles apart, since they add to the phasors of other buses.
 * @param loads settled loads of that bus
 * @param present orders and exponents of the whole site
 * @returns currents per phase [A]
 * @source iec-tr-61000-3-6
 */
export function busInjection(
  loads: Pick<Loads, 'distorting' | 'factors'>,
  present: Pick<Excitation, 'ordersH' | 'exponent'>,
): BusInjection {
  const currents = currentsByOrder(loads);
  const at = (i: number): OrderCurrents | undefined => currents.get(present.ordersH[i]!);
  return {
    magnitudeA: present.ordersH.map((_, i) =>
      (at(i)?.magnitudesA ?? []).reduce((sum, a) => combine(sum, a, present.exponent[i]!), 0),
    ),
    re: present.ordersH.map((_, i) => at(i)?.re ?? 0),
    im: present.ordersH.map((_, i) => at(i)?.im ?? 0),
  };
}

/**
 * Combines the distorting loads and lists the background at every order present. All loads stand at one bus, so each
 * quantity is proportional to a load's current and the loads may be combined before the network is applied.
 * @param loads settled loads; unknown lists count as empty here
 * @param nominalV bus voltage, line to line [V]
 * @returns excitation at the orders present, h ≤ 50
 * @source iec-tr-61000-3-6
 */
export function excitation(loads: Loads, nominalV: number): Excitation {
  const injected = new Map<number, number>();
  const background = new Map<number, number>();
  for (const [orderH, { re, im, magnitudesA }] of currentsByOrder(loads)) {
    const alpha = summationExponent(orderH, loads.summation);
    injected.set(
      orderH,
      magnitudesA.reduce((sum, a) => combine(sum, a, alpha), Math.sqrt(re * re + im * im)),
    );
  }
  for (const { orderH, pct } of loads.backgroundPct ?? []) {
    if (orderH > HIGHEST_ORDER_H || !(pct > 0)) continue;
    background.set(orderH, ((pct / 100) * nominalV) / Math.sqrt(3));
  }
  const ordersH = Float64Array.from(new Set([...injected.keys(), ...background.keys()])).sort();
  return {
    ordersH,
    exponent: ordersH.map((h) => summationExponent(h, loads.summation)),
    injectedA: ordersH.map((h) => injected.get(h) ?? 0),
    backgroundV: ordersH.map((h) => background.get(h) ?? 0),
  };
}

/**
 * Neutral current of loads with zero-sequence triplens: per order the loads combined as everywhere, then three times the
 * root sum of squares over the orders.
 * @param loads settled loads; an unknown list counts as empty here
 * @returns rms neutral current [A]
 * @source derived: zero-sequence currents of the three phases add in the neutral; iec-tr-61000-3-6 between loads
 */
export function neutralA(loads: Pick<Loads, 'distorting' | 'summation'>): number {
  const phaseA = new Map<number, number>();
  for (const load of loads.distorting ?? []) {
    for (const { orderH, pct } of zeroSequenceOrders(load)) {
      const alpha = summationExponent(orderH, loads.summation);
      phaseA.set(orderH, combine(phaseA.get(orderH) ?? 0, (load.fundamentalA * pct) / 100, alpha));
    }
  }
  return 3 * Math.sqrt([...phaseA.values()].reduce((sum, a) => sum + a * a, 0));
}
