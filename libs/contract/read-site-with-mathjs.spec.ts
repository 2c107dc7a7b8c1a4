import { describe, expect, it } from 'vitest';
import { readSiteWithMathjs } from './read-site-with-mathjs.js';

/** An invented site with one quantity in each part that takes one from outside the table of units. */
function siteWith(dampingKw: unknown, ratedKva: unknown = 1000, reconnectDelayS: unknown = 60) {
  return {
    name: 'Invented Mill',
    timeZone: 'Europe/Dublin',
    rules: 'iec',
    frequencyHz: 50,
    bus: { nominalV: 400 },
    meteredAt: 'bus',
    supply: { faultLevelMva: { max: 250 }, transformers: [{ ratedKva, impedancePct: 6 }] },
    loads: { dampingKw: { max: dampingKw } },
    control: { reconnectDelayS },
  };
}

describe('a site read with the unit library behind our own table', () => {
  it('may use units the table does not have', async () => {
    const site = await readSiteWithMathjs(siteWith('100 hp', 1000, '0.5 days'));
    // one mechanical horsepower is 745.69987158227022 W by definition (550 ft·lbf/s); the library carries ten digits of it
    expect(site.loads?.dampingKw?.max).toBeCloseTo(74.569_987_158_227, 7);
    expect(site.control?.reconnectDelayS).toBe(43_200);
  });

  it.each([
    ['a power where an apparent power belongs', siteWith(0, '1000 hp'), /supply\.transformers\[0\]\.ratedKva/],
    ['an apparent power in a product', siteWith('5 VA sec / sec'), /loads\.dampingKw\.max/],
    ['a unit nobody knows', siteWith('5 bananas'), /loads\.dampingKw\.max/],
    ['a length', siteWith('5 ft'), /loads\.dampingKw\.max/],
    ['a complex power', siteWith('5 MVAR h / h'), /loads\.dampingKw\.max/],
    ['a value out of range', siteWith('-5 hp'), /loads\.dampingKw\.max/],
  ])('refuses %s as without it', async (_what, json, path) => {
    await expect(readSiteWithMathjs(json)).rejects.toThrow(path);
  });

  it('leaves the given value as it was', async () => {
    const json = siteWith('100 hp');
    await readSiteWithMathjs(json);
    expect(json.loads.dampingKw.max).toBe('100 hp');
  });
});
