import { describe, expect, it } from 'vitest';
import { stepsOf, valueAt, withValueAt } from './document-path.js';

const DOCUMENT = {
  supply: { transformers: [{ ratedKva: 1000 }, { ratedKva: 630 }] },
  loads: { dampingKw: { max: 5 } },
};

describe('a path of the site file', () => {
  it('is names and places in lists, as refusals write them', () => {
    expect(stepsOf('supply.transformers[1].ratedKva')).toEqual(['supply', 'transformers', 1, 'ratedKva']);
  });

  it('leads to a value, or to nothing where a part of it is not there', () => {
    expect(valueAt(DOCUMENT, 'supply.transformers[1].ratedKva')).toBe(630);
    expect(valueAt(DOCUMENT, 'bank.stages[0].count')).toBeUndefined();
  });

  it('takes another value without touching the document it was given', () => {
    const changed = withValueAt(DOCUMENT, 'supply.transformers[1].ratedKva', 800);
    expect(valueAt(changed, 'supply.transformers[1].ratedKva')).toBe(800);
    expect(DOCUMENT.supply.transformers[1]!.ratedKva).toBe(630);
    expect(changed.loads).toBe(DOCUMENT.loads);
  });

  it('makes the parts that are missing, and takes away what it leaves empty', () => {
    expect(withValueAt({}, 'bank.stages[0].count', 2)).toEqual({ bank: { stages: [{ count: 2 }] } });
    expect(withValueAt(DOCUMENT, 'loads.dampingKw.max', undefined)).toEqual({ supply: DOCUMENT.supply });
  });
});
