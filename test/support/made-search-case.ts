import {
  type CatalogueInput,
  moneyStudy,
  type PriceBook,
  type Site,
  siteSearch,
  studySite,
  UTC_TABLE,
} from '#libs/engine/index.js';
import { type Chance, chance } from './chance.js';
import { driftingLoad, madeRecord } from './made-record.js';
import { madeSite } from './made-site.js';
import { madeTariff } from './made-tariff.js';
import type { SearchCase } from './slow-search.js';

/** How many candidates a case has: a few dozen, or up to two thousand. */
export type SearchSize = 'few' | 'many';

/** A case of many has at most so many candidates. */
export const MOST_RANKED = 2000;

const SIZES: Record<SearchSize, number[][]> = {
  few: [
    [12.5, 25, 50],
    [10, 20],
    [25, 50],
    [20, 50],
  ],
  many: [
    [5, 10, 20, 40],
    [12.5, 25, 50],
    [6.25, 12.5, 25, 50],
    [10, 15, 25],
  ],
};

function madeCatalogue(random: Chance, size: SearchSize): CatalogueInput {
  const contactor = { kind: 'contactor', maxStageKvar: random.oneOf([25, 50]), stepDelayS: 10, reconnectDelayS: 60 };
  const thyristor = { kind: 'thyristor', maxStageKvar: 100, stepDelayS: 0, reconnectDelayS: 0, limitsInrush: true };
  return {
    stageKvar: random.oneOf(SIZES[size]),
    ratedV: random.oneOf([[440], [480], [440, 525]]),
    reactorPct: random.oneOf([[0], [0, 7], [7]]),
    maxStages: size === 'few' ? random.whole(1, 3) : random.whole(4, 8),
    evenSteps: random.next() < 0.6,
    cabinets: [{ name: 'wall', maxKvar: 80, maxStages: 2 }],
    switches: random.oneOf([[contactor], [contactor, thyristor], [thyristor, contactor]]),
    setPoints: random.oneOf([[0.95, 0.98], [0.92, 0.96, 1], [0.97]]),
    mustMeetTarget: random.next() < 0.6,
    interStageUh: random.oneOf([2, 500]),
    ...(random.next() < 0.3 ? { maxTotalKvar: random.between(30, 150) } : {}),
    ...(random.next() < 0.4 ? { kvarBasis: 'effective' as const } : {}),
  };
}

function madePrices(random: Chance): PriceBook {
  const cheap = random.oneOf([0.02, 0.2, 1]);
  return {
    invented: true,
    perKvar: 9 * cheap,
    perStage: 55 * cheap,
    reactors: [{ reactorPct: 7, perKvar: 11.5 * cheap }],
    installationFixed: 700 * cheap,
    fixed: 850 * cheap,
    contingencyPct: 5,
    switches: [
      {
        kind: 'contactor',
        perStage: 38 * cheap,
        perKvar: 0.9 * cheap,
        lifeSwitchings: random.oneOf([20, 500, 150_000]),
      },
      { kind: 'thyristor', perStage: 190 * cheap, lossWPerKvar: 1.5 },
    ],
    cabinets: [{ name: 'wall', price: 640 * cheap }],
    maintenancePerYear: 20 * cheap,
    maintenancePerStage: 14 * cheap,
    lossWPerKvar: { plain: 1.8, reactor: 6.5 },
    lossPricePerKwh: random.oneOf([0.01, 0.11]),
    capacitorLifeYears: random.oneOf([3, 8.5]),
    replacementFactor: 1.25,
  };
}

// Some tariffs ask for nothing but the energies of months, which have bounds of their own.
function chosenTariff(random: Chance, intervalS: number): Site['tariff'] {
  if (random.next() < 0.6) return { ...madeTariff(random, [intervalS]), billed: [] };
  return {
    decimals: 2,
    windows: [{ name: 'day', hours: [[6, 22]] }],
    clauses: [
      {
        name: 'reactive',
        kind: 'kvarhBeyondRatio',
        freeRatio: random.oneOf([0, 0.33, 0.5]),
        pricePerUnit: random.between(0.01, 0.5),
        ...(random.next() < 0.4 ? { windows: ['day'] } : {}),
      },
      {
        name: 'leading',
        kind: 'kvarhBeyondRatio',
        reactive: 'leading',
        freeRatio: 0,
        pricePerUnit: random.between(0, 0.1),
      },
      {
        name: 'by factor',
        kind: 'percent',
        applies: 'all',
        scale: { form: 'ratio', reference: 0.92, belowPct: 60, abovePct: random.oneOf([0, 25]) },
      },
    ],
  };
}

/**
 * A site of no real place with its record, tariff, prices and catalogue.
 * @param seed chooses everything
 * @param size how many candidates
 * @returns the case
 */
export function madeSearchCase(seed: number, size: SearchSize): SearchCase {
  const random = chance(seed);
  const columns = driftingLoad(random, 70, random.between(60, 250), random.between(0.3, 0.9));
  const voltageV = random.next() < 0.2 ? { voltageV: columns.activeKw.map(() => random.between(395, 425)) } : {};
  // Twelve hours an interval make two months; ten minutes let a reconnection delay and the steps' pace count.
  const intervalS = random.oneOf([43_200, 43_200, 600]);
  const loads: Site['loads'] = {
    distorting:
      random.next() < 0.6 ? [] : [{ name: 'drives', fundamentalA: random.between(10, 120), spectrum: 'six-pulse' }],
    backgroundPct: [],
    dampingKw: { max: 0 },
  };
  const ownBank = { stages: [{ count: 2, ratedKvar: 25, ratedV: 480 }], interStageUh: 500, switchKind: 'contactor' };
  const site = madeSite({
    meteredAt: random.oneOf(['bus', 'bus', 'primary']),
    recordedBank: { state: random.oneOf(['none', 'out', 'none', 'unknown']) },
    target: { powerFactor: random.oneOf([0.85, 0.9, 0.95]) },
    loads,
    catalogue: madeCatalogue(random, size),
    prices: madePrices(random),
    finance: {
      horizonYears: random.whole(1, 12),
      discountPct: random.oneOf([0, 8, 15]),
      costGrowthPct: random.oneOf([0, 3]),
    },
    tariff: chosenTariff(random, intervalS),
    control: {
      mode: random.oneOf(['nearestLevel', 'nearestLevel', 'oneByOne']),
      ...(random.next() < 0.2 ? { setPointPowerFactor: 0.97 } : {}),
    },
    ...(random.next() < 0.5 ? { bank: ownBank } : {}),
  });
  const record = madeRecord({ ...columns, ...voltageV, intervalS, firstS: Date.UTC(2024, 10, 10) / 1000 });
  return withinMost({ site, record, zone: UTC_TABLE });
}

// Stages are taken off the longest lists until the candidates are no more than are ranked.
function withinMost({ site, record, zone }: SearchCase): SearchCase {
  const study = studySite(site, record, zone);
  const { candidates } = siteSearch(study, site, moneyStudy(study, site)!).space;
  if (candidates <= MOST_RANKED) return { site, record, zone };
  const catalogue = { ...site.catalogue, maxStages: site.catalogue!.maxStages! - 1 };
  return withinMost({ site: { ...site, catalogue }, record, zone });
}
