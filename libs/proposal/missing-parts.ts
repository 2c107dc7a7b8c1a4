import { type EstimateOutcome, InputProblem, isEstimate, type Outcome } from '#libs/engine/index.js';
import { basisOfDesign } from '#libs/present/basis-of-design.js';
import { blocking, findings } from '#libs/present/findings.js';
import { handChecked } from '#libs/present/hand-checked.js';
import type { ProposalFrame } from './proposal-frame.js';

type Filled = (outcome: Outcome | EstimateOutcome, frame: ProposalFrame) => boolean;

/** Parts without which a paper stays a draft, and whether they are filled. */
const REQUIRED: readonly { part: string; isFilled: Filled }[] = [
  { part: 'prepared by', isFilled: (_, { preparedBy }) => preparedBy !== null && preparedBy.trim() !== '' },
  { part: 'basis of design', isFilled: (outcome) => basisOfDesign(outcome).length > 0 },
  { part: 'data quality', isFilled: (outcome) => !isEstimate(outcome) && outcome.result.record.intervals > 0 },
  { part: 'method and working', isFilled: ({ result }) => result.figures.length > 0 },
  { part: 'duties', isFilled: ofBank(({ result }) => result.duties.length > 0) },
  { part: 'sensitivity', isFilled: ofBank(({ result }) => result.robustness !== null) },
  { part: 'hand check', isFilled: ofBank(({ result }) => handChecked(result.figures).length > 0) },
  { part: 'cautions', isFilled: ({ result }) => result.cautions.length > 0 },
];

/**
 * Required parts of a paper that are empty.
 * @param outcome the plan or judgement
 * @param frame what the paper carries besides
 * @returns their names; empty where the paper may be issued as far as its parts go
 */
export function missingParts(outcome: Outcome | EstimateOutcome, frame: ProposalFrame): string[] {
  return REQUIRED.filter(({ isFilled }) => !isFilled(outcome, frame)).map(({ part }) => part);
}

/**
 * Refuses to make anything but a draft of a paper that is not whole, or whose findings block issue.
 * @param outcome the plan or judgement
 * @param frame with the state it is to have
 * @throws InputProblem naming every empty part and every finding that blocks
 */
export function needIssuable(outcome: Outcome | EstimateOutcome, frame: ProposalFrame): void {
  if (frame.state === 'draft, not reviewed') return;
  const expected = 'a paper that may be issued';
  const problems = [
    ...missingParts(outcome, frame).map((part) => ({
      code: 'missing' as const,
      expected: `${part}, for ${expected}`,
      found: 'nothing',
    })),
    ...blocking(findings(outcome)).map(({ what, path }) => ({
      code: 'conflict' as const,
      ...(path === null ? {} : { path }),
      expected,
      found: `a finding that blocks issue: ${what}`,
    })),
  ];
  if (problems.length > 0) throw new InputProblem(problems);
}

function ofBank(isFilled: (outcome: Outcome | EstimateOutcome) => boolean): Filled {
  return (outcome) => outcome.bank.groups.length === 0 || isFilled(outcome);
}
