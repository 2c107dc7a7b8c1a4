import { mayBuild, type SearchSpace } from '../layout/search-space.js';
import type { Candidate, SearchJudge } from './search.js';

/** A candidate with what it is worth. */
export interface Ranked extends Candidate {
  npv: number;
  targetMet: boolean;
}

/** Which candidates one of several workers takes: every so many, from the first on. */
export interface RankShare {
  first: number;
  every: number;
}

/**
 * The full ranking: every candidate simulated whole and priced, whatever its verdict. What a search saves itself.
 * @param space all candidates
 * @param judge runs and worths
 * @param share the candidates to take, all where absent
 * @returns candidates, the greatest net present value first
 * @source method-money
 */
export function rankCandidates(
  space: SearchSpace,
  judge: Pick<SearchJudge, 'run' | 'worth' | 'months'>,
  { first, every }: RankShare = { first: 0, every: 1 },
): Ranked[] {
  const ranked: Ranked[] = [];
  let at = 0;
  for (const [build, made] of space.builds.entries()) {
    for (const [kind, entry] of space.kinds.entries()) {
      if (!mayBuild(made, entry)) continue;
      for (let setPoint = 0; setPoint < space.setPoints.length; setPoint++) {
        if (at++ % every === first) ranked.push(rankedOf(judge, { build, kind, setPoint }));
      }
    }
  }
  return ranked.sort((a, b) => b.npv - a.npv);
}

function rankedOf(judge: Pick<SearchJudge, 'run' | 'worth' | 'months'>, candidate: Candidate): Ranked {
  const run = judge.run(candidate);
  while (run.months < judge.months) run.advance();
  const npv = judge.worth(candidate.build, candidate.kind).netPresentValue(run);
  return { ...candidate, npv, targetMet: run.monthsInTarget === judge.months };
}
