import type { SearchSpace } from '../layout/search-space.js';
import type { Candidate } from './search.js';
import type { SiteSearchJudge } from './search-judge.js';

/**
 * The highest lowest monthly power factor that any candidate within limits attains: what is to be said where the
 * target is out of reach. Candidates are taken by the bound of theirs, so that few are simulated.
 * @param space all candidates
 * @param judge bounds, runs and verdicts
 * @returns λ, or null where every candidate is over a limit
 * @source derived
 */
export function bestAttainableFactor(space: SearchSpace, judge: SiteSearchJudge): number | null {
  const bounded = candidatesOf(space).map((candidate) => ({
    candidate,
    most: judge.bound(candidate, 'controller').mostLowestFactor,
  }));
  bounded.sort((a, b) => b.most - a.most);
  let best: number | null = null;
  for (const { candidate, most } of bounded) {
    if (best !== null && most <= best) break;
    if (judge.quickVerdict(candidate) === 'avoid') continue;
    const run = judge.run(candidate);
    while (run.months < judge.months && run.lowestFactor > (best ?? 0)) run.advance();
    if (run.lowestFactor <= (best ?? 0) || judge.verdict(candidate) === 'avoid') continue;
    best = run.lowestFactor;
  }
  return best;
}

// The first kind that may switch a build stands for all: kinds differ in what they cost more than in what they reach.
function candidatesOf({ builds, kinds, setPoints }: SearchSpace): Candidate[] {
  return builds.flatMap((made, build) => {
    const kind = kinds.findIndex(({ maxStageKvar }) => made.largestRatedKvar <= maxStageKvar);
    return setPoints.map((_, setPoint) => ({ build, kind, setPoint }));
  });
}
