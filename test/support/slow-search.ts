import {
  assessBank,
  type CatalogueInput,
  type LoadRecord,
  type Outcome,
  planBank,
  type Site,
  type StageGroupInput,
  type ZoneTable,
} from '#libs/engine/index.js';

/*
 * The search done the long way: every candidate of the stated set listed, each judged and priced by `assessBank` as the
 * site's own bank, then sorted by the written order. Nothing is bounded, shared or left out.
 */

/** A site with its record and zone. */
export interface SearchCase {
  site: Site;
  record: LoadRecord;
  zone: ZoneTable;
}

type Verdict = 'clear' | 'watch' | 'avoid';

/** A candidate as it came out. */
export interface SlowSearched {
  stages: number[];
  ratedV: number;
  reactorPct: number;
  kind: number;
  setPoint: number;
  verdict: Verdict;
  targetMet: boolean;
  npv: number;
  capital: number;
  switchings: number;
}

/** What trying everything finds. */
export interface SlowSearch {
  candidates: SlowSearched[];
  best: SlowSearched | null;
  recommended: 'do nothing' | "keep today's bank" | 'new bank';
}

const sum = (list: readonly number[]): number => list.reduce((total, one) => total + one, 0);
const byValue = (a: number, b: number): number => a - b;

/**
 * Every choice of 1 to `most` sizes, largest first.
 * @param sizes ascending
 * @param most stages
 * @returns lists of stages
 */
function stageLists(sizes: readonly number[], most: number): number[][] {
  const lists: number[][] = [];
  const grow = (list: number[]): void => {
    if (list.length > 0) lists.push(list);
    if (list.length === most) return;
    for (const size of sizes) if (list.length === 0 || size <= list[list.length - 1]!) grow([...list, size]);
  };
  grow([]);
  return lists;
}

function isEven(stages: readonly number[]): boolean {
  let levels = [0];
  for (const stage of stages) levels = [...new Set([...levels, ...levels.map((level) => level + stage)])];
  levels.sort(byValue);
  return levels.every((level, k) => k === 0 || level - levels[k - 1]! <= Math.min(...stages) * (1 + 1e-9));
}

function groupsOf(stages: readonly number[], ratedV: number, reactorPct: number): StageGroupInput[] {
  return [...new Set(stages)].map((ratedKvar) => ({
    count: stages.filter((stage) => stage === ratedKvar).length,
    ratedKvar,
    ratedV,
    reactorPct,
  }));
}

const isOnTarget = ({ result }: Outcome): boolean =>
  result.operation.months.every(
    ({ powerFactorLagging }) =>
      powerFactorLagging === null || powerFactorLagging >= result.requirement.targetPowerFactor - 1e-12,
  );

const OPEN_REASONS = [
  'peak.near',
  'plain.distortingShare',
  'network.unknownLoads',
  'network.unknownBackground',
  'recordedBank.unknown',
  'supply.weakerThanLoad',
];

/** The verdict read off the rows again, without inrush where the switches limit it. */
export function verdictOf({ result }: Outcome, limitsInrush: boolean): Verdict {
  const rows = result.duties.filter(({ name }) => !(limitsInrush && name.startsWith('inrush')));
  const given = rows.map(({ verdict }) => verdict);
  if (given.includes('avoid')) return 'avoid';
  const open = result.reasons.some(({ code }) => OPEN_REASONS.includes(code));
  return open || given.includes('watch') ? 'watch' : 'clear';
}

function setPointsOf({ site }: SearchCase, catalogue: CatalogueInput): number[] {
  const target = site.target?.powerFactor ?? 0.95;
  if (site.control?.setPointPowerFactor !== undefined) return [site.control.setPointPowerFactor];
  if (catalogue.setPoints !== undefined) return [...new Set(catalogue.setPoints)].sort(byValue);
  const hundredths = Array.from({ length: 100 }, (_, k) => Math.round(1e6 * (target + 0.01 * k)) / 1e6);
  return [...hundredths.filter((point) => point < 1), 1];
}

/** Output at the bus of a stage of 1 kvar: U²/(X_C − X_L), X_C = U_N²/1 kvar. */
function effectiveOfOne(ratedV: number, reactorPct: number, nominalV: number): number {
  const capacitiveOhm = ratedV ** 2 / 1000;
  const inductiveOhm = capacitiveOhm * (reactorPct / 100);
  return nominalV ** 2 / (capacitiveOhm - inductiveOhm) / 1000;
}

interface Way {
  stages: number[];
  ratedV: number;
  reactorPct: number;
  kind: number;
  setPoint: number;
}

// every entry of the first list with every entry of the second
function paired<A, B>(some: readonly A[], others: readonly B[]): [A, B][] {
  return some.flatMap((one) => others.map((other): [A, B] => [one, other]));
}

function ways(made: SearchCase, catalogue: CatalogueInput): Way[] {
  const lists = stageLists(catalogue.stageKvar!, catalogue.maxStages!);
  const allowed = lists.filter((list) => catalogue.evenSteps === false || isEven(list));
  const kinds = (catalogue.switches ?? [{ maxStageKvar: Number.POSITIVE_INFINITY }]).entries();
  const electrical = paired(catalogue.ratedV!, catalogue.reactorPct!);
  const controlled = paired([...kinds], setPointsOf(made, catalogue));
  return paired(allowed, paired(electrical, controlled)).flatMap(
    ([listed, [[ratedV, reactorPct], [[kind, { maxStageKvar }], setPoint]]]) => {
      // ordered by output: the stage whose effective kvar at the bus is the size of the list
      const byOutput = catalogue.kvarBasis === 'effective' && reactorPct > 0;
      const share = byOutput ? effectiveOfOne(ratedV, reactorPct, made.site.bus.nominalV) : 1;
      const stages = listed.map((kvar) => kvar / share);
      return stages[0]! > maxStageKvar ? [] : [{ stages, ratedV, reactorPct, kind, setPoint }];
    },
  );
}

function assessed({ site, record, zone }: SearchCase, way: Way): Outcome {
  const entry = site.catalogue?.switches?.[way.kind];
  const delays = entry && { stepDelayS: entry.stepDelayS, reconnectDelayS: entry.reconnectDelayS };
  const kind = entry?.kind ?? site.prices?.switches?.[0]?.kind;
  return assessBank(
    {
      ...site,
      control: { ...site.control, setPointPowerFactor: way.setPoint, ...delays },
      bank: {
        stages: groupsOf(way.stages, way.ratedV, way.reactorPct),
        ...(site.catalogue?.interStageUh === undefined ? {} : { interStageUh: site.catalogue.interStageUh }),
        ...(kind === undefined ? {} : { switchKind: kind }),
      },
    },
    record,
    zone,
  );
}

function searched(made: SearchCase, way: Way): SlowSearched | null {
  const outcome = assessed(made, way);
  const { result } = outcome;
  const kvar = result.bank.stages.map(({ effectiveKvar }) => effectiveKvar);
  const greatest = Math.max(0, ...outcome.series.busKvar);
  const { maxTotalKvar } = made.site.catalogue!;
  const fits = maxTotalKvar === undefined ? sum(kvar) - Math.min(...kvar) < greatest : sum(kvar) <= maxTotalKvar;
  if (!fits) return null;
  const entry = made.site.catalogue?.switches?.[way.kind];
  return {
    ...way,
    verdict: verdictOf(outcome, entry?.limitsInrush ?? false),
    targetMet: isOnTarget(outcome),
    npv: result.money!.npv!,
    capital: result.money!.capital!.total,
    switchings: result.operation.totalSwitchings,
  };
}

function comesBefore(a: SlowSearched, b: SlowSearched): number {
  const cents = (one: SlowSearched): number => Math.round(one.capital * 100);
  const sizes = a.stages.map((stage, k) => stage - (b.stages[k] ?? 0)).find((apart) => apart !== 0) ?? 0;
  return (
    cents(a) - cents(b) ||
    a.stages.length - b.stages.length ||
    sum(a.stages) - sum(b.stages) ||
    a.switchings - b.switchings ||
    a.reactorPct - b.reactorPct ||
    a.ratedV - b.ratedV ||
    a.kind - b.kind ||
    a.setPoint - b.setPoint ||
    sizes
  );
}

function bestOf(candidates: readonly SlowSearched[], mustMeet: boolean): SlowSearched | null {
  for (const verdict of ['clear', 'watch'] as const) {
    const pool = candidates.filter((one) => one.verdict !== 'avoid' && (one.targetMet || !mustMeet));
    const allowed = pool.filter((one) => verdict === 'watch' || one.verdict === 'clear');
    if (allowed.length === 0) continue;
    const greatest = Math.max(...allowed.map(({ npv }) => npv));
    return allowed.filter(({ npv }) => npv >= greatest - 0.005).sort(comesBefore)[0]!;
  }
  return null;
}

// Today's bank costs nothing new: its worth is that of the same bank bought, and its capital given back.
function keptWorth({ site, record, zone }: SearchCase): { npv: number; may: boolean; targetMet: boolean } | null {
  if (site.bank === undefined) return null;
  const outcome = assessBank(site, record, zone);
  const { npv, capital } = outcome.result.money!;
  const verdict = verdictOf(outcome, false);
  return { npv: npv! + capital!.total, may: verdict !== 'avoid', targetMet: isOnTarget(outcome) };
}

/**
 * Tries everything.
 * @param made site with tariff, prices and catalogue in full, record, zone
 * @returns candidates, the optimum, and what is recommended
 */
export function slowSearch(made: SearchCase): SlowSearch {
  const { site, record, zone } = made;
  const catalogue = site.catalogue!;
  const mustMeet = catalogue.mustMeetTarget ?? true;
  const candidates = ways(made, catalogue).flatMap((way) => searched(made, way) ?? []);
  const best = bestOf(candidates, mustMeet);
  const { result } = planBank(
    { ...site, tariff: undefined, catalogue: { ...catalogue, stageKvar: [1e-6] } },
    record,
    zone,
  );
  const nothingOnTarget = result.requirement.months.every(
    ({ powerFactorLagging }) =>
      powerFactorLagging === null || powerFactorLagging >= result.requirement.targetPowerFactor - 1e-12,
  );
  const kept = keptWorth(made);
  let recommended: SlowSearch['recommended'] | null = nothingOnTarget || !mustMeet ? 'do nothing' : null;
  let worth = 0;
  const mayKeep = kept?.may === true && (kept.targetMet || !mustMeet);
  if (kept !== null && mayKeep && (recommended === null || kept.npv > 0.005)) {
    recommended = "keep today's bank";
    worth = kept.npv;
  }
  if (best !== null && (recommended === null || best.npv > worth + 0.005)) recommended = 'new bank';
  return { candidates, best, recommended: recommended ?? 'do nothing' };
}
