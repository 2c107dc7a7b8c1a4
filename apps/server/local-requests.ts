import type { FastifyRequest } from 'fastify';
import { RefusedRequest } from './refused-request.js';

const LOCAL_NAMES = ['127.0.0.1', 'localhost', '[::1]'];
const READING = ['GET', 'HEAD', 'OPTIONS'];

/**
 * Refuses what a page of another site may send through the user's browser: there are no accounts yet, so being on this
 * machine is all that protects the data. A foreign name that was made to point here does not pass, nor does a form.
 * @param request what came in
 * @throws RefusedRequest
 */
export function refuseForeign(request: Pick<FastifyRequest, 'headers' | 'method'>): void {
  const { host = '', origin, 'sec-fetch-site': fetchSite } = request.headers;
  const name = host.replace(/:\d+$/, '').toLowerCase();
  if (!LOCAL_NAMES.includes(name)) {
    throw refusal(
      421,
      'a request to this machine by one of its own names',
      `host ${JSON.stringify(name.slice(0, 60))}`,
    );
  }
  if (READING.includes(request.method)) return;
  const isForeign = origin === undefined ? fetchSite === 'cross-site' : origin !== `http://${host}`;
  if (isForeign) throw refusal(403, 'a request by a page of this server', 'a page of another site');
}

function refusal(status: number, expected: string, found: string): RefusedRequest {
  const title = status === 421 ? 'Not the name of this server' : 'Not from here';
  return new RefusedRequest(status, title, { code: 'usage', expected, found });
}
