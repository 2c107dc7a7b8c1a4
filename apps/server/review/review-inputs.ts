import type { EstimateResult, Result } from '#libs/engine/index.js';
import { decisiveFigures } from '#libs/present/decisive-figures.js';
import { findingNumbers, findings } from '#libs/present/findings.js';
import type { DecisiveFigure, ReviewFinding } from '#libs/review/review-act.js';
import type { Revision } from '#libs/store/revision.js';

/**
 * What a review turns on, as the plan says it when it is sent: the findings that block its issue or are to be accepted,
 * and the figures to be checked by hand.
 */
export function reviewInputs(revision: Revision): { findings: ReviewFinding[]; figures: DecisiveFigure[] } {
  const result = JSON.parse(revision.result) as Result | EstimateResult;
  return {
    findings: findings({ result }).flatMap((finding) => {
      const { id, level, what, consequence } = finding;
      if (level !== 'blocks issue' && level !== 'to be accepted') return [];
      return [{ id, level, what, ...findingNumbers(finding), consequence }];
    }),
    figures: decisiveFigures(result).map(({ id, label, value, unit }) => ({ id, label, value, unit })),
  };
}

/** Ids of every figure of a revision. */
export function figureIds(revision: Revision): string[] {
  return (JSON.parse(revision.result) as Result | EstimateResult).figures.map(({ id }) => id);
}
