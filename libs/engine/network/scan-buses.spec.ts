import { describe, expect, it } from 'vitest';
import { LEAST_SIEMENS } from './bus-admittance.js';
import { type BusColumns, bankColumn, seenSquareInto } from './bus-columns.js';
import { invertInto } from './nodal-impedance.js';
import { scanBusesInto, scanEqualStagesInto } from './scan-into.js';

const orders = [1, 2.7, 5, 7.3, 23];
const column = (value: (h: number) => [number, number]) => ({
  re: Float64Array.from(orders, (h) => value(h)[0]),
  im: Float64Array.from(orders, (h) => value(h)[1]),
});

// A stage of 7 %, a supply of 10 mΩ at bus 0 and a cable of 20 mΩ to bus 1.
const stage = column((h) => {
  const x = 0.9 * h - 12.8 / h;
  return [0.03 / (0.03 ** 2 + x ** 2), -x / (0.03 ** 2 + x ** 2)];
});

function impedances(h: number, bank: [number, number], bankBus: number): [number, number][] {
  const inverse = (r: number, x: number): [number, number] => [r / (r * r + x * x), -x / (r * r + x * x)];
  const supply = inverse(0.002, 0.01 * h);
  const cable = inverse(0.006, 0.02 * h);
  const y = Float64Array.of(
    supply[0] + cable[0],
    supply[1] + cable[1],
    -cable[0],
    -cable[1],
    -cable[0],
    -cable[1],
    ...cable,
  );
  y[6 * bankBus]! += bank[0];
  y[6 * bankBus + 1]! += bank[1];
  const z = new Float64Array(8);
  invertInto(y, 2, z, 0);
  return [0, 1, 3].map((k) => [z[2 * k]!, z[2 * k + 1]!]);
}

function columnsFor(bankBus: number): BusColumns[] {
  const at = (k: number) => column((h) => impedances(h, [0, 0], bankBus)[k]!);
  const own = at(2 * bankBus);
  const size = own.re.map((re, i) => re * re + own.im[i]! ** 2);
  const bank = { re: own.re.map((re, i) => re / size[i]!), im: own.im.map((im, i) => -im / size[i]!) };
  return [0, 1].map((bus) => ({ bank, other: bus === bankBus ? null : { self: at(2 * bus), toBank: at(1) } }));
}

describe('the scan of every bus at many levels', () => {
  // ten levels: eight are worked on at once, the rest one by one
  const counts = Float64Array.of(0, 1, 2, 3, 5, 8, 13, 17, 40, 63);

  it.each([0, 1])('is what factorising the network with the bank in it gives, bank at bus %i', (bankBus) => {
    const out = new Float64Array(2 * counts.length * orders.length);
    scanBusesInto(columnsFor(bankBus), stage, counts, out);
    for (const bus of [0, 1]) {
      for (const [level, count] of counts.entries()) {
        for (const [i, h] of orders.entries()) {
          const [re, im] = impedances(h, [count * stage.re[i]!, count * stage.im[i]!], bankBus)[2 * bus]!;
          const found = out[(bus * counts.length + level) * orders.length + i]!;
          expect(found * (re * re + im * im)).toBeCloseTo(1, 12);
        }
      }
    }
  });

  it('agrees with the level after level of a bank of any groups', () => {
    const columns = columnsFor(0);
    const out = new Float64Array(2 * counts.length * orders.length);
    scanBusesInto(columns, stage, counts, out);
    const square = new Float64Array(orders.length);
    for (const [bus, each] of columns.entries()) {
      for (const [level, count] of counts.entries()) {
        seenSquareInto(each, bankColumn([stage], Int32Array.of(count), orders.length), square);
        for (const [i, s] of square.entries()) {
          expect(out[(bus * counts.length + level) * orders.length + i]! / s).toBeCloseTo(1, 12);
        }
      }
    }
  });

  it('spoils no level beside one at which the other bus is at series resonance without loss', () => {
    // Z_ii = (Y₀·z_ii + n·y·w)/(Y₀ + n·y) by hand: 0.8 − 0.2·n over j·(0.2·n − 0.4), nothing at n = 4
    const j = (b: number) => ({ re: Float64Array.of(0), im: Float64Array.of(b) });
    const levels = Float64Array.from({ length: 8 }, (_, n) => n);
    const out = new Float64Array(8);
    scanBusesInto([{ bank: j(-0.4), other: { self: j(2), toBank: j(Math.sqrt(2.5)) } }], j(0.2), levels, out);
    for (const n of [0, 1, 3, 5, 6, 7]) expect(out[n]).toBeCloseTo(((0.2 * n - 0.4) / (0.8 - 0.2 * n)) ** 2, 12);
    expect(out[4]).toBeGreaterThan(1e20);
  });

  it('has an end where supply and bank cancel without loss', () => {
    const lossless = (b: number) => ({ re: Float64Array.of(0), im: Float64Array.of(b) });
    const out = new Float64Array(6);
    scanBusesInto(
      [{ bank: lossless(-0.4), other: null }],
      lossless(0.2),
      Float64Array.from(out, (_, n) => n),
      out,
    );
    expect(out[2]).toBe(LEAST_SIEMENS ** 2);
    expect(out[3]).toBeCloseTo(0.04, 14);
  });

  it('at the bus of the bank is the scan of one bus', () => {
    const [bank] = columnsFor(0);
    const [one, every] = [0, 0].map(() => new Float64Array(counts.length * orders.length));
    scanEqualStagesInto(bank!.bank, stage, counts, one!);
    scanBusesInto([bank!], stage, counts, every!);
    for (const [k, ohm] of one!.entries()) expect(every![k]! * ohm ** 2).toBeCloseTo(1, 13);
  });
});
