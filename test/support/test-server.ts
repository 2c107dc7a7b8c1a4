import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { type Route, routesOf } from '#apps/server/declared-routes.js';
import { createServer, type ServerParts } from '#apps/server/server.js';
import { readSettings, type Settings } from '#apps/server/settings.js';
import { CHEAP_HASH } from './made-people.js';

/** Worker threads run compiled code: `npm test` builds it first. */
const WORKER = pathToFileURL(join(import.meta.dirname, '../../dist/apps/server/planning/planning-worker.js'));
const PAGE = pathToFileURL(`${join(import.meta.dirname, '../../dist/apps/web')}/`);

/** A server of this test, listening on a port of its own. */
export interface TestServer {
  /** `http://127.0.0.1:port` */
  base: string;
  /** JSON over HTTP: status, headers and body. */
  ask: (method: string, path: string, body?: unknown, headers?: Record<string, string>) => Promise<Answer>;
  /** A meter file as the body of a request. */
  upload: (siteId: string, content: string | Uint8Array, query?: Record<string, string>) => Promise<Answer>;
  /** what the router serves, and for whom */
  routes: Route[];
  close: () => Promise<void>;
}

export interface Answer {
  status: number;
  headers: Headers;
  // biome-ignore lint/suspicious/noExplicitAny: what comes back is what the test looks at
  body: any;
}

/**
 * Starts the server in this process.
 * @param dbUrl its database
 * @param settings what differs from a server without an example and without a log
 * @param parts what stands in for its own
 */
export async function startServer(
  dbUrl: string,
  settings: Partial<Settings> = {},
  parts: Partial<ServerParts> = {},
): Promise<TestServer> {
  const dataDir = mkdtempSync(join(tmpdir(), 'varwright-server-'));
  const own = readSettings({ DB_URL: dbUrl, DATA_DIR: dataDir, DEMO: 'off', LOG_LEVEL: 'silent' });
  const app = await createServer(
    { ...own, ...settings },
    {
      ...{ workerFile: WORKER, pageFolder: PAGE, hashCost: CHEAP_HASH },
      ...parts,
    },
  );
  await app.listen(0, '127.0.0.1');
  const base = `http://127.0.0.1:${new URL(await app.getUrl()).port}`;
  const close = async () => {
    await app.close();
    rmSync(dataDir, { recursive: true, force: true });
  };
  return { ...clientOf(base), routes: routesOf(app), close };
}

/** The client's half, for a server that runs elsewhere. */
export function clientOf(base: string): Omit<TestServer, 'close' | 'routes'> {
  const ask: TestServer['ask'] = async (method, path, body, headers = {}) => {
    if (body === undefined) return answerOf(await fetch(base + path, { method, headers }));
    const typed = { 'content-type': 'application/json', ...headers };
    return answerOf(await fetch(base + path, { method, headers: typed, body: JSON.stringify(body) }));
  };
  const upload: TestServer['upload'] = async (siteId, content, query = {}) => {
    const path = `${base}/api/sites/${siteId}/records?${new URLSearchParams(query)}`;
    const request = { method: 'POST', headers: { 'content-type': 'text/csv' }, body: content as string };
    return answerOf(await fetch(path, request));
  };
  return { base, ask, upload };
}

async function answerOf(response: Response): Promise<Answer> {
  const type = response.headers.get('content-type') ?? '';
  const bytes = Buffer.from(await response.arrayBuffer());
  const body = /json/.test(type) ? JSON.parse(bytes.toString()) : /^text/.test(type) ? bytes.toString() : bytes;
  return { status: response.status, headers: response.headers, body };
}
