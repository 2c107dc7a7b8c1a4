import { describe, expect, it } from 'vitest';
import { fieldDifferences } from './field-differences.js';

describe('two documents compared field by field', () => {
  it('differ in nothing where they are equal, whatever the order of their keys', () => {
    const one = { a: 1, b: [{ c: 'x', d: null }] };
    expect(fieldDifferences(one, { b: [{ d: null, c: 'x' }], a: 1 })).toEqual([]);
  });

  it('name each leaf by its path', () => {
    const before = { supply: { transformers: [{ ratedKva: 630 }] }, name: 'Mill', old: true };
    const after = { supply: { transformers: [{ ratedKva: 1000 }, { ratedKva: 400 }] }, name: 'Mill', target: null };
    expect(fieldDifferences(before, after)).toEqual([
      { path: 'supply.transformers[0].ratedKva', before: 630, after: 1000 },
      { path: 'supply.transformers[1]', before: undefined, after: { ratedKva: 400 } },
      { path: 'old', before: true, after: undefined },
      { path: 'target', before: undefined, after: null },
    ]);
  });

  it('count the last bit of a number, and a value of another kind', () => {
    expect(fieldDifferences({ a: 0.3 }, { a: 0.1 + 0.2 })).toHaveLength(1);
    expect(fieldDifferences({ a: [1] }, { a: { 0: 1 } })).toHaveLength(1);
    expect(fieldDifferences({ a: '1' }, { a: 1 })).toHaveLength(1);
  });
});
