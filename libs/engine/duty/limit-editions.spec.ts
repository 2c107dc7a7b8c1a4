import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { chosenCurrentLimits, currentLimits } from './current-limits.js';
import { limitChoice, type OwnLimits, tighter } from './limit-editions.js';
import { chosenVoltageLimits, voltageLimits } from './voltage-limits.js';

const SEED = 20_260_131;
const own: OwnLimits = {
  voltage: [
    { orderH: 5, pct: 4 },
    { orderH: 7, pct: 9 },
  ],
  distortionPct: 5,
};

describe('the limits of a site', () => {
  it('are the rule set’s first edition where none is chosen', () => {
    expect(limitChoice('iec', undefined).edition).toBe('IEC 61000-2-4:2002');
    expect(limitChoice('ieee', {}).edition).toBe('IEEE 519-2022');
  });

  it('of its own tighten an edition and never loosen it', () => {
    const limits = chosenVoltageLimits(400, 2, limitChoice('iec', { own }));
    expect(limits.orderPct(5)).toBe(4); // its own 4 % under the edition's 6 %
    expect(limits.orderPct(7)).toBe(5); // the edition's 5 % under its own 9 %
    expect(limits.orderPct(11)).toBe(3.5); // no row of its own
    expect(limits.distortionPct).toBe(5);
    expect(limits.source).toBe('IEC 61000-2-4:2002 class 2 and the site’s own limits');
  });

  it('of its own stand alone only where that is asked for', () => {
    const limits = chosenVoltageLimits(
      400,
      2,
      limitChoice('iec', { edition: 'own', own: { ...own, name: 'agreement' } }),
    );
    expect([5, 7, 11].map((h) => limits.orderPct(h))).toEqual([4, 9, null]);
    expect(limits.source).toBe('agreement');
  });

  it('leave a total that nobody limits without a limit', () => {
    const choice = limitChoice('iec', { edition: 'own', own: { voltage: own.voltage! } });
    expect(chosenVoltageLimits(400, 2, choice).distortionPct).toBeNull();
  });

  it('of current come from IEEE 519 or from the site, never from an IEC edition', () => {
    expect(chosenCurrentLimits(30, limitChoice('iec', {}))).toBeNull();
    const given = limitChoice('iec', { own: { current: [{ orderH: 5, pct: 6 }], currentDistortionPct: 7 } });
    const limits = chosenCurrentLimits(30, given)!;
    expect([limits.orderPct(5), limits.orderPct(7), limits.totalPct]).toEqual([6, null, 7]);
    const both = chosenCurrentLimits(30, limitChoice('ieee', { own: { current: [{ orderH: 5, pct: 6 }] } }))!;
    expect([both.orderPct(5), both.orderPct(7), both.totalPct]).toEqual([6, 7, 8]);
  });

  it('are never looser with rows of the site’s own than without', () => {
    const row = fc.record({
      orderH: fc.integer({ min: 2, max: 50 }),
      pct: fc.double({ min: 0.01, max: 30, noNaN: true }),
    });
    fc.assert(
      fc.property(fc.array(row, { maxLength: 8 }), fc.constantFrom('iec' as const, 'ieee' as const), (rows, rules) => {
        const choice = limitChoice(rules, { own: { voltage: rows, current: rows } });
        const [plain, tight] = [voltageLimits(rules, 400, 2), chosenVoltageLimits(400, 2, choice)];
        const current = chosenCurrentLimits(30, choice)!;
        for (let h = 2; h <= 50; h++) {
          expect(tight.orderPct(h) ?? Infinity).toBeLessThanOrEqual(plain.orderPct(h) ?? Infinity);
          if (rules === 'ieee') expect(current.orderPct(h)!).toBeLessThanOrEqual(currentLimits(30).orderPct(h)!);
        }
      }),
      { seed: SEED, numRuns: 300 },
    );
  });

  it('would be looser if own rows took the edition’s place (control)', () => {
    const alone = chosenVoltageLimits(400, 2, limitChoice('iec', { edition: 'own', own }));
    expect(alone.orderPct(7)!).toBeGreaterThan(voltageLimits('iec', 400, 2).orderPct(7)!);
  });

  it('take the one that stands where the other is missing', () => {
    expect([tighter(5, null), tighter(undefined, 4), tighter(null, undefined), tighter(5, 4)]).toEqual([5, 4, null, 4]);
  });
});
