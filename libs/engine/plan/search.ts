import type { Verdict } from '../duty/rules.js';
import type { Bank } from '../layout/bank.js';
import { mayBuild, type SearchSpace } from '../layout/search-space.js';
import type { SearchProof } from '../money/money-result.js';
import type { Control } from '../operation/control.js';
import { Stopped, type Watch } from '../problem.js';
import { BestFirst } from './best-first.js';
import type { CandidateRun } from './candidate-run.js';
import type { BoundRest, BuildWorth } from './candidate-worth.js';

// long: the walk over months, its bounds and the count of its proof are read together

/** A candidate of the search: a build, its kind of switch, its set point. */
export interface Candidate {
  build: number;
  kind: number;
  setPoint: number;
}

/** A candidate that was simulated whole. */
export interface Finished extends Candidate {
  bank: Bank;
  control: Control;
  capital: number;
  npv: number;
  laggingKvarh: number;
  totalSwitchings: number;
  targetMet: boolean;
}

/** Bounds that many candidates share. */
export interface SharedBound extends BoundRest {
  /** no bank's lowest monthly power factor is higher */
  mostLowestFactor: number;
}

/** How much of a candidate its bounds look at. */
export type BoundWidth = 'about' | 'size' | 'controller';

/** What the search asks of the rest of the engine; it knows no network, no tariff and no record itself. */
export interface SearchJudge {
  months: number;
  /** power factor demanded in every month, or null */
  demandedFactor: number | null;
  /**
   * bounds of the banks of about a candidate's size; of its size, with the fewest kvarh of its own over the whole record; or
   * of its size and its controller
   */
  bound(candidate: Candidate, width: BoundWidth): SharedBound;
  worth(build: number, kind: number): BuildWorth;
  run(candidate: Candidate): CandidateRun;
  /** false where closed forms alone say that a candidate stands near a limit or over it */
  mayBeClear(candidate: Candidate): boolean;
  /** what the flows say; the whole judgement is never milder */
  quickVerdict(candidate: Candidate): Verdict;
  verdict(candidate: Candidate): Verdict;
  /** below 0 where a is preferred to b of as much value */
  prefer(a: Finished, b: Finished): number;
}

/** The answer of a search. */
export interface SearchAnswer {
  /** the optimum, or null where no candidate is both within limits and, if demanded, on target */
  best: Finished | null;
  /** verdict the optimum was taken with: `watch` only where no candidate is clear */
  pool: 'clear' | 'watch';
  /** every candidate simulated whole */
  finished: Finished[];
  proof: SearchProof;
}

/** Net present values this near to the greatest are compared further. */
export const NEAR_VALUE = 0.005;
/** Bounds carry this share of their size for the last bits of their sums. */
const BOUND_WIDTH = 1e-9;

/** How far a candidate has come: bounds by about its size, by its size, by its controller, its flows judged. */
const STEP = { about: 0, size: 1, controller: 2, flows: 3 } as const;
/** So many months are simulated before the flows are judged: that takes longer, and most candidates are given up by then. */
const MONTHS_BEFORE_FLOWS = 2;

/**
 * The candidate of greatest net present value, exactly: candidates are taken by the upper bound of theirs, the greatest
 * first, each brought one step further (bounds by size, by set point, then month by month of its simulation), until the
 * greatest bound left is below the best value found.
 * @param space all candidates
 * @param judge bounds, runs and verdicts
 * @param watch progress and stopping
 * @returns the optimum with the proof in counts
 * @throws Stopped where the watch says so
 * @source method-money
 */
export function search(space: SearchSpace, judge: SearchJudge, watch?: Watch): SearchAnswer {
  return new Search(space, judge, watch).answer();
}

class Search {
  readonly #space: SearchSpace;
  readonly #judge: SearchJudge;
  readonly #watch: Watch | undefined;
  readonly #open: BestFirst;
  readonly #step: Uint8Array;
  readonly #monthsDone: Uint16Array;
  readonly #bounds: (SharedBound | undefined)[] = [];
  readonly #runs = new Map<string, CandidateRun>();
  /** candidates that are not clear, with their bounds: looked at where no clear one is left */
  readonly #watched: { id: number; bound: number }[] = [];
  readonly #finished: Finished[] = [];
  #best: Finished | null = null;
  #pool: 'clear' | 'watch' = 'clear';
  #refused = 0;
  #partly = 0;
  #steps = 0;

  constructor(space: SearchSpace, judge: SearchJudge, watch: Watch | undefined) {
    this.#space = space;
    this.#judge = judge;
    this.#watch = watch;
    const ids = space.builds.length * space.kinds.length * space.setPoints.length;
    this.#open = new BestFirst(ids);
    this.#step = new Uint8Array(ids);
    this.#monthsDone = new Uint16Array(ids);
  }

  answer(): SearchAnswer {
    this.#openAll();
    this.#walk();
    const clearRest = this.#open.greatestKey;
    if (this.#best === null) this.#lookAtWatched();
    this.#preferAmongNear();
    return {
      best: this.#best,
      pool: this.#pool,
      finished: this.#finished,
      proof: this.#proof(Math.max(clearRest, this.#open.greatestKey)),
    };
  }

  #candidate(id: number): Candidate {
    const { kinds, setPoints } = this.#space;
    const pair = Math.floor(id / setPoints.length);
    return { build: Math.floor(pair / kinds.length), kind: pair % kinds.length, setPoint: id % setPoints.length };
  }

  #openAll(): void {
    const { builds, kinds, setPoints } = this.#space;
    for (const [build, made] of builds.entries()) {
      for (const [kind, entry] of kinds.entries()) {
        if (!mayBuild(made, entry)) continue;
        const first = (build * kinds.length + kind) * setPoints.length;
        const shared = this.#judge.bound({ build, kind, setPoint: 0 }, 'about');
        const bound = this.#judge.worth(build, kind).upperBound(shared, null, 0);
        for (let setPoint = 0; setPoint < setPoints.length; setPoint++) this.#open.push(first + setPoint, bound);
      }
    }
  }

  #walk(): void {
    while (this.#open.size > 0 && !this.#isSettled()) {
      if ((this.#steps++ & 63) === 0) this.#tell();
      const bound = this.#open.greatestKey;
      this.#advance(this.#open.pop(), bound);
    }
  }

  #isSettled(): boolean {
    if (this.#best === null) return false;
    const { npv } = this.#best;
    const greatest = this.#open.greatestKey;
    return greatest + BOUND_WIDTH * (1 + Math.abs(greatest) + Math.abs(npv)) < npv - NEAR_VALUE;
  }

  #tell(): void {
    if (this.#watch?.stopped()) throw new Stopped('stopped while searching for the bank');
    this.#watch?.report(0.1 + 0.8 * (1 - this.#open.size / (this.#open.size + this.#steps)));
  }

  // One candidate brought one step further.
  #advance(id: number, bound: number): void {
    const candidate = this.#candidate(id);
    const step = this.#step[id]!;
    const done = this.#monthsDone[id]!;
    if (step === STEP.about && this.#pool === 'clear' && !this.#judge.mayBeClear(candidate)) {
      this.#watched.push({ id, bound });
    } else if (step === STEP.about) this.#refine(id, candidate, { width: 'size', bound });
    else if (step === STEP.size) this.#refine(id, candidate, { width: 'controller', bound });
    else if (step === STEP.controller && done === Math.min(MONTHS_BEFORE_FLOWS, this.#judge.months - 1)) {
      this.#judgeFlows(id, candidate, bound);
    } else this.#simulate(id, candidate, bound);
  }

  #refine(id: number, candidate: Candidate, { width, bound }: { width: 'size' | 'controller'; bound: number }): void {
    this.#step[id] = STEP[width];
    const shared = this.#judge.bound(candidate, width);
    this.#bounds[id] = shared;
    const { demandedFactor } = this.#judge;
    if (demandedFactor !== null && shared.mostLowestFactor < demandedFactor * (1 - BOUND_WIDTH)) {
      this.#giveUp(id);
      return;
    }
    const found = this.#judge.worth(candidate.build, candidate.kind).upperBound(shared, null, 0);
    // each is a bound: the next one may be formed for more banks together
    this.#open.push(id, Math.min(found, bound));
  }

  #judgeFlows(id: number, candidate: Candidate, bound: number): void {
    const verdict = this.#judge.quickVerdict(candidate);
    if (verdict === 'avoid') this.#giveUp(id);
    else if (verdict === 'watch' && this.#pool === 'clear') this.#watched.push({ id, bound });
    else {
      this.#step[id] = STEP.flows;
      this.#open.push(id, bound);
    }
  }

  #simulate(id: number, candidate: Candidate, before: number): void {
    const run = this.#runOf(id, candidate);
    const done = this.#monthsDone[id]! + 1;
    this.#monthsDone[id] = done;
    while (run.months < done) run.advance();
    const { demandedFactor, months } = this.#judge;
    if (demandedFactor !== null && run.monthsInTarget < done) {
      if (done < months) this.#giveUp(id);
      else this.#finish(candidate, run);
      return;
    }
    if (done === months) {
      this.#finish(candidate, run);
      return;
    }
    const bound = this.#judge.worth(candidate.build, candidate.kind).upperBound(this.#bounds[id]!, run, done);
    this.#open.push(id, Math.min(bound, before));
  }

  // Out of the search: by its verdict, or because it can't or did not hold the target.
  #giveUp(id: number): void {
    if (this.#monthsDone[id]! > 0) this.#partly++;
    else this.#refused++;
  }

  // Kinds that ask the same of the controller share a run.
  #runOf(id: number, candidate: Candidate): CandidateRun {
    const { stepDelayS, reconnectDelayS } = this.#space.kinds[candidate.kind]!;
    const key = `${candidate.build} ${candidate.setPoint} ${stepDelayS} ${reconnectDelayS}`;
    const known = this.#runs.get(key);
    if (known !== undefined) return known;
    if (this.#monthsDone[id] !== 0) throw new Error('a run was lost');
    const made = this.#judge.run(candidate);
    this.#runs.set(key, made);
    return made;
  }

  #finish(candidate: Candidate, run: CandidateRun): void {
    const last = this.#judge.months - 1;
    const worth = this.#judge.worth(candidate.build, candidate.kind);
    const finished: Finished = {
      ...candidate,
      bank: run.bank,
      control: run.control,
      capital: worth.capital,
      npv: worth.netPresentValue(run),
      laggingKvarh: run.laggingKvarh[last]!,
      totalSwitchings: run.switchings[last]!.reduce((sum, count) => sum + count, 0),
      targetMet: run.monthsInTarget === this.#judge.months,
    };
    this.#finished.push(finished);
    this.#consider(finished);
  }

  // Only what could become the best is judged in full: that takes longer than its simulation.
  #consider(finished: Finished): void {
    if (!this.#onTarget(finished) || finished.npv <= (this.#best?.npv ?? Number.NEGATIVE_INFINITY)) return;
    if (this.#inPool(finished)) this.#best = finished;
  }

  #onTarget(finished: Finished): boolean {
    return finished.targetMet || this.#judge.demandedFactor === null;
  }

  #inPool(candidate: Candidate): boolean {
    const verdict = this.#judge.verdict(candidate);
    return verdict === 'clear' || (verdict === 'watch' && this.#pool === 'watch');
  }

  // Of all that are within half a cent of the greatest value the preferred one: every one of them was simulated.
  #preferAmongNear(): void {
    if (this.#best === null) return;
    const least = this.#best.npv - NEAR_VALUE;
    const near = this.#finished.filter((finished) => finished.npv >= least && this.#onTarget(finished));
    near.sort((a, b) => this.#judge.prefer(a, b));
    this.#best = near.find((finished) => this.#inPool(finished)) ?? this.#best;
  }

  #lookAtWatched(): void {
    this.#pool = 'watch';
    for (const finished of this.#finished) this.#consider(finished);
    for (const { id, bound } of this.#watched.splice(0)) this.#open.push(id, bound);
    this.#walk();
  }

  #proof(rest: number): SearchProof {
    const left = this.#open.rest();
    const begun = (id: number): boolean => this.#monthsDone[id]! > 0;
    const watchedBegun = this.#watched.filter(({ id }) => begun(id)).length;
    const partly = this.#partly + left.filter(begun).length + watchedBegun;
    const boundedAway = left.filter((id) => !begun(id)).length;
    return {
      candidates: this.#space.candidates,
      refused: this.#refused + this.#watched.length - watchedBegun,
      boundedAway,
      partlySimulated: partly,
      simulated: this.#finished.length,
      lowerBoundMargin: this.#best === null || left.length === 0 ? null : this.#best.npv - rest,
    };
  }
}
