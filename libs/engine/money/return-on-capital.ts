import { discountedColumn } from './cash-flow.js';

/** A rate of return, or why there is none. */
export interface RateOfReturn {
  /** effective a year [%], or null */
  irrPct: number | null;
  /** null where there is a rate */
  irrReason: 'no sign change' | 'several sign changes' | null;
}

const POINTS = 2001;
const LEAST_RATE = -0.9;
const GREATEST_RATE = 10;

/**
 * The rate at which the net present value is 0: sought on 2 001 points equal in ln(1+r) from −90 to 1 000 %; exactly one
 * sign change is bisected, none or several give no rate.
 * @param net nets, month 0 first
 * @returns the rate a year [%], or why there is none
 * @source method-money
 */
export function rateOfReturn(net: Float64Array): RateOfReturn {
  const low = Math.log(1 + LEAST_RATE);
  const step = (Math.log(1 + GREATEST_RATE) - low) / (POINTS - 1);
  let changes = 0;
  let bracket: [number, number] = [0, 0];
  let lastAt = low;
  let lastSign = 0;
  for (let k = 0; k < POINTS; k++) {
    const at = low + k * step;
    const sign = Math.sign(valueAt(net, at));
    if (sign === 0) continue;
    if (lastSign !== 0 && sign !== lastSign) {
      changes++;
      bracket = [lastAt, at];
    }
    lastSign = sign;
    lastAt = at;
  }
  if (changes !== 1) return { irrPct: null, irrReason: changes === 0 ? 'no sign change' : 'several sign changes' };
  return { irrPct: 100 * Math.expm1(bisected(net, bracket)), irrReason: null };
}

// Σ net_j·e^(−j·logRate/12), from the last month back.
function valueAt(net: Float64Array, logRate: number): number {
  const factor = Math.exp(-logRate / 12);
  let value = 0;
  for (let j = net.length - 1; j >= 0; j--) value = value * factor + net[j]!;
  return value;
}

function bisected(net: Float64Array, [from, to]: [number, number]): number {
  const sign = Math.sign(valueAt(net, from));
  let low = from;
  let high = to;
  for (let middle = (low + high) / 2; middle > low && middle < high; middle = (low + high) / 2) {
    if (Math.sign(valueAt(net, middle)) === sign) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

/** A payback time, or why there is none. */
export interface Payback {
  /** [years], or null */
  years: number | null;
  reason: 'no capital' | 'negative to the end' | null;
}

/** A running sum below this is still negative. */
const NEGATIVE_WIDTH = 1e-9;

/**
 * When the running sum stays at 0 or more: past the last month in which it is below −10⁻⁹, linear in the next.
 * @param column amounts by month, month 0 first: nets, or their present values
 * @returns years, or why there are none
 * @source method-money
 */
export function paybackTime(column: Float64Array): Payback {
  if (column[0] === 0) return { years: null, reason: 'no capital' };
  let sum = 0;
  let last = -1;
  let sumAtLast = 0;
  for (let j = 0; j < column.length; j++) {
    sum += column[j]!;
    if (sum < -NEGATIVE_WIDTH) {
      last = j;
      sumAtLast = sum;
    }
  }
  if (last === column.length - 1) return { years: null, reason: 'negative to the end' };
  if (last < 0) return { years: 0, reason: null };
  return { years: (last - sumAtLast / column[last + 1]!) / 12, reason: null };
}

/**
 * Payback of the nets, and of their present values.
 * @param net nets, month 0 first
 * @param discountPct d [%]
 * @returns both times, and the reason where the first has none
 * @source method-money
 */
export function paybacks(
  net: Float64Array,
  discountPct: number,
): { paybackYears: number | null; paybackReason: Payback['reason']; discountedPaybackYears: number | null } {
  const plain = paybackTime(net);
  const discounted = paybackTime(discountedColumn(net, discountPct));
  return { paybackYears: plain.years, paybackReason: plain.reason, discountedPaybackYears: discounted.years };
}
