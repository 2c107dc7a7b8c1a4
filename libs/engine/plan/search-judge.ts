import type { JudgeBasis } from '../duty/judge-bank.js';
import { firmVerdict, quickJudge } from '../duty/quick-judge.js';
import type { Verdict } from '../duty/rules.js';
import type { Bank } from '../layout/bank.js';
import type { SettledCatalogue } from '../layout/candidates.js';
import { bankOfBuild, type SearchSpace, type SwitchKind } from '../layout/search-space.js';
import type { CostBasis } from '../money/capital.js';
import { presentWeights } from '../money/present-weights.js';
import type { Control } from '../operation/control.js';
import type { ControllerPace } from '../operation/control-reach.js';
import type { ControllerView } from '../operation/controller-view.js';
import { ActiveSums } from './active-sums.js';
import { CandidateRun, type RunGround } from './candidate-run.js';
import { BuildWorth, lifeCost, type WorthGround } from './candidate-worth.js';
import { ClearScreen } from './clear-screen.js';
import { basisOf, judge, overallVerdict } from './judge-basis.js';
import { KeptKvarh } from './kept-kvarh.js';
import type { MoneyStudy } from './money-study.js';
import type { BoundWidth, Candidate, Finished, SearchJudge, SharedBound } from './search.js';
import { settleControl } from './settle-bank.js';
import { SharedBounds } from './shared-bounds.js';
import type { Site } from './site.js';
import { controllerView, meterColumns, type Study } from './study.js';

/** What a search is about. */
export interface SearchGround {
  study: Study;
  site: Site;
  money: MoneyStudy;
  prices: Omit<CostBasis, 'switchKind'>;
  catalogue: SettledCatalogue;
  space: SearchSpace;
}

/** The rest of the engine as a search sees it; whatever is asked twice is kept. */
export class SiteSearchJudge implements SearchJudge {
  readonly months: number;
  readonly demandedFactor: number | null;
  readonly #ground: SearchGround;
  readonly #shared: SharedBounds;
  readonly #keptKvarh = new KeptKvarh();
  readonly #screen: ClearScreen;
  /** by build and switches: 1 may be clear, 2 is not */
  readonly #closedForms: Uint8Array;
  readonly #paces: Control[] = [];
  readonly #runGround: RunGround;
  readonly #worthGround: WorthGround;
  readonly #worths: BuildWorth[] = [];
  readonly #views: ControllerView[] = [];
  readonly #quick = new Map<number, Verdict>();
  readonly #firm = new Map<number, Verdict>();

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
    this.#screen = new ClearScreen(study);
    this.#closedForms = new Uint8Array(2 * ground.space.builds.length);
    const columns = meterColumns(study);
    this.#runGround = { study, prepared, columns, active: new ActiveSums(study.record.activeKw, months.length) };
    this.#worthGround = {
      study,
      months,
      beforeTotals: Float64Array.from(money.before.months, ({ total }) => total),
      finance,
      weights,
      capacitorLives: lifeCost({ years, amount: 1 }, weights),
    };
    this.#shared = new SharedBounds(this.#worthGround, prepared, ground.space);
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
    return bankOfBuild(space, space.builds[candidate.build]!, catalogue, this.kind(candidate).limitsInrush);
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

  bound(candidate: Candidate, width: BoundWidth): SharedBound {
    const build = this.#ground.space.builds[candidate.build]!;
    if (width === 'about') return this.#shared.bySize(build, width);
    const [pace, view] = [this.#pace(candidate), this.#view(candidate.setPoint)];
    if (width === 'controller') return this.#shared.byController(candidate, pace, view);
    const leastKvarh = Float64Array.of(this.#keptKvarh.least({ ...build, stageCount: build.stages }, pace, view));
    return { ...this.#shared.bySize(build, width), leastKvarh };
  }

  // The delays follow from the switches, or from the site; only a natural reconnection delay asks for the bank.
  #pace(candidate: Candidate): ControllerPace {
    const { reconnectDelayS } = this.kind(candidate);
    const given = this.#ground.site.control;
    if (reconnectDelayS === null && given?.reconnectDelayS === undefined) {
      return this.control(candidate, this.bank(candidate));
    }
    const known = this.#paces[candidate.kind];
    if (known !== undefined) return known;
    const made = this.control(candidate, this.bank(candidate));
    this.#paces[candidate.kind] = made;
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

  mayBeClear(candidate: Candidate): boolean {
    const key = this.#verdictKey(candidate);
    const known = this.#closedForms[key];
    if (known !== undefined && known !== 0) return known === 1;
    const build = this.#ground.space.builds[candidate.build]!;
    const may = this.#screen.mayBeClear(build, this.bank(candidate));
    this.#closedForms[key] = may ? 1 : 2;
    return may;
  }

  // Set point and delays don't move a verdict: no discharge resistor is given.
  #verdictKey(candidate: Candidate): number {
    return 2 * candidate.build + (this.kind(candidate).limitsInrush ? 1 : 0);
  }

  quickVerdict(candidate: Candidate): Verdict {
    return this.#kept(this.#quick, candidate, (bank, basis) => quickJudge(this.#ground.study.model, bank, basis));
  }

  verdict(candidate: Candidate): Verdict {
    return this.#kept(this.#firm, candidate, (bank, basis) => firmVerdict(this.#ground.study.model, bank, basis));
  }

  #kept(
    verdicts: Map<number, Verdict>,
    candidate: Candidate,
    judged: (bank: Bank, basis: JudgeBasis) => { verdict: Verdict },
  ): Verdict {
    const key = this.#verdictKey(candidate);
    const known = verdicts.get(key);
    if (known !== undefined) return known;
    const { study } = this.#ground;
    const bank = this.bank(candidate);
    const made = overallVerdict(study, judged(bank, basisOf(study, this.control(candidate, bank))));
    verdicts.set(key, made);
    return made;
  }

  /**
   * The greatest voltage distortion of a candidate's levels, over all corners.
   * @param candidate the candidate
   * @returns of nominal [%]
   * @source method-network
   */
  voltageDistortionPct(candidate: Candidate): number {
    const { study } = this.#ground;
    const bank = this.bank(candidate);
    const { network } = judge(study, bank, this.control(candidate, bank));
    return Math.max(...network.levels.map((level) => level.voltageDistortionPct));
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
