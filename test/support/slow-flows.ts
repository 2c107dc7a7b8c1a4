import { injectedOrders, type SettledSite, type StageGroup } from '#libs/engine/index.js';
import { Complex } from './complex.js';
import { admittanceOfStage, bankAdmittance, busImpedance, type SlowNetwork, sourceImpedance } from './slow-network.js';

/** One corner as the results name it. */
export interface SlowCorner {
  faultLevelMva: number;
  capacitanceFactor: number;
  inductanceFactor: number;
  dampingKw: number;
}

/** Harmonics at one order, from all sources together. */
interface SlowOrder {
  orderH: number;
  busV: number;
  sourceA: number;
  bankA: number;
  /** one stage of each group */
  stageA: number[];
}

/** Harmonics at one level in one corner. */
export interface SlowFlow {
  levelKvar: number;
  counts: number[];
  corner: SlowCorner;
  /** sign of the tolerance on u_k that goes with the corner's fault level; 0 is nominal */
  sign: number;
  orders: SlowOrder[];
  voltageDistortionPct: number;
  currentDistortionPct: number;
}

/** What is judged: the settled site, the bank's groups and the greatest load current. */
export interface SlowBasis {
  site: SettledSite;
  groups: StageGroup[];
  loadA: number;
}

const SQRT3 = Math.sqrt(3);

/**
 * Corners in the order they are described in: nominal, then all combinations, damping fastest.
 * @param basis site
 * @returns corners, each with the sign of the tolerance on u_k
 */
export function slowCorners({ site }: SlowBasis): { corner: SlowCorner; sign: number }[] {
  const { faultLevelMva } = site.supply;
  const { max, min } = site.loads.dampingKw;
  const dampings = [0, min, max].filter((kw, k, all) => all.indexOf(kw) === k);
  const corners = [
    {
      corner: { faultLevelMva: faultLevelMva.max, capacitanceFactor: 1, inductanceFactor: 1, dampingKw: max },
      sign: 0,
    },
  ];
  for (const [level, sign] of [
    [faultLevelMva.max, -1],
    [faultLevelMva.min, 1],
  ] as const) {
    for (const capacitanceFactor of [0.95, 1.1]) {
      for (const inductanceFactor of [0.97, 1.03]) {
        for (const dampingKw of dampings) {
          corners.push({ corner: { faultLevelMva: level, capacitanceFactor, inductanceFactor, dampingKw }, sign });
        }
      }
    }
  }
  return corners;
}

function kvarOf(group: StageGroup, busV: number): number {
  return (group.ratedKvar * (busV / group.ratedV) ** 2) / (1 - group.reactorPct / 100);
}

/**
 * Levels of the bank, each with the counts that make it; a group that is never switched is out at level 0 alone.
 * @param basis bank and bus
 * @returns levels ascending
 */
export function slowLevels({ site, groups }: SlowBasis): { levelKvar: number; counts: number[][] }[] {
  let all: number[][] = [[]];
  for (const group of groups) {
    const choices = group.fixed ? [group.count] : Array.from({ length: group.count + 1 }, (_, n) => n);
    all = all.flatMap((counts) => choices.map((n) => [...counts, n]));
  }
  if (groups.some((group) => group.fixed)) all.push(groups.map(() => 0));
  const kvar = (counts: number[]): number =>
    counts.reduce((sum, n, g) => sum + n * kvarOf(groups[g]!, site.nominalV), 0);
  const levels: { levelKvar: number; counts: number[][] }[] = [];
  for (const counts of all.sort((a, b) => kvar(a) - kvar(b))) {
    const last = levels[levels.length - 1];
    if (last !== undefined && kvar(counts) - last.levelKvar <= 1e-6) last.counts.push(counts);
    else levels.push({ levelKvar: kvar(counts), counts: [counts] });
  }
  const stages = (counts: number[]): number => counts.reduce((sum, n) => sum + n, 0);
  const first = (a: number[], b: number[]): number => {
    const at = a.findIndex((n, g) => n !== b[g]);
    return at < 0 ? 0 : a[at]! - b[at]!;
  };
  for (const level of levels) level.counts.sort((a, b) => stages(a) - stages(b) || first(a, b));
  return levels;
}

function networkOf(basis: SlowBasis, at: { corner: SlowCorner; sign: number }, counts: number[]): SlowNetwork {
  const { site, groups } = basis;
  return {
    nominalV: site.nominalV,
    faultLevelMva: at.corner.faultLevelMva,
    rOverX: site.supply.rOverX,
    exponent: site.supply.resistanceExponent,
    transformers: site.supply.transformers.map((t) => ({
      ratedKva: t.ratedKva,
      loadLossKw: t.loadLossKw,
      impedancePct: t.impedancePct * (1 + (at.sign * t.impedanceTolerancePct) / 100),
    })),
    motorSharePct: site.loads.motorSharePct,
    dampingKw: at.corner.dampingKw,
    capacitanceFactor: at.corner.capacitanceFactor,
    inductanceFactor: at.corner.inductanceFactor,
    stages: groups.map((stage, g) => ({ stage, count: counts[g]! })),
  };
}

/**
 * Every flow: each load alone and the background alone, magnitudes combined last.
 * @param basis site, bank, load current
 * @returns flows by level, corner, counts
 */
export function slowFlows(basis: SlowBasis): SlowFlow[] {
  const corners = slowCorners(basis);
  return slowLevels(basis).flatMap(({ levelKvar, counts }) =>
    corners.flatMap((at) =>
      counts.map((count) => flowOf(basis, networkOf(basis, at, count), { ...at, levelKvar, counts: count })),
    ),
  );
}

/** What one source alone makes. */
type Alone = Omit<SlowOrder, 'orderH'>;

// Every load alone, then the background alone.
function eachAlone(site: SettledSite, network: SlowNetwork, orderH: number): Alone[] {
  const z = busImpedance(network, orderH);
  const zs = sourceImpedance(network, orderH);
  const yb = bankAdmittance(network, orderH);
  const made = (v: Complex, source: Complex): Alone => ({
    busV: v.size,
    sourceA: source.size,
    bankA: v.times(yb).size,
    stageA: network.stages.map(({ stage }) => v.size * admittanceOfStage(network, stage, orderH).size),
  });
  const injectedA = (site.loads.distorting ?? []).flatMap((load) =>
    injectedOrders(load)
      .filter((order) => order.orderH === orderH)
      .map(({ pct }) => (load.fundamentalA * pct) / 100),
  );
  const behindV = (site.loads.backgroundPct ?? [])
    .filter((order) => order.orderH === orderH)
    .map(({ pct }) => ((pct / 100) * site.nominalV) / SQRT3);
  return [
    ...injectedA.map((amperes) => made(z.times(amperes), z.times(amperes).over(zs))),
    ...behindV.map((volts) => {
      const v = z.times(volts).over(zs);
      return made(v, new Complex(volts).minus(v).over(zs));
    }),
  ];
}

function orderOf({ site, groups }: SlowBasis, network: SlowNetwork, orderH: number): SlowOrder {
  const alone = eachAlone(site, network, orderH);
  const few = orderH <= 10 ? 1.4 : 2;
  const alpha = site.loads.summation === 'arithmetic' || orderH < 5 ? 1 : few;
  const combined = (pick: (one: Alone) => number): number =>
    alone.reduce((sum, one) => sum + pick(one) ** alpha, 0) ** (1 / alpha);
  return {
    orderH,
    busV: combined(({ busV }) => busV),
    sourceA: combined(({ sourceA }) => sourceA),
    bankA: combined(({ bankA }) => bankA),
    stageA: groups.map((_, g) => combined(({ stageA }) => stageA[g]!)),
  };
}

function flowOf(
  basis: SlowBasis,
  network: SlowNetwork,
  place: Pick<SlowFlow, 'levelKvar' | 'counts' | 'corner' | 'sign'>,
): SlowFlow {
  const { site, loadA } = basis;
  const listed = [
    ...(site.loads.distorting ?? []).flatMap(injectedOrders),
    ...(site.loads.backgroundPct ?? []).filter(({ pct }) => pct > 0),
  ];
  const present = [...new Set(listed.map(({ orderH }) => orderH))].sort((a, b) => a - b);
  const orders = present.map((orderH) => orderOf(basis, network, orderH));
  const root = (pick: (order: SlowOrder) => number): number => Math.hypot(...orders.map(pick));
  return {
    ...place,
    orders,
    voltageDistortionPct: (100 * SQRT3 * root(({ busV }) => busV)) / site.nominalV,
    currentDistortionPct: loadA > 0 ? (100 * root(({ sourceA }) => sourceA)) / loadA : 0,
  };
}
