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
  catalogue: {
    stageKvar: [12.5, 25, 50],
    reactorPct: [0, 7],
    maxStages: 10,
    switches: [{ kind: 'contactor', maxStageKvar: 75, stepDelayS: 10, reconnectDelayS: 240 }],
    cabinets: [
      { name: 'wall', maxKvar: 150, maxStages: 4 },
      { name: 'floor-standing', maxKvar: 400, maxStages: 10 },
    ],
  },
  // Tariff and prices are invented like the rest, and each says so where it is named.
  tariff: {
    name: 'Industrial supply, kVA and kvarh (invented example)',
    decimals: 2,
    windows: [
      { name: 'day', hours: [[8, 23]] },
      { name: 'night', hours: [[23, 8]] },
    ],
    clauses: [
      { name: 'standing charge', kind: 'fixed', amountPerMonth: 165 },
      { name: 'energy', kind: 'energy', prices: { day: 0.148, night: 0.094 } },
      { name: 'maximum demand', kind: 'demand', basis: 'kVA', pricePerUnit: 3.1 },
      { name: 'reactive energy', kind: 'kvarhBeyondRatio', freeRatio: 0.33, pricePerUnit: 0.006 },
    ],
  },
  prices: {
    name: 'Invented prices of the example',
    invented: true,
    currency: 'EUR',
    validFrom: '2026-01-01',
    validTo: '2026-12-31',
    perKvar: 9,
    perStage: 55,
    reactors: [{ reactorPct: 7, perKvar: 11.5 }],
    installationFixed: 700,
    installationPerKvar: 2.2,
    fixed: 850,
    contingencyPct: 5,
    switches: [{ kind: 'contactor', perStage: 38, perKvar: 0.9, lifeSwitchings: 150_000 }],
    cabinets: [
      { name: 'wall', price: 640 },
      { name: 'floor-standing', price: 1450 },
    ],
    maintenancePerYear: 120,
    maintenancePerStage: 14,
    lossWPerKvar: { plain: 1.8, reactor: 6.5 },
    lossPricePerKwh: 0.121,
    capacitorLifeYears: 8.5,
    replacementFactor: 1.25,
  },
};
