import { describe, expect, it } from 'vitest';
import { networkTable } from './bus-admittance.js';

const path = { source: { rOhm: 0.001, xOhm: 0.01 }, transformers: [], resistanceExponent: 0.5 };
const at = (orderH: number, dampingKw: number, motorSharePct: number) => {
  const table = networkTable(
    { path, state: null, dampingKw },
    { nominalV: 400, motorSharePct },
    Float64Array.of(orderH),
  );
  return { re: table.bus.re[0]!, im: table.bus.im[0]!, zs: [table.source.re[0]!, table.source.im[0]!] };
};

describe('the network without the bank', () => {
  it('is its source alone where nothing damps it', () => {
    const { re, im, zs } = at(4, 0, 60);
    expect(zs[0]).toBeCloseTo(0.002, 12);
    expect(zs[1]).toBeCloseTo(0.04, 12);
    expect(re).toBeCloseTo(0.002 / (0.002 ** 2 + 0.04 ** 2), 9);
    expect(im).toBeCloseTo(-0.04 / (0.002 ** 2 + 0.04 ** 2), 9);
  });

  it('takes resistive load as P/U², the same at every order', () => {
    for (const orderH of [1, 7, 49]) {
      expect(at(orderH, 160, 0).re - at(orderH, 0, 0).re).toBeCloseTo(1, 9);
      expect(at(orderH, 160, 0).im).toBeCloseTo(at(orderH, 0, 0).im, 12);
    }
  });

  it('takes motors as a sixth of U²/P in reactance and three tenths of that in resistance', () => {
    // 160 kW at 400 V: U²/P = 1 Ω, X = 1/6 Ω, R = 0.05 Ω at the fundamental.
    const [x, r] = [1 / 6, 0.05];
    expect(at(1, 160, 100).re - at(1, 0, 100).re).toBeCloseTo(r / (r ** 2 + x ** 2), 9);
    expect(at(1, 160, 100).im - at(1, 0, 100).im).toBeCloseTo(-x / (r ** 2 + x ** 2), 9);
    const [x9, r9] = [9 * x, 3 * r];
    expect(at(9, 160, 100).re - at(9, 0, 100).re).toBeCloseTo(r9 / (r9 ** 2 + x9 ** 2), 9);
  });

  it('splits the load by its share of motors', () => {
    const whole = at(5, 160, 25).re - at(5, 0, 0).re;
    const parts = at(5, 40, 100).re + at(5, 120, 0).re - 2 * at(5, 0, 0).re;
    expect(whole).toBeCloseTo(parts, 9);
  });
});
