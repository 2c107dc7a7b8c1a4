/* Contracted demand with overrun: a public schedule from memory, and common practice worked by hand. */
import { describe, expect, it } from 'vitest';
import type { Clause } from '#libs/engine/index.js';
import { amountsOf, steadyApril } from '../support/priced-meter.js';

/*
 * Spain, demand read by a maximum meter (Real Decreto 1164/2001, article 9.1, from memory): within 85 and 105 % of the
 * contracted power the reading is billed; below, 85 % of the contracted power; above, the reading and twice what lies
 * beyond 105 %. At a price of 1 that is a price of 3 for what lies beyond. Contracted 100 kW.
 */
describe('Spain, contracted power with a maximum meter', () => {
  it.each([
    [60, 85],
    [85, 85],
    [97, 97],
    [105, 105],
    [120, 120 + 2 * 15],
  ])('bills a reading of %f kW as %f', (activeKw, billed) => {
    const clause: Clause = {
      name: 'potencia',
      kind: 'contractedDemand',
      basis: 'kW',
      contracted: 100,
      leastPct: 85,
      tolerancePct: 5,
      pricePerUnit: 1,
      overrunPricePerUnit: 3,
    };
    expect(amountsOf([clause], steadyApril({ activeKwh: 720 * activeKw }))).toEqual({ potencia: billed });
  });
});

/*
 * Common practice elsewhere: the contracted kVA whatever is drawn, and a dearer price for all beyond. 250 kVA at 4.50,
 * overrun at 9.00: 300 kVA are 250 · 4.50 + 50 · 9 = 1 575; 200 kVA are 1 125.
 */
describe('a contracted demand with overrun', () => {
  it.each([
    [300, 1575],
    [200, 1125],
  ])('bills %f kVA as %f', (kva, amount) => {
    const clause: Clause = {
      name: 'contract',
      kind: 'contractedDemand',
      basis: 'kVA',
      contracted: 250,
      pricePerUnit: 4.5,
      overrunPricePerUnit: 9,
    };
    const meter = steadyApril({ activeKwh: 720 * 0.8 * kva, laggingKvarh: 720 * 0.6 * kva });
    expect(amountsOf([clause], meter)).toEqual({ contract: amount });
  });
});
