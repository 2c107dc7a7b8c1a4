import { describe, expect, it } from 'vitest';
import { mergedMap } from './merged-map.js';

describe('two maps', () => {
  it('are one, and what is said now wins', () => {
    const base = { decimal: ',', units: { active: 'W', reactive: 'var' }, columns: { time: 1, active: 2 } } as const;
    const over = { decimal: '.', units: { active: 'kW' }, columns: { active: 3 }, stamp: 'end' } as const;
    expect(mergedMap(base, over)).toEqual({
      decimal: '.',
      units: { active: 'kW', reactive: 'var' },
      columns: { time: 1, active: 3 },
      stamp: 'end',
    });
  });

  it('leave alone what one of them does not mention', () => {
    expect(mergedMap({ units: { active: 'W' } }, { stamp: 'end' })).toEqual({ units: { active: 'W' }, stamp: 'end' });
    expect(mergedMap({}, { units: { active: 'W' } })).toEqual({ units: { active: 'W' } });
  });
});
