import { describe, expect, it } from 'vitest';
import { LEAST_SIEMENS } from './bus-admittance.js';
import { admittanceSquareInto, scanEqualStagesInto } from './scan-into.js';

const bus = { re: Float64Array.of(0.5, 0.1, 2), im: Float64Array.of(-3, -1, -0.2) };
const stage = { re: Float64Array.of(0.01, 0, 0.3), im: Float64Array.of(0.4, 0.2, -0.1) };

describe('impedance at the bus', () => {
  const counts = [0, 1, 5];
  const direct = counts.flatMap((n) =>
    Array.from(bus.re, (g, i) => 1 / Math.hypot(g + n * stage.re[i]!, bus.im[i]! + n * stage.im[i]!)),
  );

  it('of equal stages, all levels at once, is 1/|Y₀ + n·y|', () => {
    const out = new Float64Array(9);
    scanEqualStagesInto(bus, stage, Float64Array.from(counts), out);
    out.forEach((ohm, k) => {
      expect(ohm).toBeCloseTo(direct[k]!, 12);
    });
  });

  it('of counts per group is the same', () => {
    counts.forEach((n, level) => {
      const square = new Float64Array(3);
      admittanceSquareInto(bus, [stage, stage], Int32Array.of(n, 0), square);
      square.forEach((y, i) => {
        expect(1 / Math.sqrt(y)).toBeCloseTo(direct[3 * level + i]!, 12);
      });
    });
  });

  it('of groups adds them up', () => {
    const [two, one] = [new Float64Array(3), new Float64Array(3)];
    admittanceSquareInto(bus, [stage, stage], Int32Array.of(2, 3), two);
    admittanceSquareInto(bus, [stage], Int32Array.of(5), one);
    two.forEach((y, i) => {
      expect(y).toBeCloseTo(one[i]!, 12);
    });
  });

  it('has no end at a resonance without loss, and a number all the same', () => {
    const out = new Float64Array(1);
    const lossless = { re: Float64Array.of(0), im: Float64Array.of(-0.4) };
    admittanceSquareInto(lossless, [{ re: Float64Array.of(0), im: Float64Array.of(0.2) }], Int32Array.of(2), out);
    expect(out[0]).toBe(LEAST_SIEMENS ** 2);
  });
});
