import type { FastifyRequest } from 'fastify';
import { RefusedRequest } from './refused-request.js';
import { isLocal, type Settings } from './settings.js';

const LOCAL_NAMES = ['127.0.0.1', 'localhost', '[::1]'];
const READING = ['GET', 'HEAD', 'OPTIONS'];

type Asked = Pick<FastifyRequest, 'headers' | 'method'>;

/**
 * Makes the check that refuses what a page of another site sends through the user's browser. Without accounts, being on
 * this machine is all that protects the data: then a foreign name that was made to point here does not pass either.
 * @param settings how the server is reached
 * @returns a check that throws RefusedRequest
 */
export function foreignCheck(settings: Pick<Settings, 'host' | 'origin'>): (request: Asked) => void {
  const { origin: own } = settings;
  const names = own === null ? LOCAL_NAMES : [...LOCAL_NAMES, new URL(own).hostname];
  // Beyond this machine and without a name of its own the server cannot know by which it is reached.
  const takesAnyName = own === null && !isLocal(settings);
  return ({ headers, method }) => {
    const { host = '', origin, 'sec-fetch-site': fetchSite } = headers;
    const name = host.replace(/:\d+$/, '').toLowerCase();
    if (!takesAnyName && !names.includes(name)) {
      const found = `host ${JSON.stringify(name.slice(0, 60))}`;
      throw refusal(421, 'a request to this server by one of its own names', found);
    }
    if (READING.includes(method)) return;
    const isForeign =
      origin === undefined ? fetchSite === 'cross-site' : ![own, `http://${host}`, `https://${host}`].includes(origin);
    if (isForeign) throw refusal(403, 'a request by a page of this server', 'a page of another site');
  };
}

function refusal(status: number, expected: string, found: string): RefusedRequest {
  const title = status === 421 ? 'Not the name of this server' : 'Not from here';
  return new RefusedRequest(status, title, { code: 'usage', expected, found });
}
