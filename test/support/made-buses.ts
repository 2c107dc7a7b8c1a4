import type { NetworkInput, Site, StageGroupInput } from '#libs/engine/index.js';
import type { Chance } from './chance.js';
import { madeSite } from './made-site.js';

const SIZES_KVAR = [5, 12.5, 25, 50, 100];
const RATIOS_PCT = [0, 5.67, 7, 12.5, 14];

/** Names of chance's buses; not the plainest. */
export function madeBusNames(count: number): string[] {
  return Array.from({ length: count }, (_, k) => (k % 2 === 0 ? `board ${k + 1}` : `MCC-${k + 1} "old"`));
}

/**
 * A site of chance with a network of 1 to 8 buses: radial or ringed by cables, couplers open, closed or either,
 * generators, motors, resistive loads, 0 to 3 sets of capacitors and a further bank besides the bank, transformers in parallel or each on
 * its own bus. It always stands: every bus has a way to the supply.
 * @param random where the numbers come from
 * @returns the site, its distorting loads and background not given
 */
export function madeBuses(random: Chance): Site {
  const nominalV = random.oneOf([400, 480, 690]);
  const names = madeBusNames(random.whole(1, 8));
  const max = random.between(15, 400);
  const count = random.whole(0, 3);
  const transformers = Array.from({ length: count }, () => ({
    bus: random.oneOf(names),
    ratedKva: random.oneOf([400, 630, 1000, 1600]),
    impedancePct: random.between(4, 7),
    impedanceTolerancePct: random.oneOf([0, 7.5, 10]),
    // Coils without resistance side by side leave a simulator's direct-current start without an answer.
    loadLossKw: count === 1 && random.next() < 0.3 ? 0 : random.between(2, 12),
  }));
  const fed = new Set(transformers.length > 0 ? transformers.map(({ bus }) => bus) : names.slice(0, 1));
  const motorKw = random.oneOf([0, 50, 300]);
  return madeSite({
    frequencyHz: random.oneOf([50, 60]),
    bus: { nominalV },
    supply: {
      faultLevelMva: { max, min: max * random.between(0.4, 1) },
      rOverX: random.oneOf([0.05, 0.1, 0.4]),
      resistanceExponent: random.oneOf([0, 0.5, 1]),
      arrangement: 'parallel',
      transformers,
    },
    network: madeNetworkInput(random, { names, fed, nominalV, transformers: transformers.length }),
    loads: {
      motorSharePct: random.oneOf([0, 60, 100]),
      distorting: [],
      backgroundPct: [],
      dampingKw: { max: motorKw, min: motorKw * random.oneOf([0, 0.4]) },
    },
    bank: { stages: Array.from({ length: random.whole(1, 2) }, () => madeStages(random, nominalV)), interStageUh: 2 },
  });
}

function madeStages(random: Chance, nominalV: number): StageGroupInput {
  return {
    count: random.whole(1, 3),
    ratedKvar: random.oneOf(SIZES_KVAR),
    ratedV: nominalV * random.oneOf([1, 1.2, 1.31]),
    reactorPct: random.oneOf(RATIOS_PCT),
    reactorQuality: random.oneOf([10, 30, 80]),
  };
}

interface Around {
  names: string[];
  /** buses with a transformer, or the first */
  fed: Set<string>;
  nominalV: number;
  transformers: number;
}

// Only a few parts may stand either way: corners multiply.
function madeNetworkInput(random: Chance, { names, fed, nominalV, transformers }: Around): NetworkInput {
  const at = (): string => random.oneOf(names);
  const { couplers, cables } = madeLinks(random, names, fed);
  const some = <T>(most: number, make: (k: number) => T): T[] =>
    Array.from({ length: random.whole(0, most) }, (_, k) => make(k));
  const eitherGenerator = random.next() < 0.3;
  const switchedSet = random.next() < 0.25;
  return {
    buses: names.map((name) => ({ name })),
    couplers,
    cables,
    generators: some(2, (k) => ({
      bus: at(),
      ratedKva: random.between(100, 900),
      subtransientPct: random.between(9, 20),
      ...(random.next() < 0.5 ? { rOverX: random.between(0.05, 0.3) } : {}),
      state: eitherGenerator && k === 0 ? 'either' : random.oneOf(['off', 'running'] as const),
    })),
    motors: some(3, () => ({ bus: at(), kw: random.between(20, 250) })),
    resistive: some(3, () => ({ bus: at(), kw: random.between(5, 80) })),
    capacitors: some(3, (k) => ({
      ...madeStages(random, nominalV),
      ...(switchedSet && k === 0 ? { count: random.whole(1, 2), switched: true } : {}),
      bus: at(),
    })),
    ...(random.next() < 0.6 ? { bankBus: at() } : {}),
    transformerOut: transformers > 1 && random.next() < 0.4,
    ...(random.next() < 0.2 ? { banks: [{ bus: at(), stages: madeFurtherStages(random, nominalV) }] } : {}),
  };
}

function madeFurtherStages(random: Chance, nominalV: number): StageGroupInput[] {
  const stages = (): StageGroupInput => ({ ...madeStages(random, nominalV), count: random.whole(1, 2) });
  const first = stages();
  return random.next() < 0.5 ? [first] : [first, { ...stages(), fixed: random.next() < 0.3 }];
}

// Every bus after the first hangs from an earlier one, unless it has a transformer and a coupler may stay open.
function madeLinks(
  random: Chance,
  names: string[],
  fed: Set<string>,
): Required<Pick<NetworkInput, 'couplers' | 'cables'>> {
  const links: Required<Pick<NetworkInput, 'couplers' | 'cables'>> = { couplers: [], cables: [] };
  const cable = (between: [string, string]) => ({
    between,
    lengthM: random.between(10, 250),
    resistanceOhmPerKm: random.between(0.05, 0.5),
    reactanceOhmPerKm: random.oneOf([0, 0.08, 0.09]),
    ...(random.next() < 0.4 ? { parallel: random.whole(2, 4) } : {}),
  });
  // Only a first bus with a supply of its own can hold up the others.
  const root = names.find((name) => fed.has(name))!;
  const order = [root, ...names.filter((name) => name !== root)];
  let either = 0;
  for (const [k, name] of order.entries()) {
    if (k === 0) continue;
    const between: [string, string] = [order[random.whole(0, k - 1)]!, name];
    const kind = random.oneOf(fed.has(name) ? ['open', 'closed', 'either', 'cable'] : ['closed', 'cable', 'cable']);
    if (kind === 'cable') links.cables.push(cable(between));
    else {
      const state = kind === 'either' && ++either > 1 ? 'open' : (kind as 'open' | 'closed' | 'either');
      links.couplers.push({ between, state });
    }
  }
  if (names.length > 2 && random.next() < 0.5) {
    const [a, b] = [random.whole(0, names.length - 2), names.length - 1];
    links.cables.push(cable([names[a]!, names[b]!]));
  }
  return links;
}
