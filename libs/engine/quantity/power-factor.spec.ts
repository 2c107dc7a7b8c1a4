import { describe, expect, it } from 'vitest';
import { energyPowerFactor, tanFromPowerFactor, truePowerFactor } from './power-factor.js';

describe('reactive over active power', () => {
  it.each([
    [1, 0, 'unity needs none'],
    [0.8, 0.75, 'the 3-4-5 triangle'],
    [0.6, 4 / 3, 'the same lying'],
    [Math.SQRT1_2, 1, '45°'],
  ])('at %d is %d: %s', (powerFactor, tan) => {
    expect(tanFromPowerFactor(powerFactor)).toBeCloseTo(tan, 15);
  });
});

describe('energy power factor', () => {
  it.each([
    [4, 3, 0.8, 'lagging'],
    [4, -3, 0.8, 'leading counts by size'],
    [5, 0, 1, 'no reactive energy'],
    [0, 3, null, 'no active energy: none'],
    [0, 0, null, 'nothing at all: none'],
  ])('of %d kWh and %d kvarh is %s: %s', (activeKwh, reactiveKvarh, factor, _why) => {
    expect(energyPowerFactor(activeKwh, reactiveKvarh)).toBe(factor);
  });
});

describe('true power factor', () => {
  it.each([
    [0.95, 0, 0.95, 'without distortion the displacement factor'],
    [1, 75, 0.8, '√(1 + 0.75²) = 1.25'],
  ])('of %d at %d %% is %d: %s', (displacement, distortionPct, factor) => {
    expect(truePowerFactor(displacement, distortionPct)).toBeCloseTo(factor, 15);
  });
});
