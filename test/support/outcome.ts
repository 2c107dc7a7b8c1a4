import { zoneTable } from '#libs/contract/time-zone.js';
import {
  assessBank,
  createLoadRecord,
  type LoadRecord,
  type Outcome,
  planBank,
  type Site,
} from '#libs/engine/index.js';
import { putInWords } from '#libs/present/put-in-words.js';
import type { ProposalFrame } from '#libs/proposal/proposal-frame.js';

/** 1 January 2025 00:00 UTC [s]. */
const BEGIN_S = 1_735_689_600;

/** A made-up load; every part has a plain default. */
export interface MadeLoad {
  days?: number;
  intervalS?: number;
  /** mean over the working day [kW] */
  meanKw?: number;
  powerFactor?: number;
  /** of its own generation at noon, exported where the load is less [kW] */
  solarKw?: number;
  /** share of the slots left out, 0 … 1 */
  missingShare?: number;
  seed?: number;
}

/**
 * A pseudo-random number generator of 32 bits (a linear congruence), the same everywhere.
 * @param seed whole number
 * @returns numbers in 0 … 1
 */
export function seeded(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (Math.imul(state, 1_664_525) + 1_013_904_223) >>> 0;
    return state / 2 ** 32;
  };
}

/** A record with working days, nights and week-ends, invented throughout. */
export function madeRecord(load: MadeLoad = {}): LoadRecord {
  const {
    days = 365,
    intervalS = 900,
    meanKw = 240,
    powerFactor = 0.74,
    missingShare = 0,
    seed = 1,
    solarKw = 0,
  } = load;
  const random = seeded(seed);
  const beginS: number[] = [];
  const activeKw: number[] = [];
  const reactiveKvar: number[] = [];
  const tan = Math.sqrt(1 / powerFactor ** 2 - 1);
  const perDay = 86_400 / intervalS;
  for (let slot = 0; slot < days * perDay; slot++) {
    const noise = random();
    if (random() < missingShare && slot > 0) continue;
    const day = Math.floor(slot / perDay);
    const hour = ((slot % perDay) * 24) / perDay;
    const working = day % 7 < 5 && hour >= 6 && hour < 22;
    const level = (working ? 1 - 0.3 * Math.cos((2 * Math.PI * hour) / 8) : 0.15) * (0.85 + 0.3 * noise);
    const season = 1 + 0.15 * Math.cos((2 * Math.PI * day) / 365);
    beginS.push(BEGIN_S + slot * intervalS);
    const solar = solarKw * Math.max(0, Math.sin((Math.PI * (hour - 6)) / 12));
    activeKw.push(Math.round((meanKw * level * season - solar) * 10) / 10);
    reactiveKvar.push(Math.round(meanKw * level * season * tan * (0.9 + 0.2 * random()) * 10) / 10);
  }
  return createLoadRecord({
    intervalS,
    beginS: Float64Array.from(beginS),
    activeKw: Float64Array.from(activeKw),
    laggingKvar: Float64Array.from(reactiveKvar),
    leadingKvar: new Float64Array(beginS.length),
  });
}

/** A made-up site; parts given replace the plain ones. */
export function madeSite(parts: Partial<Site> = {}): Site {
  return {
    name: 'Merrowick Extrusion, hall 2',
    asOf: '2026-01-31',
    timeZone: 'Europe/Dublin',
    currency: 'EUR',
    rules: 'iec',
    frequencyHz: 50,
    bus: { nominalV: 400, highestV: 420 },
    meteredAt: 'bus',
    target: { powerFactor: 0.95 },
    supply: {
      faultLevelMva: { max: 250, min: 180 },
      transformers: [{ ratedKva: 1000, impedancePct: 6, loadLossKw: 10.5, noLoadLossKw: 1.7, noLoadCurrentPct: 1.2 }],
    },
    loads: {
      distorting: [{ name: 'extruder drives', fundamentalA: 320, spectrum: 'six-pulse-choke' }],
      backgroundPct: [{ orderH: 5, pct: 1.5 }],
    },
    ...parts,
  };
}

/** What is judged, when a bank is to be judged rather than designed. */
export const MADE_BANK: Site['bank'] = {
  stages: [
    { count: 2, ratedKvar: 25, ratedV: 480, reactorPct: 7 },
    { count: 6, ratedKvar: 50, ratedV: 480, reactorPct: 7 },
  ],
};

/** The same stages without reactors. */
export const MADE_PLAIN_BANK: Site['bank'] = {
  stages: [
    { count: 2, ratedKvar: 20, ratedV: 440 },
    { count: 6, ratedKvar: 40, ratedV: 440 },
  ],
};

/** The outcome for a made site and load, in words: judged where the site has a bank, designed where it has none. */
export function madeOutcome(parts: Partial<Site> = {}, load: MadeLoad = {}): Outcome {
  const site = madeSite(parts);
  const record = madeRecord(load);
  const zone = zoneTable(site.timeZone, record.firstS, record.endS);
  const outcome = site.bank === undefined ? planBank(site, record, zone) : assessBank(site, record, zone);
  return { ...outcome, result: putInWords(outcome.result) };
}

/** A frame around it; the hash is made up. */
export function madeFrame(parts: Partial<ProposalFrame> = {}): ProposalFrame {
  return {
    number: '2026-014',
    revision: 0,
    state: 'draft, not reviewed',
    preparedBy: null,
    contentHash: '7f3a91c2e05d44b8'.repeat(4),
    engineVersion: '0.1.0',
    ...parts,
  };
}
