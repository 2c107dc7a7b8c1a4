import { couplesAtPrimary } from '../duty/limits-point.js';
import { firmVerdict } from '../duty/quick-judge.js';
import type { Verdict } from '../duty/rules.js';
import type { Bank } from '../layout/bank.js';
import { siteNetwork } from '../network/network-model.js';
import type { Control } from '../operation/control.js';
import type { Remark } from '../problem.js';
import { basisOf, type Judged, overallVerdict } from './judge-basis.js';
import type { SettledSite } from './settled-site.js';

/** A site and bank with one assumption moved. */
interface Moved {
  site: SettledSite;
  bank: Bank;
}

/** An assumption that can be moved: its code, the least and greatest value thought possible, and how it is put in. */
interface Movable {
  code: string;
  range(now: Moved): [number, number];
  put(now: Moved, value: number): Moved;
}

const inSupply = (now: Moved, change: Partial<SettledSite['supply']>): Moved => ({
  ...now,
  site: { ...now.site, supply: { ...now.site.supply, ...change } },
});
const inLoads = (now: Moved, change: Partial<SettledSite['loads']>): Moved => ({
  ...now,
  site: { ...now.site, loads: { ...now.site.loads, ...change } },
});
type Transformers = SettledSite['supply']['transformers'];
const inTransformers = (now: Moved, change: (t: Transformers[number]) => Partial<Transformers[number]>): Moved =>
  inSupply(now, { transformers: now.site.supply.transformers.map((t) => ({ ...t, ...change(t) })) });

/** Values that practice meets; common practice, no source. */
const MOVABLE: readonly Movable[] = [
  {
    code: 'default.supply.rOverX',
    range: () => [0.05, 0.3],
    put: (now, rOverX) => inSupply(now, { rOverX }),
  },
  {
    code: 'default.supply.resistanceExponent',
    range: () => [0, 1],
    put: (now, resistanceExponent) => inSupply(now, { resistanceExponent }),
  },
  {
    code: 'default.supply.faultLevelMva.min',
    range: ({ site }) => [0.5 * site.supply.faultLevelMva.max, site.supply.faultLevelMva.max],
    put: (now, min) => inSupply(now, { faultLevelMva: { ...now.site.supply.faultLevelMva, min } }),
  },
  {
    code: 'default.supply.transformers.impedanceTolerancePct',
    range: () => [0, 10],
    put: (now, impedanceTolerancePct) => inTransformers(now, () => ({ impedanceTolerancePct })),
  },
  {
    code: 'default.supply.transformers.loadLossKw',
    range: () => [0, 1.5],
    put: (now, pct) => inTransformers(now, ({ ratedKva }) => ({ loadLossKw: (pct / 100) * ratedKva })),
  },
  {
    code: 'default.loads.motorSharePct',
    range: () => [20, 90],
    put: (now, motorSharePct) => inLoads(now, { motorSharePct }),
  },
  {
    code: 'default.loads.dampingKw.max',
    range: ({ site }) => [0.3 * site.loads.dampingKw.max, 1.5 * site.loads.dampingKw.max],
    put: (now, max) => inLoads(now, { dampingKw: { ...now.site.loads.dampingKw, max } }),
  },
  {
    code: 'default.bus.highestV',
    range: ({ site }) => [site.nominalV, 1.1 * site.nominalV],
    put: (now, highestV) => ({ ...now, site: { ...now.site, highestV } }),
  },
  {
    code: 'default.bank.stages.reactorQuality',
    range: () => [15, 80],
    put: (now, reactorQuality) => ({
      ...now,
      bank: { ...now.bank, groups: now.bank.groups.map((group) => ({ ...group, reactorQuality })) },
    }),
  },
  {
    code: 'default.bank.interStageUh',
    range: () => [0.5, 5],
    put: (now, interStageUh) => ({ ...now, bank: { ...now.bank, interStageUh } }),
  },
];

/**
 * Puts beside each assumption how far it moves a duty's share of its limit when the assumed value goes to either end of
 * what practice meets, and whether the verdict changes. The duty told of is the one that moves most.
 * @param assumptions lines of the plan
 * @param study site and record
 * @param bank the bank
 * @param control settings
 * @returns the same lines, with effects where one can be computed; the largest first
 * @source method-robustness
 */
export function withEffects(assumptions: readonly Remark[], study: Judged, bank: Bank, control: Control): Remark[] {
  if (bank.groups.length === 0) return [...assumptions];
  const now: Moved = { site: study.site, bank };
  const present = judged(study, control, now);
  const told = assumptions.map((line) => {
    const movable = MOVABLE.find(({ code }) => code === line.code);
    if (movable === undefined) return line;
    const ends = movable.range(now).map((value) => judged(study, control, movable.put(now, value)));
    const changesVerdict = ends.some(({ verdict }) => verdict !== present.verdict);
    return { ...line, effect: { ...mostMoved(present.ratios, ends), changesVerdict } };
  });
  return told
    .map((line, i) => ({ line, i }))
    .sort((a, b) => weight(b.line) - weight(a.line) || a.i - b.i)
    .map(({ line }) => line);
}

function weight({ effect }: Remark): number {
  return effect === null ? -1 : (effect.changesVerdict ? 1e6 : 0) + effect.high - effect.low;
}

interface Weighed {
  verdict: Verdict;
  /** ratio to its limit by duty */
  ratios: Map<string, number>;
}

function mostMoved(
  present: Weighed['ratios'],
  ends: readonly Weighed[],
): { figure: string; low: number; high: number } {
  let most = { figure: '', low: 0, high: 0 };
  for (const [duty, ratio] of present) {
    const reached = [ratio, ...ends.flatMap(({ ratios }) => ratios.get(duty) ?? [])];
    const low = Math.min(...reached);
    const high = Math.max(...reached);
    if (most.figure === '' || high - low > most.high - most.low) most = { figure: `duties.${duty}`, low, high };
  }
  return most;
}

function judged(study: Judged, control: Control, { site, bank }: Moved): Weighed {
  const { supply, loads, nominalV, topology } = site;
  const model = siteNetwork(supply, loads, {
    nominalV,
    loadA: study.model.loadA,
    topology,
    primary: couplesAtPrimary(study.site),
  });
  const basis = { ...basisOf(study, control), voltages: { nominalV, highestV: site.highestV }, supply, loads };
  const found = firmVerdict(model, bank, basis);
  const ratios = new Map<string, number>();
  for (const { name, group, ratio } of found.duties) {
    if (ratio !== null) ratios.set(group === null ? name : `${name}, group ${group + 1}`, ratio);
  }
  return { verdict: overallVerdict(study, found), ratios };
}
