/** The site every new installation shows: of our own invention, and its name says so. */
export const DEMO_SITE = {
  name: 'Merrowick Extrusion, hall 2 (example)',
  timeZone: 'Europe/Dublin',
  currency: 'EUR',
  rules: 'iec',
  frequencyHz: 50,
  bus: { nominalV: 400, highestV: 424 },
  meteredAt: 'bus',
  recordedBank: { state: 'none' },
  target: { powerFactor: 0.95 },
  supply: {
    faultLevelMva: { max: 250, min: 180 },
    transformers: [
      {
        ratedKva: 1000,
        impedancePct: 6,
        impedanceTolerancePct: 10,
        loadLossKw: 10.5,
        noLoadLossKw: 1.7,
        noLoadCurrentPct: 1.2,
      },
    ],
  },
  loads: {
    distorting: [{ name: 'extruder drives', fundamentalA: 320, spectrum: 'six-pulse-choke' }],
    backgroundPct: [
      { orderH: 5, pct: 1 },
      { orderH: 7, pct: 0.7 },
    ],
  },
  // The bank a quotation offered: the same kvar without reactors, for "assess" to judge.
  bank: {
    stages: [
      { count: 1, ratedKvar: 25, ratedV: 440 },
      { count: 3, ratedKvar: 50, ratedV: 440 },
    ],
  },
  catalogue: { stageKvar: [12.5, 25, 50], reactorPct: [0, 7], maxStages: 10 },
};
