import { quickJudge } from '../duty/quick-judge.js';
import { graver, type Verdict } from '../duty/rules.js';
import type { Bank } from '../layout/bank.js';
import type { SettledCatalogue } from '../layout/candidates.js';
import { bankOfBuild, type SearchSpace, type SwitchKind } from '../layout/search-space.js';
import { rangeTariff } from '../money/bill-range.js';
import type { CostBasis } from '../money/capital.js';
import { presentWeights } from '../money/present-weights.js';
import type { Control } from '../operation/control.js';
import { controlReach } from '../operation/control-reach.js';
import type { ControllerView } from '../operation/simulate.js';
import { switchedBank } from '../operation/switched-bank.js';
import { type BoundCell, CellBounds, type CellSize } from './bound-cell.js';
import { CandidateRun, type RunGround, runColumns } from './candidate-run.js';
import { BuildWorth, lifeCost, type WorthGround } from './candidate-worth.js';
import type { MoneyStudy } from './money-study.js';
import { basisOf, judge, overallVerdict } from './outcome-of.js';
import type { Candidate, Finished, SearchJudge } from './search.js';
import { settleControl } from './settle-bank.js';
import type { Site } from './site.js';
import { controllerView, type Study } from './study.js';

/** What a search is about. */
export interface SearchGround {
  study: Study;
  site: Site;
  money: MoneyStudy;
  prices: Omit<CostBasis, 'switchKind'>;
  catalogue: SettledCatalogue;
  space: SearchSpace;
}

/** Sizes of cells: totals and reaches within these ratios share one. */
const COARSE_RATIO = 1.12;
const FINE_RATIO = 1.01;
const REACH_RATIO = 1.2;

/** A bank judged: its verdict and the greatest voltage distortion of its levels. */
export interface JudgedBuild {
  verdict: Verdict;
  voltageDistortionPct: number;
}

/** The rest of the engine as a search sees it; whatever is asked twice is kept. */
export class SiteSearchJudge implements SearchJudge {
  readonly months: number;
  readonly demandedFactor: number | null;
  readonly #ground: SearchGround;
  readonly #bounds: CellBounds;
  readonly #runGround: RunGround;
  readonly #worthGround: WorthGround;
  readonly #worths: BuildWorth[] = [];
  readonly #cells = new Map<string, BoundCell>();
  readonly #views: ControllerView[] = [];
  readonly #quick = new Map<string, Verdict>();
  readonly #judged = new Map<string, JudgedBuild>();

  /** @param ground what the search is about */
  constructor(ground: SearchGround) {
    const { study, site, money, prices } = ground;
    const { prepared, finance } = money;
    const { months } = prepared.calendar;
    const weights = presentWeights(months, finance);
    const years = prices.prices.capacitorLifeYears ?? Number.POSITIVE_INFINITY;
    this.#ground = ground;
    this.months = months.length;
    this.demandedFactor = (site.catalogue?.mustMeetTarget ?? true) ? study.site.targetPowerFactor : null;
    this.#bounds = new CellBounds(study, rangeTariff(prepared));
    this.#runGround = { study, prepared, columns: runColumns(study.record.beginS.length) };
    this.#worthGround = {
      study,
      months,
      beforeTotals: Float64Array.from(money.before.months, ({ total }) => total),
      finance,
      weights,
      capacitorLives: lifeCost({ years, amount: 1 }, weights),
    };
  }

  /**
   * The kind of a candidate's switches.
   * @param candidate the candidate
   * @returns the kind
   */
  kind(candidate: Candidate): SwitchKind {
    return this.#ground.space.kinds[candidate.kind]!;
  }

  /**
   * Settings of the controller that a candidate brings with it.
   * @param candidate the candidate
   * @returns paths into the site file
   */
  replaces(candidate: Candidate): string[] {
    const { stepDelayS, reconnectDelayS } = this.kind(candidate);
    return [
      'control.setPointPowerFactor',
      ...(stepDelayS === null ? [] : ['control.stepDelayS']),
      ...(reconnectDelayS === null ? [] : ['control.reconnectDelayS']),
    ];
  }

  /**
   * The bank of a candidate.
   * @param candidate the candidate
   * @returns largest stages first
   */
  bank(candidate: Candidate): Bank {
    const { space, catalogue } = this.#ground;
    return bankOfBuild(space, space.builds[candidate.build]!, catalogue);
  }

  /**
   * The controller of a candidate: the site's settings, its set point, the delays of its switches.
   * @param candidate the candidate
   * @param bank its bank
   * @returns settings
   * @source method-money
   */
  control(candidate: Candidate, bank: Bank): Control {
    const { site, study, space } = this.#ground;
    const { control } = settleControl(site.control, bank, study.site);
    const { stepDelayS, reconnectDelayS } = this.kind(candidate);
    return {
      ...control,
      setPointPowerFactor: space.setPoints[candidate.setPoint]!,
      stepDelayS: stepDelayS ?? control.stepDelayS,
      reconnectDelayS: reconnectDelayS ?? control.reconnectDelayS,
    };
  }

  #view(setPoint: number): ControllerView {
    const known = this.#views[setPoint];
    if (known !== undefined) return known;
    const made = controllerView(this.#ground.study, this.#ground.space.setPoints[setPoint]!);
    this.#views[setPoint] = made;
    return made;
  }

  cell(candidate: Candidate, coarse: boolean): BoundCell {
    const { totalKvar } = this.#ground.space.builds[candidate.build]!;
    if (coarse) return this.#cellOf(`${gridStep(totalKvar, COARSE_RATIO)}`, () => bySize(totalKvar, COARSE_RATIO));
    const bank = this.bank(candidate);
    const view = this.#view(candidate.setPoint);
    const seen = switchedBank(bank, this.#ground.study.site.nominalV);
    const reach = controlReach(seen, this.control(candidate, bank), view);
    const size = gridStep(totalKvar, FINE_RATIO);
    if (!Number.isFinite(reach.aboveKvar)) {
      return this.#cellOf(`${size} fine`, () => bySize(totalKvar, FINE_RATIO));
    }
    const near = gridStep(reach.aboveKvar, REACH_RATIO);
    const below = Number.isFinite(reach.belowKvar);
    return this.#cellOf(`${size} ${near} ${below} ${candidate.setPoint}`, () => {
      const kvar = REACH_RATIO ** near;
      const wide = { aboveKvar: kvar, belowKvar: below ? kvar : Number.POSITIVE_INFINITY };
      return { ...bySize(totalKvar, FINE_RATIO), wantedKvar: view.wantedKvar, reach: wide };
    });
  }

  #cellOf(key: string, size: () => CellSize): BoundCell {
    const known = this.#cells.get(key);
    if (known !== undefined) return known;
    const made = this.#bounds.cell(size());
    this.#cells.set(key, made);
    return made;
  }

  worth(build: number, kind: number): BuildWorth {
    const { space, prices } = this.#ground;
    const at = build * space.kinds.length + kind;
    const known = this.#worths[at];
    if (known !== undefined) return known;
    const cost = { ...prices, switchKind: space.kinds[kind]!.kind };
    const made = new BuildWorth(this.#worthGround, space.builds[build]!, cost);
    this.#worths[at] = made;
    return made;
  }

  run(candidate: Candidate): CandidateRun {
    const bank = this.bank(candidate);
    return new CandidateRun(this.#runGround, bank, this.control(candidate, bank), this.#view(candidate.setPoint));
  }

  // Set point and delays don't move a verdict: no discharge resistor is given.
  quickVerdict(candidate: Candidate): Verdict {
    const { limitsInrush } = this.kind(candidate);
    const key = `${candidate.build} ${limitsInrush}`;
    const known = this.#quick.get(key);
    if (known !== undefined) return known;
    const { study } = this.#ground;
    const bank = this.bank(candidate);
    const basis = { ...basisOf(study, this.control(candidate, bank)), limitsInrush };
    const { verdict } = quickJudge(study.model, bank, basis);
    const opened = study.site.recordedBank.state === 'unknown' ? graver(verdict, 'watch') : verdict;
    this.#quick.set(key, opened);
    return opened;
  }

  verdict(candidate: Candidate): Verdict {
    return this.judged(candidate).verdict;
  }

  /**
   * A candidate's bank judged in full.
   * @param candidate the candidate
   * @returns verdict and greatest voltage distortion
   * @source method-limits
   */
  judged(candidate: Candidate): JudgedBuild {
    const { limitsInrush } = this.kind(candidate);
    const key = `${candidate.build} ${limitsInrush}`;
    const known = this.#judged.get(key);
    if (known !== undefined) return known;
    const { study } = this.#ground;
    const bank = this.bank(candidate);
    const judgement = judge(study, bank, this.control(candidate, bank), limitsInrush);
    const made = {
      verdict: overallVerdict(study, judgement),
      voltageDistortionPct: Math.max(...judgement.network.levels.map((level) => level.voltageDistortionPct)),
    };
    this.#judged.set(key, made);
    return made;
  }

  // Least capital to cents, stages, ΣQ_N, switchings, reactor ratio, voltage, kind's place, set point, list of stages.
  prefer(a: Finished, b: Finished): number {
    const { builds } = this.#ground.space;
    const [one, other] = [builds[a.build]!, builds[b.build]!];
    return (
      Math.round(a.capital * 100) - Math.round(b.capital * 100) ||
      one.stages - other.stages ||
      one.ratedKvar - other.ratedKvar ||
      a.totalSwitchings - b.totalSwitchings ||
      one.reactorPct - other.reactorPct ||
      one.ratedV - other.ratedV ||
      a.kind - b.kind ||
      a.setPoint - b.setPoint ||
      stageOrder(one.counts, other.counts)
    );
  }
}

// Lists of stages largest first: the one with fewer of the largest size that differs is the lesser.
function stageOrder(a: Int32Array, b: Int32Array): number {
  for (let size = a.length - 1; size >= 0; size--) {
    if (a[size] !== b[size]) return a[size]! - b[size]!;
  }
  return 0;
}

function gridStep(kvar: number, ratio: number): number {
  return Math.ceil(Math.log(kvar) / Math.log(ratio) - 1e-9);
}

function bySize(totalKvar: number, ratio: number): CellSize {
  const step = gridStep(totalKvar, ratio);
  const unheld = { aboveKvar: Number.POSITIVE_INFINITY, belowKvar: Number.POSITIVE_INFINITY };
  // a little room for the powers of the ratio
  const mostKvar = Math.max(totalKvar, ratio ** step * (1 + 1e-9));
  return { mostKvar, leastKvar: ratio ** (step - 1) * (1 - 1e-9), wantedKvar: null, reach: unheld };
}
