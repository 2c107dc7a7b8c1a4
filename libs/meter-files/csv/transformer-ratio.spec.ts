import { describe, expect, it } from 'vitest';
import { statedRatios } from './transformer-ratio.js';

describe('a transformer ratio stated beside the data', () => {
  it.each([
    ['CT 400/5', [80]],
    ['CT ratio: 400 / 5 A', [80]],
    ['Stromwandler 250/5', [50]],
    ['kWh (multiplier 80)', [80]],
    ['Wandlerfaktor: 12,5', [12.5]],
    ['multiplier 1', []],
  ])('"%s" is %j', (text, ratios) => {
    expect(statedRatios([text])).toEqual(ratios);
  });

  it('multiplies current by voltage transformers', () => {
    expect(statedRatios(['CT;300/5;A', 'VT;20000/100;V'])).toEqual([60, 200, 12_000]);
  });

  it('is not read from dates, columns and other numbers', () => {
    expect(statedRatios(['Report 6/5/2024', 'active power [kW]', 'Contract 400/5', 'transformer 1000 kVA'])).toEqual(
      [],
    );
  });
});
