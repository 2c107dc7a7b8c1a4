import {
  file,
  fileBody,
  json,
  listOf,
  nullable,
  objectOf,
  open,
  type Part,
  query,
  schemaOf,
  text,
  whole,
} from '../open-api-answers.js';

const TABLES = [
  'application/json',
  'text/csv',
  'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet',
] as const;

const asTable = (description: string): Part => ({
  parameters: [query('form', 'form of the file; json where absent', { type: 'string', enum: ['json', 'csv', 'xlsx'] })],
  responses: { 200: file(description, ...TABLES) },
});

const site = '/api/sites/{siteId}';
const revision = `${site}/revisions/{revision}`;

/** What leaves as a file, what comes back as one, and the example; by method and path. */
export const EXPORT_PARTS: Record<string, Part> = {
  [`get ${site}/export`]: asTable('The site file.'),
  [`get ${site}/records/{recordId}/export`]: asTable('The load record.'),
  [`get ${revision}/plan`]: asTable('The plan.'),
  [`get ${revision}/calculation`]: asTable('The calculation sheet.'),
  [`get ${revision}/figures`]: {
    responses: {
      200: json('Every figure as SVG.', objectOf({ figures: listOf(objectOf({ name: text, svg: text })) })),
    },
  },
  'post /api/site-imports': {
    requestBody: fileBody(...TABLES.slice(1)),
    responses: { 201: json('The site.', schemaOf('StoredSite')) },
  },
  'post /api/plan-imports': {
    requestBody: fileBody(...TABLES),
    responses: {
      201: json(
        'The site of the plan, what the plan says of itself, and the revisions of equal inputs that stand here.',
        objectOf({
          ...{ id: text, name: text, version: whole, site: open, text },
          plan: objectOf({
            ...{ kind: text, contentHash: text, resultHash: text, recordHash: nullable(text) },
            ...{ engineVersion: text, verdict: text },
          }),
          revisions: listOf(
            objectOf({ siteId: text, number: text, revision: whole, hasItsNumbers: { type: 'boolean' } }),
          ),
        }),
      ),
    },
  },
  'get /api/demo/site.json': { responses: { 200: json('The site file of the example.', open) } },
  'get /api/demo/load.csv': { responses: { 200: file('The meter file of the example.', 'text/csv') } },
  'get /api/openapi.json': { responses: { 200: json('This description.', open) } },
};
