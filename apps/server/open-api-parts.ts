import {
  header,
  json,
  listOf,
  moment,
  nullable,
  objectOf,
  open,
  type Part,
  query,
  schemaOf,
  text,
  whole,
} from './open-api-answers.js';

const siteHead = {
  id: text,
  number: whole,
  name: text,
  version: whole,
  createdAt: moment,
  updatedAt: moment,
};

const problem = {
  type: 'object',
  required: ['code', 'expected', 'found'],
  properties: { code: text, path: text, row: whole, column: whole, expected: text, found: text, unit: text },
};

const paperHead = {
  id: text,
  kind: { type: 'string', enum: ['tariff', 'prices'] },
  name: text,
  version: whole,
  date: text,
  createdAt: moment,
};

const revisionHead = {
  siteId: text,
  number: text,
  revision: whole,
  kind: { type: 'string', enum: ['plan', 'assess'] },
  verdict: { type: 'string', enum: ['clear', 'watch', 'avoid'] },
  createdAt: moment,
  author: nullable(text),
  reason: nullable(text),
  proposed: text,
  recordId: nullable(text),
  recordHash: nullable(text),
  engineVersion: text,
  contentHash: text,
  links: open,
};

/** The shapes of answers. */
export const ANSWER_SCHEMAS: Record<string, object> = {
  Problem: {
    type: 'object',
    required: ['type', 'title', 'status', 'detail', 'code', 'problems'],
    properties: {
      ...{ type: text, title: text, status: whole, detail: text, code: text, path: text, row: whole, column: whole },
      problems: listOf(problem),
      questions: listOf(open),
      offered: listOf(objectOf({ id: text, name: text })),
    },
  },
  StoredSite: objectOf({ ...siteHead, site: schemaOf('Site') }),
  LoadRecord: objectOf({
    ...{ id: text, siteId: text, hash: text, createdAt: moment, record: open, quality: open },
    againstSupply: { type: 'array', items: open },
    ...{ revision: whole, previousId: nullable(text) },
    file: objectOf({ name: nullable(text), sha256: text, bytes: whole, header: nullable(text) }),
  }),
  KeptAnswers: objectOf({
    ...{ id: text, name: text, map: open, header: nullable(text), version: whole },
    ...{ createdAt: moment, updatedAt: moment },
  }),
  KeptPaper: objectOf(paperHead),
  KeptPaperInFull: objectOf({ ...paperHead, document: open }),
  Job: objectOf({
    ...{ id: text, siteId: text, kind: text, attempt: whole, createdAt: moment, finishedAt: nullable(moment) },
    state: { type: 'string', enum: ['queued', 'running', 'done', 'failed', 'cancelled'] },
    progress: { type: 'number', minimum: 0, maximum: 1 },
    error: { nullable: true, allOf: [schemaOf('Problem')] },
    revision: nullable(whole),
    recordId: nullable(text),
    remainingS: nullable({ type: 'number' }),
    bytesPerS: nullable({ type: 'number' }),
    links: open,
  }),
  RevisionHead: objectOf(revisionHead),
  Revision: objectOf({ ...revisionHead, rival: nullable(open), inputs: open, result: open }),
};

const planning: Part = {
  parameters: [
    query('wait', 'seconds to wait for the revision, 0 to 60', { type: 'integer', minimum: 0, maximum: 60 }),
  ],
  responses: {
    200: json('Equal inputs led to this revision before.', schemaOf('Revision')),
    201: json('The revision, made within the wait.', schemaOf('Revision')),
    202: json('The job that makes the revision.', schemaOf('Job')),
  },
};

const upload: Part = {
  parameters: [
    query('format', 'format of the file, where it is not to be recognised', text),
    query('timeZone', 'zone of stamps that say none: a name or a fixed offset', text),
    query('map', 'a map as JSON, in answer to a question', text),
    query('keptMap', 'name of kept answers to read the file with; what "map" says wins', text),
    query('wait', 'seconds to wait before a job is answered instead; absent, until the file is read', {
      type: 'integer',
      minimum: 0,
      maximum: 60,
    }),
    query('name', 'name of the file', text),
  ],
  requestBody: {
    required: true,
    content: {
      'multipart/form-data': {
        schema: {
          type: 'object',
          required: ['file'],
          properties: {
            file: { type: 'string', format: 'binary' },
            ...{ format: text, timeZone: text, map: text, keptMap: text, wait: text },
          },
        },
      },
      'text/csv': { schema: text },
      'application/octet-stream': { schema: { type: 'string', format: 'binary' } },
    },
  },
  responses: {
    201: json('What was read.', schemaOf('LoadRecord')),
    202: json('The job that reads the file, where it takes longer than "wait".', schemaOf('Job')),
  },
};
const extension: Part = {
  ...upload,
  responses: {
    ...upload.responses,
    200: json('The record as it stands: the file adds nothing.', schemaOf('LoadRecord')),
  },
};

const sites = '/api/sites';
const site = `${sites}/{siteId}`;
const record = `${site}/records/{recordId}`;
const revision = `${site}/revisions/{revision}`;
const job = '/api/jobs/{jobId}';
const keptMaps = '/api/kept-maps';
const papers = '/api/papers';
const keptMap = `${keptMaps}/{keptMapId}`;

export const OPEN_API_PARTS: Record<string, Part> = {
  [`get ${sites}`]: {
    responses: {
      200: json('Every site.', objectOf({ sites: listOf(objectOf({ ...siteHead, latest: nullable(open) })) })),
    },
  },
  [`post ${sites}`]: { responses: { 201: json('The site.', schemaOf('StoredSite')) } },
  [`get ${site}`]: { responses: { 200: json('The site.', schemaOf('StoredSite')) } },
  [`put ${site}`]: {
    parameters: [header('If-Match', 'the ETag the site was read with', true)],
    responses: { 200: json('The site as it stands now.', schemaOf('StoredSite')) },
  },
  [`delete ${site}`]: { parameters: [header('If-Match', 'the ETag the site was read with', false)] },
  [`get ${site}/records`]: {
    responses: { 200: json('The records.', objectOf({ records: listOf(schemaOf('LoadRecord')) })) },
  },
  [`post ${site}/records`]: upload,
  [`get ${record}`]: { responses: { 200: json('The record.', schemaOf('LoadRecord')) } },
  [`get ${record}/revisions`]: {
    responses: { 200: json('The revisions.', objectOf({ records: listOf(schemaOf('LoadRecord')) })) },
  },
  [`post ${record}/revisions`]: extension,
  [`get ${papers}`]: {
    responses: { 200: json('Every version.', objectOf({ papers: listOf(schemaOf('KeptPaper')) })) },
  },
  [`post ${papers}`]: { responses: { 201: json('The version.', schemaOf('KeptPaperInFull')) } },
  [`get ${papers}/{paperId}`]: { responses: { 200: json('The version.', schemaOf('KeptPaperInFull')) } },
  [`get ${keptMaps}`]: {
    responses: { 200: json('The kept answers.', objectOf({ keptMaps: listOf(schemaOf('KeptAnswers')) })) },
  },
  [`post ${keptMaps}`]: { responses: { 201: json('The kept answers.', schemaOf('KeptAnswers')) } },
  [`get ${keptMap}`]: { responses: { 200: json('The kept answers.', schemaOf('KeptAnswers')) } },
  [`put ${keptMap}`]: {
    parameters: [header('If-Match', 'the ETag the answers were read with', true)],
    responses: { 200: json('The answers as they stand now.', schemaOf('KeptAnswers')) },
  },
  [`delete ${keptMap}`]: { parameters: [header('If-Match', 'the ETag the answers were read with', false)] },
  [`get ${record}/columns`]: { responses: { 200: json('One list a column.', open) } },
  [`post ${site}/plans`]: planning,
  [`post ${site}/assessments`]: planning,
  [`get ${site}/revisions`]: {
    responses: { 200: json('The revisions.', objectOf({ revisions: listOf(schemaOf('RevisionHead')) })) },
  },
  [`get ${revision}`]: { responses: { 200: json('The revision.', schemaOf('Revision')) } },
  [`get ${revision}/proposal.pdf`]: {
    responses: {
      200: {
        description: 'The proposal.',
        content: { 'application/pdf': { schema: { type: 'string', format: 'binary' } } },
      },
    },
  },
  [`get ${job}`]: { responses: { 200: json('The job.', schemaOf('Job')) } },
  [`delete ${job}`]: { responses: { 200: json('The cancelled job.', schemaOf('Job')) } },
  [`post ${job}/cancel`]: { responses: { 200: json('The cancelled job.', schemaOf('Job')) } },
  [`get ${job}/events`]: {
    parameters: [header('Last-Event-ID', 'the last event that was seen', false)],
    responses: {
      200: { description: 'Events named by the job’s state.', content: { 'text/event-stream': { schema: text } } },
      204: { description: 'The job is finished and its end was seen.' },
    },
  },
};
