import { differenceLines } from '#libs/present/review-words.js';
import { type FieldDifference, fieldDifferences } from '#libs/review/field-differences.js';
import type { Revision } from '#libs/store/revision.js';

/** What two computations of a site do not share, field by field. */
export interface Differences {
  /** of who made it, when and why, and what it was made with */
  about: FieldDifference[];
  inputs: FieldDifference[];
  results: FieldDifference[];
}

/** What of a revision is compared. */
export type Compared = Pick<
  Revision,
  'kind' | 'inputs' | 'result' | 'proposed' | 'verdict' | 'engineVersion' | 'recordHash' | 'author' | 'reason'
> & { createdAt: string | null };

/**
 * Compares two revisions, results included.
 * @param before the one
 * @param after the other
 */
export function differencesOf(before: Compared, after: Compared): Differences {
  const [aboutBefore, aboutAfter] = [before, after].map(({ inputs: _, result: __, ...about }) => about);
  return {
    about: fieldDifferences(aboutBefore, aboutAfter),
    inputs: fieldDifferences(JSON.parse(before.inputs), JSON.parse(after.inputs)),
    results: fieldDifferences(JSON.parse(before.result), JSON.parse(after.result)),
  };
}

/** What is compared of a stored revision. */
export function compared(revision: Revision): Compared {
  const { kind, inputs, result, proposed, verdict, engineVersion, recordHash, author, reason, createdAt } = revision;
  return {
    kind,
    inputs,
    result,
    proposed,
    verdict,
    engineVersion,
    recordHash,
    author,
    reason,
    createdAt: createdAt.toISOString(),
  };
}

/** Differences as the API shows them: absent members are left out of JSON, so each also stands in words. */
export function showDifferences(found: Differences) {
  const told = (list: FieldDifference[]) => ({ count: list.length, fields: list, lines: differenceLines(list) });
  return { about: told(found.about), inputs: told(found.inputs), results: told(found.results) };
}
