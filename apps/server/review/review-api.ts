import {
  file,
  fileBody,
  header,
  json,
  listOf,
  nullable,
  open,
  type Part,
  query,
  schemaOf,
  text,
  whole,
} from '../open-api-answers.js';

const answer = (description: string, schema: object): Part => ({ responses: { 200: json(description, schema) } });
const IF_MATCH = header('If-Match', 'the ETag the review was read with', true);

const STATES = ['draft', 'forReview', 'approved', 'superseded', 'withdrawn'];
const STANDINGS = ['approved', 'superseded', 'withdrawn', 'draft', 'altered', 'unknown'];
const differences = {
  type: 'object',
  required: ['count', 'fields', 'lines'],
  properties: { count: whole, fields: listOf(open), lines: listOf(text) },
};

/** The shapes of answers, by name. */
export const REVIEW_SCHEMAS: Record<string, object> = {
  Review: {
    type: 'object',
    required: ['siteId', 'number', 'revision', 'version', 'state', 'findings', 'figures', 'signatures', 'log', 'links'],
    properties: {
      ...{ siteId: text, number: text, revision: whole, version: whole, stateText: text },
      state: { type: 'string', enum: STATES },
      ...{ preparers: listOf(open), findings: listOf(open), figures: listOf(open), handChecks: listOf(open) },
      ...{ comments: listOf(open), signatures: listOf(open), commissioning: listOf(open), open: listOf(text) },
      ...{
        approval: nullable(open),
        ownApproval: nullable(open),
        returned: nullable(open),
        withdrawal: nullable(open),
      },
      ...{ supersededBy: nullable(whole), stale: nullable(open), installedBank: nullable(open) },
      ...{ log: listOf(open), links: open },
    },
  },
  Differences: {
    type: 'object',
    required: ['about', 'inputs', 'results'],
    properties: { before: open, after: open, about: differences, inputs: differences, results: differences },
  },
  VerifiedPaper: {
    type: 'object',
    required: ['standing', 'signedAfterwards', 'text', 'paper', 'faults', 'sha256'],
    properties: {
      ...{ signedAfterwards: { type: 'boolean' }, text, paper: nullable(open), faults: listOf(open), sha256: text },
      exported: {
        ...open,
        description:
          'of an exported plan or calculation sheet: kind, content hash, values that differ, how it was changed',
      },
      standing: { type: 'string', enum: STANDINGS },
    },
  },
};

const WORKBOOK = 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet';
const revision = '/api/sites/{siteId}/revisions/{revision}';
const acts = ['submit', 'findings', 'hand-checks', 'comments', 'return', 'own-approval', 'approve', 'supersede'];

/** By method and path; merged into the description. */
export const REVIEW_PARTS: Record<string, Part> = {
  [`get ${revision}/review`]: answer('The review; the ETag is its version.', schemaOf('Review')),
  ...Object.fromEntries(
    [...acts, 'withdraw', 'commissioning'].map((act) => [
      `post ${revision}/review/${act}`,
      { parameters: [IF_MATCH], ...answer('The review after it.', schemaOf('Review')) },
    ]),
  ),
  [`get ${revision}/approved.pdf`]: { responses: { 200: file('The paper of the approval.', 'application/pdf') } },
  [`get ${revision}/differences/{other}`]: answer('What differs.', schemaOf('Differences')),
  [`post ${revision}/again`]: answer('What the engine as it is makes of the same inputs, and what differs.', open),
  'post /api/verify': {
    requestBody: fileBody('application/pdf', 'application/json', 'text/csv', WORKBOOK),
    ...answer('What the paper is worth.', schemaOf('VerifiedPaper')),
  },
  'get /api/verify': {
    parameters: [query('number', 'content number, 16 or 64 digits', text, true)],
    ...answer('The revisions of that number.', open),
  },
};
