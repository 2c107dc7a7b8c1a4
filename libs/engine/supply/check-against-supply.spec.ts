// The thresholds, 1.2 times and 2 % of the rating, are common practice.
import { describe, expect, it } from 'vitest';
import { checkAgainstSupply } from './check-against-supply.js';

const transformer = { ratedKva: 500, impedancePct: 4 };
const checked = (maxKva: number, transformers = [transformer, transformer]) =>
  checkAgainstSupply({ maxKva }, { supply: { transformers } });

describe('a record held against its transformers', () => {
  it('is plausible from 2 % to 1.2 times the sum of the ratings', () => {
    expect(checked(20)).toEqual([]);
    expect(checked(600)).toEqual([]);
    expect(checked(1200)).toEqual([]);
  });

  it.each([
    [1201, 2, 'energies of half-hours taken for hours'],
    [2500, 4, 'energies of quarters taken for hours'],
    [400_000, 1000, 'W taken for kW'],
  ])('of %d kVA is above them; a factor of %d would explain it: %s', (maxKva, factor) => {
    expect(checked(maxKva)).toMatchObject([{ code: 'record.aboveRating', values: { maxKva, ratedKva: 1000, factor } }]);
  });

  it('is far below them, by a thousand or by a multiplier that no one names', () => {
    expect(checked(0.6)).toMatchObject([{ code: 'record.farBelowRating', values: { factor: 1000, ratedPct: 0.06 } }]);
    const [found] = checked(15);
    expect(found).toMatchObject({ code: 'record.farBelowRating' });
    expect(found!.values).not.toHaveProperty('factor');
  });

  it('says nothing where there is no transformer or no load', () => {
    expect(checkAgainstSupply({ maxKva: 900 }, { supply: {} })).toEqual([]);
    expect(checked(0)).toEqual([]);
  });
});
