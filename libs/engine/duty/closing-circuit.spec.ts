import { describe, expect, it } from 'vitest';
import { closingPeak } from './closing-circuit.js';
import type { ClosingCircuit, SeriesBranch } from './closing-parts.js';
import { closedFormInrush } from './inrush.js';

const OMEGA = 2 * Math.PI * 50;
const site = { nominalV: 400, frequencyHz: 50 };

// 50 kvar at 400 V, with p of its reactance in front and X/R of that.
function stage(reactorPct: number, quality = Number.POSITIVE_INFINITY, kvar = 50): SeriesBranch {
  const capacitiveOhm = 400 ** 2 / (kvar * 1000);
  const inductiveOhm = (reactorPct / 100) * capacitiveOhm;
  return {
    rOhm: inductiveOhm / quality,
    inductanceH: inductiveOhm / OMEGA,
    capacitanceF: 1 / (OMEGA * capacitiveOhm),
  };
}

function circuit(parts: Partial<ClosingCircuit> & { supplyOhm?: number }): ClosingCircuit {
  const { supplyOhm = 0.01, ...rest } = parts;
  return {
    sourceOhm: 0,
    sourceH: supplyOhm / OMEGA,
    connected: [],
    closing: stage(0),
    crestV: (Math.SQRT2 * 400) / Math.sqrt(3),
    frequencyHz: 50,
    ...rest,
  };
}

describe('closing one stage onto the supply without any resistance', () => {
  // The steady current Î = V̂/(X_C − X_L) and a natural one of up to n·Î, n = √(X_C/X_L), add at the worst instant:
  // (n + 1)·Î = closed form · n/(n − 1).
  it.each([0, 5.67, 7, 14])('comes to closed form · n/(n − 1) and never beyond, %s %% reactor', (reactorPct) => {
    const closing = stage(reactorPct);
    const ohm = { c: 3.2, l: 0.01 + (reactorPct / 100) * 3.2 };
    const { peakA } = closingPeak(circuit({ closing }));
    const n = Math.sqrt(ohm.c / ohm.l);
    const most = (closedFormInrush(ohm.c, ohm.l, site).peakA * n) / (n - 1);
    expect(peakA).toBeLessThan(most * (1 + 1e-9));
    expect(peakA).toBeGreaterThan(most * 0.99);
  });

  // Resistances take part of what the supply adds, at the customary quality of 30 not all of it.
  it.each([5.67, 7, 12.5, 14])('control: the closed form is no upper bound with a reactor of %s %%', (reactorPct) => {
    const closed = closedFormInrush(3.2, 0.01 + (reactorPct / 100) * 3.2, site).peakA;
    expect(closingPeak(circuit({ closing: stage(reactorPct, 30) })).peakA).toBeGreaterThan(1.08 * closed);
  });

  it('control: nor where a plain stage is closed onto others behind a supply', () => {
    const onto = { ...stage(0), inductanceH: 2e-6 };
    const closed = closedFormInrush(3.2 + 3.2 / 4, OMEGA * 2e-6, site).peakA;
    const { peakA } = closingPeak(circuit({ connected: [stage(0, undefined, 200)], closing: onto }));
    expect(peakA).toBeGreaterThan(closed);
  });
});

describe('the exact peak', () => {
  const mixed = circuit({
    sourceOhm: 0.002,
    connected: [stage(7, 30, 100), stage(0, 1, 25), stage(14, 10)],
    closing: { ...stage(7, 30), inductanceH: stage(7).inductanceH + 2e-6 },
  });

  it('doubles with the voltage', () => {
    expect(closingPeak({ ...mixed, crestV: 2 * mixed.crestV }).peakA / closingPeak(mixed).peakA).toBeCloseTo(2, 9);
  });

  it('is the same whether equal stages stand apart or as one', () => {
    const apart = { ...mixed, connected: [stage(7, 30, 50), stage(7, 30, 50), stage(0, 1, 25), stage(14, 10)] };
    expect(closingPeak(apart).peakA / closingPeak(mixed).peakA).toBeCloseTo(1, 9);
  });

  it('is the same at 60 Hz where every coil and capacitor is smaller by that much', () => {
    const branch = ({ rOhm, inductanceH, capacitanceF }: SeriesBranch): SeriesBranch => ({
      rOhm,
      inductanceH: inductanceH / 1.2,
      capacitanceF: capacitanceF / 1.2,
    });
    const at60: ClosingCircuit = {
      ...mixed,
      frequencyHz: 60,
      sourceH: mixed.sourceH / 1.2,
      connected: mixed.connected.map(branch),
      closing: branch(mixed.closing),
    };
    expect(closingPeak(at60).peakA / closingPeak(mixed).peakA).toBeCloseTo(1, 9);
  });

  it('is finite and not below the steady crest for parts a million times apart', () => {
    for (const kvar of [0.01, 1, 100, 10_000]) {
      for (const supplyOhm of [1e-5, 1e-3, 0.1]) {
        for (const connected of [[], [stage(0)], [stage(7, 30)], [stage(7, 30), stage(0, 1, 1)]]) {
          const closing = stage(7, 30, kvar);
          const { peakA } = closingPeak(circuit({ supplyOhm, sourceOhm: supplyOhm / 10, connected, closing }));
          expect(Number.isFinite(peakA)).toBe(true);
          const steadyA = (Math.SQRT2 * 400) / Math.sqrt(3) / (((0.93 * 400 ** 2) / kvar) * 1e-3 + 10 * supplyOhm);
          expect(peakA).toBeGreaterThan(steadyA);
        }
      }
    }
  });
});
