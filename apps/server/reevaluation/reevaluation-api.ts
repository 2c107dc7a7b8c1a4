import { file, json, listOf, objectOf, open, type Part, schemaOf, text } from '../open-api-answers.js';

const reevaluation = '/api/sites/{siteId}/revisions/{revision}/reevaluation';

/** A bank judged again, by method and path. */
export const REEVALUATION_PARTS: Record<string, Part> = {
  [`get ${reevaluation}`]: {
    responses: {
      200: json(
        'What to do first, what changed, since when, what mends it, and the bank as it is judged now.',
        objectOf({
          ...{ revision: schemaOf('RevisionHead'), reevaluation: open },
          ...{ tonight: listOf(text), since: listOf(text), result: open },
        }),
      ),
    },
  },
  [`get ${reevaluation}/proposal.pdf`]: { responses: { 200: file('The same as a paper.', 'application/pdf') } },
};
