import type { Problem, Verdict } from '#libs/engine/index.js';
import type { FieldDifference } from '#libs/review/field-differences.js';
import type { PaperStanding } from '#libs/review/paper-standing.js';
import type { ReviewState } from '#libs/review/review.js';
import { plainName } from './plain-name.js';
import { differenceLines, paperWords, STATE_WORDS } from './review-words.js';
import { VERDICT_WORDS } from './verdict-words.js';

/** An exported file and what the register says of it. */
export interface ToldExport {
  kind: 'plan' | 'calculation';
  standing: PaperStanding;
  /** "P-0001, revision 3", null where it led to none */
  name: string | null;
  state: ReviewState | null;
  supersededBy: number | null;
  differences: readonly FieldDifference[];
  /** how the file itself shows that it was changed */
  fault: Problem | null;
  registerHolds: boolean;
}

const KIND_WORDS = { plan: 'plan', calculation: 'calculation sheet' } as const;

/**
 * What is said to whoever holds an exported plan or calculation sheet: the finding first, then what to do.
 * @param told from the register
 */
export function exportWords(told: ToldExport): string {
  const { kind, standing, name, state, supersededBy, registerHolds } = told;
  if (!registerHolds) return paperWords({ ...told, signedAfterwards: false });
  const file = KIND_WORDS[kind];
  const later = supersededBy === null ? 'a later revision' : `revision ${supersededBy}`;
  return {
    approved: `The numbers that were approved: ${file} of ${name}.`,
    superseded: `Superseded: the numbers of ${name}, which was approved; ${later} has taken its place.`,
    withdrawn: `Withdrawn: the numbers of ${name}, which is not to be used.`,
    draft: `The numbers of ${name}, which is ${state === null ? 'unknown' : STATE_WORDS[state]}. Not for construction.`,
    altered: alteredWords(told),
    unknown: `Unknown: no plan of this register has its inputs. It may come from another installation: take it back with its record, compute it again and compare.`,
  }[standing];
}

function alteredWords({ kind, name, differences, fault }: ToldExport): string {
  const file = KIND_WORDS[kind];
  const whose = name === null ? 'a plan this register does not have' : name;
  if (fault !== null) {
    const { path, row, expected, found } = fault;
    const where = path === undefined ? '' : ` ${path}${row === undefined ? '' : `, row ${row}`}:`;
    return `Altered: it says it is the ${file} of ${whose}.${where} Expected ${expected}; found ${found}.`;
  }
  const [first = ''] = differenceLines(differences);
  const count = differences.length === 1 ? '1 value is' : `${differences.length} values are`;
  return `Altered: it has the inputs of ${whose}, and ${count} not that revision’s: ${first}.`;
}

/** A plan that was taken back. */
export interface ToldPlan {
  kind: 'plan' | 'assess';
  contentHash: string;
  recordHash: string | null;
  /** whether its tariff or prices were shared papers */
  hasPapers: boolean;
}

/**
 * What to do with a plan that was taken back, so that it stands here too.
 * @param told what it says of itself
 */
export function takenPlanWords({ kind, contentHash, recordHash, hasPapers }: ToldPlan): string {
  const asked = kind === 'plan' ? 'ask for a plan' : 'ask for an assessment';
  const first =
    recordHash === null
      ? `Its estimate stands in the site; ${asked}`
      : `Upload its record, ${recordHash.slice(0, 16)}, and ${asked}`;
  const content = hasPapers
    ? 'Its shared papers stand in the site as its own, so that the new revision has another content number and the same numbers.'
    : `With the same engine the revision has the content ${contentHash.slice(0, 16)} again; verify then compares every value.`;
  return `The plan is as it was exported. ${first}. ${content}`;
}

/** What a file that was taken back says of itself. */
export type ToldTaken =
  | { kind: 'calculation'; contentHash: string; ownHash: string; figures: number }
  | {
      kind: 'plan' | 'assess';
      contentHash: string;
      /** of the result */
      ownHash: string;
      name: string;
      verdict: Verdict;
      engineVersion: string;
      recordHash: string | null;
    };

/**
 * A plan or a calculation sheet that was taken back, for a terminal.
 * @param told what it says of itself
 * @returns lines, the last with its end
 */
export function takenLines(told: ToldTaken): string {
  const { kind, contentHash, ownHash } = told;
  if (kind === 'calculation') {
    return `calculation sheet of ${told.figures} figures, as it was exported\ncontent ${contentHash}\nsheet ${ownHash}\n`;
  }
  const { name, verdict, engineVersion, recordHash } = told;
  const what = kind === 'plan' ? 'plan' : 'assessment';
  return `${plainName(name)}: ${what}, ${VERDICT_WORDS[verdict]}, as it was exported
content ${contentHash}
result ${ownHash}
${recordHash === null ? 'by an estimate' : `record ${recordHash}`}
engine ${engineVersion}
`;
}

const MOST_LINES = 40;

/**
 * What computing it again gave, for a terminal.
 * @param differences from what the file holds
 * @param engineVersion of the engine that computed
 * @returns lines, the last with its end
 */
export function againLines(differences: readonly FieldDifference[], engineVersion: string): string {
  const by = `computed again by engine ${engineVersion}`;
  if (differences.length === 0) return `${by}: the same, every value\n`;
  const more = differences.length > MOST_LINES ? [`and ${differences.length - MOST_LINES} more`] : [];
  const count = differences.length === 1 ? '1 value is another' : `${differences.length} values are others`;
  return `${[`${by}: ${count}`, ...differenceLines(differences.slice(0, MOST_LINES)), ...more].join('\n')}\n`;
}
