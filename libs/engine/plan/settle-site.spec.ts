import { describe, expect, it } from 'vitest';
import { createLoadRecord } from '../record/load-record.js';
import { settleSite } from './settle-site.js';
import type { Site } from './site.js';

const bare: Site = {
  name: 'bare',
  timeZone: 'UTC',
  rules: 'iec',
  frequencyHz: 50,
  bus: { nominalV: 400 },
  supply: { faultLevelMva: { max: 100 } },
};

const record = (kw: number[]) =>
  createLoadRecord({
    intervalS: 900,
    beginS: Float64Array.from(kw, (_, i) => i * 900),
    activeKw: Float64Array.from(kw),
    laggingKvar: new Float64Array(kw.length),
    leadingKvar: new Float64Array(kw.length),
  });

describe('a site with next to nothing given', () => {
  const { site, assumptions } = settleSite(bare, record([100, 300]));

  it('takes the defaults of the method', () => {
    expect(site).toMatchObject({
      meteredAt: 'bus',
      recordedBank: { state: 'none' },
      targetPowerFactor: 0.95,
      onExport: 'importOnly',
      emcClass: 2,
      asOf: null,
      currency: null,
    });
    expect(site.highestV).toBeCloseTo(440, 9);
    expect(site.supply).toMatchObject({ faultLevelMva: { max: 100, min: 100 }, rOverX: 0.1, resistanceExponent: 0.5 });
    expect(site.loads).toEqual({
      motorSharePct: 60,
      distorting: null,
      backgroundPct: null,
      dampingKw: { max: 200, min: 0 },
      summation: 'exponent',
    });
  });

  it('says so, one line each', () => {
    expect(assumptions.map(({ code }) => code).sort()).toEqual([
      'default.bus.highestV',
      'default.limits.emcClass',
      'default.loads.dampingKw.max',
      'default.loads.dampingKw.min',
      'default.loads.motorSharePct',
      'default.loads.summation',
      'default.recordedBank',
      'default.supply.faultLevelMva.min',
      'default.supply.rOverX',
      'default.supply.resistanceExponent',
      'default.target.onExport',
      'default.target.powerFactor',
      'supply.noTransformer',
    ]);
  });

  it('by the other rules goes to 1.058 of nominal, and has no class of environment', () => {
    const settled = settleSite({ ...bare, rules: 'ieee', bus: { nominalV: 480 } }, record([1]));
    expect(settled.site.highestV).toBeCloseTo(507.84, 9);
    expect(settled.assumptions.some(({ code }) => code === 'default.limits.emcClass')).toBe(false);
  });

  it('is damped by what the network lists and not by the record’s mean as well, and says that', () => {
    const dampingOf = (motors: { bus: string; kw: number }[]) => {
      const settled = settleSite({ ...bare, network: { buses: [{ name: 'A' }], motors } }, record([200, 200]));
      const codes = settled.assumptions.map(({ code }) => code).filter((code) => /damping.*(max|Listed)/.test(code));
      return { maxKw: settled.site.loads.dampingKw.max, codes };
    };
    expect(dampingOf([{ bus: 'A', kw: 120 }])).toEqual({ maxKw: 0, codes: ['loads.dampingListed'] });
    expect(dampingOf([])).toEqual({ maxKw: 200, codes: ['default.loads.dampingKw.max'] });
  });

  it('is damped by nothing where there is no record, or none but export', () => {
    expect(settleSite(bare, null).site.loads.dampingKw.max).toBe(0);
    expect(settleSite(bare, record([-100, -50])).site.loads.dampingKw.max).toBe(0);
  });

  it('keeps a least damping above the mean', () => {
    const { loads } = settleSite({ ...bare, loads: { dampingKw: { min: 500 } } }, record([100])).site;
    expect(loads.dampingKw).toEqual({ max: 500, min: 500 });
  });
});

describe('a transformer', () => {
  const site: Site = {
    ...bare,
    meteredAt: 'bus',
    supply: {
      faultLevelMva: { max: 100 },
      arrangement: 'parallel',
      transformers: [{ ratedKva: 630, impedancePct: 4 }],
    },
  };

  it('has 10 % tolerance and no losses unless they are given, each with its own path', () => {
    const settled = settleSite(site, null);
    expect(settled.site.supply.transformers[0]).toMatchObject({ impedanceTolerancePct: 10, loadLossKw: 0 });
    const line = settled.assumptions.find(({ path }) => path === 'supply.transformers[0].impedanceTolerancePct')!;
    expect(line).toMatchObject({ code: 'default.supply.transformers.impedanceTolerancePct', values: { value: 10 } });
  });
});

describe('a declared absence', () => {
  it('is a line of its own, and not unknown', () => {
    const { site, assumptions } = settleSite({ ...bare, loads: { distorting: [], backgroundPct: [] } }, null);
    expect(site.loads).toMatchObject({ distorting: [], backgroundPct: [] });
    const codes = assumptions.map(({ code }) => code);
    expect(codes).toContain('loads.distorting.none');
    expect(codes).toContain('loads.backgroundPct.none');
  });

  it('is what a list of loads that are all off comes to; one that runs does not', () => {
    const codesOf = (amperes: number[]) => {
      const distorting = amperes.map((fundamentalA, k) => ({
        name: `${k}`,
        fundamentalA,
        spectrum: 'six-pulse' as const,
      }));
      return settleSite({ ...bare, loads: { distorting } }, null).assumptions.map(({ code }) => code);
    };
    expect(codesOf([0, 0])).toContain('loads.distorting.none');
    expect(codesOf([0, 1])).not.toContain('loads.distorting.none');
  });
});

describe('angles of currents', () => {
  it('are told of where two loads have them, since they may cancel', () => {
    const angled = (name: string) => ({ name, fundamentalA: 9, orders: [{ orderH: 5, pct: 30, angleDeg: 0 }] });
    const codesOf = (names: string[]) =>
      settleSite({ ...bare, loads: { distorting: names.map(angled) } }, null).assumptions.map(({ code }) => code);
    expect(codesOf(['a', 'b'])).toContain('loads.angles');
    expect(codesOf(['a'])).not.toContain('loads.angles');
  });
});
