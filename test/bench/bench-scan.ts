import { scanEqualStagesInto } from '#libs/engine/index.js';
import type { TwinWork } from './compare-twins.js';

const LEVELS = 64;
const ORDERS = 2451;
const CORNERS = 8;

/** A column of complex numbers. */
interface Column {
  re: Float64Array;
  im: Float64Array;
}

/** |Z| over 64 levels, 8 corners and the orders 1 to 50 in steps of 0.02, on one bus. */
export function scanWork(): TwinWork {
  const ordersH = Float64Array.from({ length: ORDERS }, (_, i) => 1 + i * 0.02);
  const counts = Float64Array.from({ length: LEVELS }, (_, i) => i);
  const corners = Array.from({ length: CORNERS }, (_, k) => cornerTables(ordersH, k));
  const outputs = corners.map(() => new Float64Array(LEVELS * ORDERS));
  return {
    title: `scan of ${LEVELS} levels, ${CORNERS} corners, ${ORDERS} orders`,
    twin: 'scan',
    limit: 1.5,
    runs: { ours: 40, twin: 40 },
    input: Float64Array.from([
      ORDERS,
      LEVELS,
      CORNERS,
      ...counts,
      ...corners.flatMap(({ bus, stage }) => [...bus.re, ...bus.im, ...stage.re, ...stage.im]),
    ]),
    ours: () => {
      for (const [k, { bus, stage }] of corners.entries()) scanEqualStagesInto(bus, stage, counts, outputs[k]!);
    },
    output: () => Float64Array.from(outputs.flatMap((output) => [...output])),
  };
}

/** A 400 V bus of about 15 MVA with some damping, and a 12.5 kvar stage with 7 % reactors, each corner a little apart. */
function cornerTables(ordersH: Float64Array, corner: number): { bus: Column; stage: Column } {
  const sourceOhm = 0.0107 * (1 + 0.03 * corner);
  const capacitiveOhm = 12.8 / (corner % 2 === 0 ? 0.95 : 1.1);
  const bus = column(ordersH, (h) => [0.1 * sourceOhm * Math.sqrt(h), sourceOhm * h]);
  bus.re.forEach((g, i) => {
    bus.re[i] = g + 0.4;
  });
  const stage = column(ordersH, (h) => [0.03 * Math.sqrt(h), 0.9 * h - capacitiveOhm / h]);
  return { bus, stage };
}

/** Admittance of r + jx over orders. */
function column(ordersH: Float64Array, impedance: (orderH: number) => [r: number, x: number]): Column {
  const out = { re: new Float64Array(ordersH.length), im: new Float64Array(ordersH.length) };
  ordersH.forEach((h, i) => {
    const [r, x] = impedance(h);
    out.re[i] = r / (r * r + x * x);
    out.im[i] = -x / (r * r + x * x);
  });
  return out;
}
