import type { Site } from '#libs/engine/index.js';

/**
 * A site of no real place: a 400 V bus behind one 1 000 kVA transformer, metered at the bus, declared free of distortion.
 * @param parts whatever the test is about
 * @returns the site
 */
export function madeSite(parts: Partial<Site> = {}): Site {
  return {
    name: 'Made-up works',
    timeZone: 'UTC',
    rules: 'iec',
    frequencyHz: 50,
    bus: { nominalV: 400, highestV: 420 },
    meteredAt: 'bus',
    recordedBank: { state: 'none' },
    supply: {
      faultLevelMva: { max: 250, min: 180 },
      transformers: [{ ratedKva: 1000, impedancePct: 6, loadLossKw: 10.5, noLoadLossKw: 1.7, noLoadCurrentPct: 1.2 }],
    },
    loads: { distorting: [], backgroundPct: [] },
    ...parts,
  };
}
