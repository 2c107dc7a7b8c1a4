import type { EntityManager } from 'typeorm';
import { type FieldDifference, fieldDifferences } from '#libs/review/field-differences.js';
import type { KnownPaper, PaperStanding } from '#libs/review/paper-standing.js';
import type { ReviewState } from '#libs/review/review.js';
import { type RegisterFault, registerFaults } from './register.js';
import { readReview } from './reviews.js';
import type { Revision } from './revision.js';
import { revisionsOfContent, type Seen } from './verify-paper.js';

/** An exported plan or calculation sheet, as it is held against the register. */
export interface ExportToVerify {
  kind: 'plan' | 'calculation';
  /** of the plan, 64 hexadecimal digits */
  contentHash: string;
  /** result of a plan, figures of a sheet; null where the file itself shows that it was changed */
  numbers: object | null;
}

/** What is said of an exported file, and of the register that says it. */
export interface VerifiedExport {
  standing: PaperStanding;
  /** the revision of its inputs, the one with its numbers before any other */
  paper: Omit<KnownPaper, 'matched' | 'sha256'> | null;
  /** where its numbers are not the revision's: `before` the revision's, `after` the file's */
  differences: FieldDifference[];
  faults: RegisterFault[];
}

const STANDING: Record<ReviewState, PaperStanding> = {
  draft: 'draft',
  forReview: 'draft',
  approved: 'approved',
  superseded: 'superseded',
  withdrawn: 'withdrawn',
};

/** What is sought first among revisions of equal inputs. */
const ORDER: readonly ReviewState[] = ['approved', 'superseded', 'forReview', 'draft', 'withdrawn'];

/**
 * Says what an exported plan or calculation sheet is worth: the revisions of its inputs, and whether it has their numbers.
 * @param manager a read's manager
 * @param held the file
 * @param seen narrows the search
 */
export async function verifyExport(
  manager: EntityManager,
  { kind, contentHash, numbers }: ExportToVerify,
  seen: Seen,
): Promise<VerifiedExport> {
  const compared = await Promise.all(
    (await revisionsOfContent(manager, [contentHash], seen)).map(async (revision) => {
      const { state, supersededBy } = (await readReview(manager, revision.id)).review;
      const kept = numbersOf(revision, kind);
      return { revision, state, supersededBy, differences: numbers === null ? [] : fieldDifferences(kept, numbers) };
    }),
  );
  compared.sort(
    (one, other) =>
      one.differences.length - other.differences.length || ORDER.indexOf(one.state) - ORDER.indexOf(other.state),
  );
  const [best] = compared;
  if (best === undefined) {
    return { standing: numbers === null ? 'altered' : 'unknown', paper: null, differences: [], faults: [] };
  }
  const { revision, state, supersededBy, differences } = best;
  const faults = await registerFaults(manager, revision.id);
  const isSame = numbers !== null && differences.length === 0 && faults.length === 0;
  const { siteId, number, id: revisionId, revision: count } = revision;
  return {
    standing: isSame ? STANDING[state] : 'altered',
    paper: { siteId, revisionId, number, revision: count, state, supersededBy, contentHash },
    differences,
    faults,
  };
}

function numbersOf({ result }: Revision, kind: ExportToVerify['kind']): unknown {
  const kept = JSON.parse(result) as { figures: unknown };
  return kind === 'plan' ? kept : kept.figures;
}
