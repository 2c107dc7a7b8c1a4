import {
  controllerSettings,
  type EstimateOutcome,
  type Figure,
  InputProblem,
  isEstimate,
  type Outcome,
} from '#libs/engine/index.js';
import { basisOfDesign } from '#libs/present/basis-of-design.js';
import { blocking, findings } from '#libs/present/findings.js';
import { handChecked } from '#libs/present/hand-checked.js';
import { maintenanceLines } from '#libs/present/maintenance-lines.js';
import { operatorPage } from '#libs/present/operator-page.js';
import { plainName } from '#libs/present/plain-name.js';
import { scheduleOfMaterials } from '#libs/present/schedule-of-materials.js';
import { workedInterval } from '#libs/present/worst-interval.js';
import type { ProposalFrame } from './proposal-frame.js';

type Filled = (outcome: Outcome | EstimateOutcome, frame: ProposalFrame) => boolean;

const HASH = /^[0-9a-f]{64}$/;

/** Parts without which a paper stays a draft, in its order, and whether they are filled. */
const REQUIRED: readonly { part: string; isFilled: Filled }[] = [
  {
    part: 'number, engine version and content hash',
    isFilled: (_, { number, engineVersion, contentHash }) => areTold([number, engineVersion]) && HASH.test(contentHash),
  },
  { part: 'decision', isFilled: ({ site }) => areTold([plainName(site.name)]) },
  { part: 'prepared by', isFilled: (_, { preparedBy }) => areTold([preparedBy]) },
  { part: 'checked and approved', isFilled: (_, frame) => frame.state !== 'approved' || isSigned(frame.review) },
  { part: 'findings', isFilled: ({ result }) => findings({ result }).every(({ what }) => areTold([what])) },
  { part: 'basis of design', isFilled: (outcome) => basisOfDesign(outcome).length > 0 },
  { part: 'assumptions', isFilled: ({ result }) => result.assumptions.every(({ text }) => areTold([text])) },
  { part: 'data quality', isFilled: (outcome) => !isEstimate(outcome) && outcome.result.record.intervals > 0 },
  { part: 'method and working', isFilled: ({ result }) => result.figures.length > 0 && result.figures.every(isWorked) },
  {
    part: 'a worst interval worked in full',
    isFilled: (outcome) => isEstimate(outcome) || workedInterval(outcome).steps.every(isWorked),
  },
  { part: 'stages', isFilled: ofBank(({ result }) => result.bank.stages.length > 0) },
  { part: 'protection', isFilled: ofBank(({ result }) => result.devices.length > 0) },
  { part: 'discharge', isFilled: ofBank(({ result }) => result.charge.stages.length > 0) },
  { part: 'network', isFilled: ({ result }) => result.network.levels.length > 0 },
  { part: 'duties', isFilled: ofBank(({ result }) => result.duties.length > 0) },
  { part: 'sensitivity', isFilled: ofBank(({ result }) => result.robustness !== null) },
  { part: 'limits of validity', isFilled: ({ result }) => result.limits.points.length > 0 },
  { part: 'hand check', isFilled: ofBank(({ result }) => handChecked(result.figures).length > 0) },
  { part: 'cautions', isFilled: ({ result }) => result.cautions.length > 0 },
  {
    part: 'controller settings',
    isFilled: ofBank((outcome) => controllerSettings(outcome).some(({ setting }) => setting === 'setPoint')),
  },
  {
    part: 'page for the network operator',
    isFilled: ofBank((outcome) => operatorPage(outcome).effects.length > 0),
  },
  {
    part: 'maintenance',
    isFilled: ofDischarged((outcome) => maintenanceLines(outcome).length > 0),
  },
  { part: 'schedule of materials', isFilled: ofDischarged((outcome) => scheduleOfMaterials(outcome).length > 0) },
  { part: 'revision history', isFilled: (_, { revision, history }) => revision <= 1 || (history ?? []).length > 0 },
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

function areTold(texts: readonly (string | null)[]): boolean {
  return texts.every((text) => text !== null && text.trim() !== '');
}

function isWorked({ label, formula, working }: Pick<Figure, 'label' | 'formula' | 'working'>): boolean {
  return areTold([label]) && (formula === '' || areTold([working]));
}

function isSigned(review: ProposalFrame['review']): boolean {
  const signatures = review?.signatures ?? [];
  return (
    signatures.length > 0 &&
    signatures.every(({ name, licence, jurisdiction, date }) => areTold([name, licence, jurisdiction, date]))
  );
}

function ofBank(isFilled: (outcome: Outcome | EstimateOutcome) => boolean): Filled {
  return (outcome) => outcome.bank.groups.length === 0 || isFilled(outcome);
}

// What rests on the discharge is not told without it, and the discharge is a part of its own.
function ofDischarged(isFilled: (outcome: Outcome | EstimateOutcome) => boolean): Filled {
  return ofBank((outcome) => outcome.result.charge.stages.length === 0 || isFilled(outcome));
}
