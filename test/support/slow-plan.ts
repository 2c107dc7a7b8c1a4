import {
  assessBank,
  type CatalogueInput,
  type LoadRecord,
  type Outcome,
  type Site,
  type StageGroupInput,
  type ZoneTable,
} from '#libs/engine/index.js';

/** One way to build a bank, judged in full. */
export interface SlowCandidate {
  stages: StageGroupInput[];
  effectiveKvar: number;
  count: number;
  smallestKvar: number;
  reactorPct: number;
}

/** What trying everything finds. */
export interface SlowChoice {
  candidate: SlowCandidate;
  setPointPowerFactor: number;
  outcome: Outcome;
}

/** A catalogue with every list given. */
export type SlowCatalogue = Required<Pick<CatalogueInput, 'stageKvar' | 'ratedV' | 'reactorPct' | 'maxStages'>> &
  Pick<CatalogueInput, 'maxTotalKvar' | 'setPoints'>;

/** A site with its record and zone. */
export interface SlowCase {
  site: Site;
  record: LoadRecord;
  zone: ZoneTable;
}

/**
 * Every layout of the catalogue: n of one size, or one or two of half that size and the rest of it.
 * @param catalogue the lists
 * @returns counts and sizes, smaller stages first
 */
export function everyLayout({ stageKvar, maxStages }: SlowCatalogue): { count: number; ratedKvar: number }[][] {
  const layouts: { count: number; ratedKvar: number }[][] = [];
  for (const full of stageKvar) {
    for (let halves = 0; halves <= 2; halves++) {
      if (halves > 0 && !stageKvar.includes(full / 2)) continue;
      for (let fulls = 1; fulls + halves <= maxStages; fulls++) {
        const small = halves === 0 ? [] : [{ count: halves, ratedKvar: full / 2 }];
        layouts.push([...small, { count: fulls, ratedKvar: full }]);
      }
    }
  }
  return layouts;
}

function judged({ site, record, zone }: SlowCase, stages: StageGroupInput[], setPoint?: number): Outcome {
  const control = { ...site.control, ...(setPoint === undefined ? {} : { setPointPowerFactor: setPoint }) };
  const bank = {
    stages,
    ...(site.catalogue?.interStageUh === undefined ? {} : { interStageUh: site.catalogue.interStageUh }),
  };
  return assessBank({ ...site, control, bank }, record, zone);
}

/**
 * Every candidate: per layout and reactor ratio the least rated voltage whose voltage duties are clear.
 * @param made site, record, zone
 * @param catalogue the lists
 * @returns candidates in order of preference
 */
export function everyCandidate(made: SlowCase, catalogue: SlowCatalogue): SlowCandidate[] {
  const found: SlowCandidate[] = [];
  for (const reactorPct of catalogue.reactorPct) {
    for (const layout of everyLayout(catalogue)) {
      for (const ratedV of [...catalogue.ratedV].sort((a, b) => a - b)) {
        const stages = layout.map((group) => ({ ...group, ratedV, reactorPct }));
        const { result } = judged(made, stages);
        const voltages = result.duties.filter(({ name }) => name.startsWith('capacitor voltage'));
        if (voltages.some(({ verdict }) => verdict !== 'clear')) continue;
        const kvar = result.bank.stages.map(({ effectiveKvar }) => effectiveKvar);
        found.push({
          stages,
          effectiveKvar: kvar.reduce((sum, one) => sum + one, 0),
          count: kvar.length,
          smallestKvar: Math.min(...kvar),
          reactorPct,
        });
        break;
      }
    }
  }
  const { maxTotalKvar = Number.POSITIVE_INFINITY } = catalogue;
  return found.filter(({ effectiveKvar }) => effectiveKvar <= maxTotalKvar).sort(comesBefore);
}

function comesBefore(a: SlowCandidate, b: SlowCandidate): number {
  const plain = (candidate: SlowCandidate): number => (candidate.reactorPct === 0 ? 0 : 1);
  if (plain(a) !== plain(b)) return plain(a) - plain(b);
  if (Math.abs(a.effectiveKvar - b.effectiveKvar) > 1e-9 * a.effectiveKvar) return a.effectiveKvar - b.effectiveKvar;
  return a.count - b.count || b.smallestKvar - a.smallestKvar || a.reactorPct - b.reactorPct;
}

/** Greatest kvar the bank adds to leading in an interval. */
export function addedLeadingKvar({ series }: Outcome): number {
  return series.connectedKvar.reduce((most, b, i) => Math.max(most, b - Math.max(series.busKvar[i]!, 0)), 0);
}

/** Does every billing month reach the target. */
export function everyMonthMeets({ result }: Outcome): boolean {
  const { targetPowerFactor } = result.requirement;
  return result.operation.months.every(
    ({ powerFactorLagging }) => powerFactorLagging === null || powerFactorLagging >= targetPowerFactor - 1e-12,
  );
}

function setPointsOf({ site }: SlowCase, { setPoints }: SlowCatalogue): number[] {
  const target = site.target?.powerFactor ?? 0.95;
  if (site.control?.setPointPowerFactor !== undefined) return [site.control.setPointPowerFactor];
  if (setPoints !== undefined) return [...setPoints].sort((a, b) => a - b);
  const hundredths = Array.from({ length: 100 }, (_, k) => Math.round(1e6 * (target + 0.01 * k)) / 1e6);
  return [...hundredths.filter((point) => point < 1), 1];
}

/**
 * The candidate at the lowest set point with which it meets the target, or null where it never does or over-corrects there.
 * @param made site, record, zone
 * @param catalogue the lists
 * @param candidate what is built
 * @returns the candidate judged with that set point
 */
export function withSetPoint(made: SlowCase, catalogue: SlowCatalogue, candidate: SlowCandidate): SlowChoice | null {
  for (const setPointPowerFactor of setPointsOf(made, catalogue)) {
    const outcome = judged(made, candidate.stages, setPointPowerFactor);
    if (!everyMonthMeets(outcome)) continue;
    if (addedLeadingKvar(outcome) > candidate.smallestKvar * (1 + 1e-9)) return null;
    return { candidate, setPointPowerFactor, outcome };
  }
  return null;
}

/** Reasons that say nothing against a bank; any other counts against it. */
const NOTHING_AGAINST = new Set([
  'record.insufficient',
  'record.short',
  'target.met',
  'switchings.lowerBound',
  'reconnection.short',
  // a bank as new is judged; what it comes to with age is told beside it
  'ageing.overLimit',
]);

/**
 * A record too short for a recommendation leaves every bank at `watch` alike, and so chooses none: among those the bank
 * with nothing else against it is the clear one.
 */
function isClear({ result }: Outcome): boolean {
  if (result.verdict !== 'watch' || result.record.grade !== 'insufficient') return result.verdict === 'clear';
  return (
    result.duties.every(({ verdict }) => verdict === 'clear' || verdict === null) &&
    result.reasons.every(({ code }) => NOTHING_AGAINST.has(code))
  );
}

/**
 * Tries everything in order of preference.
 * @param made site, record, zone
 * @param catalogue the lists
 * @returns the first that is clear, else the first that is watch, else null
 */
export function slowPlan(made: SlowCase, catalogue: SlowCatalogue): SlowChoice | null {
  let watched: SlowChoice | null = null;
  for (const candidate of everyCandidate(made, catalogue)) {
    const choice = withSetPoint(made, catalogue, candidate);
    if (choice !== null && isClear(choice.outcome)) return choice;
    if (choice?.outcome.result.verdict === 'watch') watched ??= choice;
  }
  return watched;
}
