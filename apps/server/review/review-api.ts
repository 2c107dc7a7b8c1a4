/** What the routes of review and verification answer with, for the API's description. */
const text = { type: 'string' };
const whole = { type: 'integer' };
const open = { type: 'object', additionalProperties: true };
const listOf = (items: object) => ({ type: 'array', items });
const nullable = (schema: object) => ({ ...schema, nullable: true });
const answer = (description: string, schema: object) => ({
  responses: { 200: { description, content: { 'application/json': { schema } } } },
});
const paper = (description: string) => ({
  responses: { 200: { description, content: { 'application/pdf': { schema: { type: 'string', format: 'binary' } } } } },
});
const IF_MATCH = {
  in: 'header',
  name: 'If-Match',
  description: 'the ETag the review was read with',
  required: true,
  schema: text,
};

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
      standing: { type: 'string', enum: STANDINGS },
    },
  },
};

const revision = '/api/sites/{siteId}/revisions/{revision}';
const acts = ['submit', 'findings', 'hand-checks', 'comments', 'return', 'own-approval', 'approve', 'supersede'];
const schemaOf = (name: string) => ({ $ref: `#/components/schemas/${name}` });

/** By method and path; merged into the description. */
export const REVIEW_PARTS: Record<
  string,
  { parameters?: object[]; requestBody?: object; responses?: Record<string, object> }
> = {
  [`get ${revision}/review`]: answer('The review; the ETag is its version.', schemaOf('Review')),
  ...Object.fromEntries(
    [...acts, 'withdraw', 'commissioning'].map((act) => [
      `post ${revision}/review/${act}`,
      { parameters: [IF_MATCH], ...answer('The review after it.', schemaOf('Review')) },
    ]),
  ),
  [`get ${revision}/approved.pdf`]: paper('The paper of the approval.'),
  [`get ${revision}/differences/{other}`]: answer('What differs.', schemaOf('Differences')),
  [`post ${revision}/again`]: answer('What the engine as it is makes of the same inputs, and what differs.', open),
  'post /api/verify': {
    requestBody: {
      required: true,
      content: { 'application/pdf': { schema: { type: 'string', format: 'binary' } } },
    },
    ...answer('What the paper is worth.', schemaOf('VerifiedPaper')),
  },
  'get /api/verify': {
    parameters: [
      { in: 'query', name: 'number', description: 'content number, 16 or 64 digits', required: true, schema: text },
    ],
    ...answer('The revisions of that number.', open),
  },
};
