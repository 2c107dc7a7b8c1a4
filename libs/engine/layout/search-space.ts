import { InputProblem } from '../problem.js';
import type { Bank } from './bank.js';
import type { SettledCatalogue } from './candidates.js';
import type { CatalogueInput, KvarBasis } from './catalogue.js';
import { effectiveKvar, nameplateKvar } from './stage.js';
import { eachStageCount } from './stage-counts.js';

/** A kind of switch a bank may be built with; what it leaves open is the controller's own. */
export interface SwitchKind {
  /** null where neither catalogue nor prices name one */
  kind: string | null;
  /** largest rated stage it may switch [kvar] */
  maxStageKvar: number;
  stepDelayS: number | null;
  reconnectDelayS: number | null;
  limitsInrush: boolean;
}

/** A bank of the search before its switches and set point are chosen. */
export interface Build {
  /** stages of each size, in the order of the catalogue's sizes */
  counts: Int32Array;
  ratedV: number;
  reactorPct: number;
  stages: number;
  /** ΣQ_N [kvar] */
  ratedKvar: number;
  /** largest rated stage [kvar] */
  largestRatedKvar: number;
  /** effective, all stages [kvar] */
  totalKvar: number;
  /** effective [kvar] */
  largestKvar: number;
  /** effective [kvar] */
  smallestKvar: number;
}

/** Everything a search chooses from. */
export interface SearchSpace {
  stageKvar: readonly number[];
  kvarBasis: KvarBasis;
  nominalV: number;
  builds: Build[];
  kinds: SwitchKind[];
  setPoints: number[];
  /** builds × kinds that may switch them × set points */
  candidates: number;
}

/** More candidates than this are refused. */
export const MOST_CANDIDATES = 500_000;

/** What the space of a search is spanned by. */
export interface SpaceBasis {
  catalogue: SettledCatalogue;
  evenSteps: boolean;
  kinds: SwitchKind[];
  setPoints: number[];
  nominalV: number;
  /** the record's greatest kvar at the bus [kvar] */
  greatestKvar: number;
}

/**
 * Every candidate of a catalogue: rated voltage × reactor ratio × switch kind × counts of stages × set point; effective
 * total at most `maxTotalKvar`, or without it no stage more than the record's greatest kvar asks for.
 * @param basis catalogue, kinds, set points and what bounds them
 * @returns the space
 * @throws InputProblem where there are more candidates than can be kept
 * @source method-money
 */
export function searchSpace(basis: SpaceBasis): SearchSpace {
  const { catalogue, kinds, setPoints } = basis;
  const ways = catalogue.ratedV.flatMap((ratedV) => catalogue.reactorPct.map((reactorPct) => ({ ratedV, reactorPct })));
  const builds: Build[] = [];
  let candidates = 0;
  const choice = { ...catalogue, evenSteps: basis.evenSteps };
  eachStageCount(choice, (counts) => {
    for (const way of ways) {
      const build = buildOf(basis, counts, way);
      const fitting = build === null ? 0 : kinds.filter((kind) => mayBuild(build, kind)).length;
      if (build === null || fitting === 0) continue;
      builds.push(build);
      candidates += fitting * setPoints.length;
      if (candidates > MOST_CANDIDATES) throw tooMany();
    }
  });
  const { stageKvar, kvarBasis } = catalogue;
  return { stageKvar, kvarBasis, nominalV: basis.nominalV, builds, kinds, setPoints, candidates };
}

/**
 * May a kind of switch switch every stage of a build.
 * @param build the build
 * @param kind the kind
 * @returns true where no rated stage is over its largest
 * @source method-money
 */
export function mayBuild(build: Build, kind: SwitchKind): boolean {
  return build.largestRatedKvar <= kind.maxStageKvar;
}

function tooMany(): InputProblem {
  return new InputProblem([
    {
      code: 'too-large',
      path: 'catalogue.stageKvar',
      expected: `a catalogue that makes at most ${MOST_CANDIDATES} candidates: fewer sizes, stages, voltages or set points`,
      found: 'more',
    },
  ]);
}

function buildOf(
  basis: SpaceBasis,
  counts: Int32Array,
  { ratedV, reactorPct }: { ratedV: number; reactorPct: number },
): Build | null {
  const { stageKvar, maxTotalKvar, kvarBasis } = basis.catalogue;
  const build = { ratedV, reactorPct, nominalV: basis.nominalV };
  let stages = 0;
  let ratedKvar = 0;
  let totalKvar = 0;
  let largestRatedKvar = 0;
  let largestKvar = 0;
  let smallestKvar = 0;
  for (let size = stageKvar.length - 1; size >= 0; size--) {
    const count = counts[size]!;
    if (count === 0) continue;
    const kvar = nameplateKvar(stageKvar[size]!, build, kvarBasis);
    const effective = effectiveKvar(stageOf(kvar, ratedV, reactorPct), basis.nominalV);
    if (stages === 0) {
      largestRatedKvar = kvar;
      largestKvar = effective;
    }
    stages += count;
    ratedKvar += count * kvar;
    totalKvar += count * effective;
    smallestKvar = effective;
  }
  const fits = maxTotalKvar === null ? totalKvar - smallestKvar < basis.greatestKvar : totalKvar <= maxTotalKvar;
  if (!fits) return null;
  const sums = { stages, ratedKvar, largestRatedKvar, totalKvar, largestKvar, smallestKvar };
  return { counts: counts.slice(), ratedV, reactorPct, ...sums };
}

const REACTOR_QUALITY = 30;

function stageOf(ratedKvar: number, ratedV: number, reactorPct: number): Bank['groups'][number] {
  return {
    count: 1,
    ratedKvar,
    ratedV,
    reactorPct,
    reactorQuality: REACTOR_QUALITY,
    dischargeOhm: null,
    reactorMaxA: null,
    switchPeakA: null,
    fixed: false,
  };
}

/**
 * The bank of a build, largest stages first.
 * @param space sizes, what they say, bus voltage
 * @param build counts, voltage and reactors
 * @param catalogue inductance between stages
 * @param limitsInrush its switches limit inrush
 * @returns the bank
 */
export function bankOfBuild(
  space: Pick<SearchSpace, 'stageKvar' | 'kvarBasis' | 'nominalV'>,
  build: Build,
  catalogue: Pick<SettledCatalogue, 'interStageUh' | 'interStageGiven'>,
  limitsInrush: boolean,
): Bank {
  const { ratedV, reactorPct } = build;
  const way = { ratedV, reactorPct, nominalV: space.nominalV };
  const groups = [...space.stageKvar.entries()]
    .filter(([size]) => build.counts[size]! > 0)
    .map(([size, kvar]) => ({
      ...stageOf(nameplateKvar(kvar, way, space.kvarBasis), ratedV, reactorPct),
      count: build.counts[size]!,
    }))
    .reverse();
  return {
    groups,
    interStageUh: catalogue.interStageUh,
    interStageGiven: catalogue.interStageGiven,
    ambientCategory: null,
    ...(limitsInrush ? { limitsInrush } : {}),
  };
}

/**
 * The kinds of switches a catalogue offers; without any, one kind that asks for nothing.
 * @param input the site's catalogue
 * @param otherwise name of the kind where the catalogue has none
 * @returns kinds in the catalogue's order
 */
export function switchKinds(input: CatalogueInput | undefined, otherwise: string | null): SwitchKind[] {
  const open = { maxStageKvar: Number.POSITIVE_INFINITY, stepDelayS: null, reconnectDelayS: null, limitsInrush: false };
  if (input?.switches === undefined || input.switches.length === 0) return [{ kind: otherwise, ...open }];
  return input.switches.map((entry) => ({ ...entry, limitsInrush: entry.limitsInrush ?? false }));
}
