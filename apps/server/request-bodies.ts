import type { FastifyInstance, FastifyRequest } from 'fastify';
import { RefusedRequest } from './refused-request.js';

const UPLOADS = /\/records(\/:recordId\/revisions)?$|^\/api\/(verify|site-imports|plan-imports)$/;
/** What may come in as JSON too, larger than a body that is read as such. */
const JSON_FILES = /^\/api\/(verify|plan-imports)$/;
/** Pages that work without scripts send forms; nothing else takes them. */
const FORMS = /^\/(sign-in|sign-out|people|account)(\/|$)/;
const FORM_TYPE = 'application/x-www-form-urlencoded';
const FILE_TYPES = [
  'text/csv',
  'application/octet-stream',
  'application/pdf',
  'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet',
];

/**
 * Reads bodies as JSON, on the routes that take files as files, and refuses every other kind.
 * @param fastify the router, before its routes are registered
 */
export function refuseOtherBodies(fastify: FastifyInstance): void {
  fastify.removeContentTypeParser(['text/plain', 'application/json']);
  fastify.addContentTypeParser('application/json', { parseAs: 'string' }, (_request, text, done) => {
    try {
      done(null, parseJson(String(text)));
    } catch (error) {
      done(error as Error);
    }
  });
  fastify.addContentTypeParser(FILE_TYPES, (request, payload, done) => {
    if (UPLOADS.test(request.routeOptions.url ?? '')) done(null, payload);
    else done(otherType('application/json'));
  });
  fastify.addContentTypeParser(FORM_TYPE, { parseAs: 'string', bodyLimit: 10_000 }, (request, text, done) => {
    if (FORMS.test(request.routeOptions.url ?? '')) done(null, Object.fromEntries(new URLSearchParams(String(text))));
    else done(otherType('application/json'));
  });
  fastify.addHook('onRequest', async ({ routeOptions, headers }) => {
    if (!JSON_FILES.test(routeOptions.url ?? '') || !/^application\/json\b/.test(headers['content-type'] ?? '')) return;
    headers['content-type'] = 'application/octet-stream';
  });
  fastify.addHook('preValidation', async (request) => {
    const isUpload = takesFile(request);
    const type = request.headers['content-type'] ?? 'nothing';
    const isFile = request.isMultipart() || FILE_TYPES.some((known) => type.startsWith(known));
    if (isUpload && !isFile) throw otherType(`multipart/form-data or ${FILE_TYPES.join(' or ')}`);
    if (!isUpload && isFile) throw otherType('application/json');
  });
}

/** Whether the body of a request is a file, or a form with one. */
export function takesFile({ routeOptions, method }: FastifyRequest): boolean {
  return UPLOADS.test(routeOptions.url ?? '') && method === 'POST';
}

/** JSON.parse, but a key that would reach an object's prototype is refused rather than dropped. */
function parseJson(text: string): unknown {
  const problem = (found: string) =>
    new RefusedRequest(400, 'The request cannot be read', { code: 'unreadable', expected: 'a body in JSON', found });
  try {
    return JSON.parse(text, (key, value) => {
      if (key === '__proto__') throw problem('the key "__proto__"');
      return value;
    });
  } catch (error) {
    throw error instanceof RefusedRequest ? error : problem('text that is no JSON');
  }
}

function otherType(expected: string): RefusedRequest {
  const problem = { code: 'usage', path: 'Content-Type', expected, found: 'another type' } as const;
  return new RefusedRequest(415, 'A body of another type', problem);
}
