import { connect } from 'node:net';
import { Controller, Get } from '@nestjs/common';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { databases, type TestDatabase } from '../support/databases.js';
import { startServer, type TestServer } from '../support/test-server.js';
import { siteFile } from './site-builder.js';

const ZERO = '00000000-0000-0000-0000-000000000000';

describe('any request', () => {
  let database: TestDatabase;
  let server: TestServer;
  let siteId: string;

  beforeAll(async () => {
    database = await databases[0]!.create();
    server = await startServer(database.url);
    siteId = (await server.ask('POST', '/api/sites', siteFile())).body.id;
  });

  afterAll(async () => {
    await server.close();
    await database.drop();
  });

  it.each([
    ['GET', '/api/nothing', 404],
    ['GET', '/api', 404],
    ['GET', '/nothing', 404],
    ['PATCH', '/api/sites', 404],
    ['GET', `/api/sites/${ZERO}/records`, 404],
    ['GET', `/api/sites/${ZERO}/revisions/1/proposal.pdf`, 404],
    ['GET', '/api/jobs/99999999999999', 404],
    ['GET', '/api/jobs/-1/events', 404],
    ['GET', '/api/jobs/1/events', 404],
    ['GET', '/%E0%A4%A', 400],
    ['GET', '/sites/none', 404],
  ])('%s %s that leads nowhere is %i as problem+json', async (method, path, status) => {
    const answer = await server.ask(method, path);
    expect(answer.status).toBe(status);
    expect(answer.headers.get('content-type')).toMatch(/^application\/problem\+json/);
    expect(answer.body).toMatchObject({ status, problems: expect.any(Array), code: expect.any(String) });
  });

  const send = (path: string, body: string, type: string, more: Record<string, string> = {}) =>
    fetch(server.base + path, { method: 'POST', body, headers: { 'content-type': type, ...more } });

  it.each([
    ['/api/sites', '{"name":', 'application/json', 400, 'no JSON'],
    ['/api/sites', '{"__proto__":{"a":1}}', 'application/json', 400, 'reaches for the prototype'],
    ['/api/sites', 'name=x', 'application/x-www-form-urlencoded', 415, 'a form'],
    ['/api/sites', 'a,b', 'text/csv', 415, 'a file where a site belongs'],
    ['/api/sites', 'hello', 'text/plain', 415, 'text'],
    ['/api/sites', '[]', 'application/json', 422, 'a list is no site'],
    ['/api/sites', 'null', 'application/json', 422, 'nothing is no site'],
    ['/api/sites', `{"name":"${'x'.repeat(1_100_000)}"}`, 'application/json', 413, 'longer than any site'],
    [`/api/sites/SITE/records`, '{}', 'application/json', 415, 'JSON where a file belongs'],
    [`/api/sites/SITE/plans`, '{"colour":1}', 'application/json', 422, 'an unknown key'],
    [`/api/sites/SITE/assessments`, '{"recordId":5}', 'application/json', 422, 'a number where text belongs'],
    [`/api/sites/SITE/plans?wait=soon`, '{}', 'application/json', 422, 'no number of seconds'],
    [`/api/sites/SITE/plans?colour=red`, '{}', 'application/json', 422, 'an unknown parameter'],
  ])('to %s with the body %.20s (%s) is %i: %s', async (path, body, type, status) => {
    const response = await send(path.replace('SITE', siteId), body, type);
    expect(response.status).toBe(status);
    expect(response.headers.get('content-type')).toMatch(/^application\/problem\+json/);
    expect(await response.json()).toMatchObject({ status });
  });

  it('by a name that was made to point here is refused', async () => {
    const raw = await new Promise<string>((resolve, reject) => {
      const { hostname, port } = new URL(server.base);
      const socket = connect(Number(port), hostname, () =>
        socket.write('GET /api/sites HTTP/1.1\r\nHost: planner.example\r\nConnection: close\r\n\r\n'),
      );
      let text = '';
      socket.on('data', (chunk) => (text += chunk));
      socket.on('end', () => resolve(text));
      socket.on('error', reject);
    });
    expect(raw).toMatch(/^HTTP\/1\.1 421 /);
    expect(raw).toContain('application/problem+json');
  });

  it('by a page of another site may read nothing and write nothing', async () => {
    const foreign = { origin: 'https://elsewhere.example' };
    expect((await server.ask('POST', '/api/sites', siteFile(), foreign)).status).toBe(403);
    expect((await server.ask('POST', '/api/sites', siteFile(), { 'sec-fetch-site': 'cross-site' })).status).toBe(403);
    expect((await server.ask('POST', '/api/sites', siteFile(), { origin: server.base })).status).toBe(201);
    expect((await server.ask('GET', '/api/sites')).headers.get('access-control-allow-origin')).toBeNull();
  });

  it('is answered with headers that keep a page to itself', async () => {
    const { headers } = await server.ask('GET', '/');
    expect(headers.get('content-security-policy')).toContain("default-src 'self'");
    expect(headers.get('content-security-policy')).not.toContain('upgrade-insecure-requests');
    expect(headers.get('strict-transport-security')).toBeNull();
    expect(headers.get('x-content-type-options')).toBe('nosniff');
  });

  it('for health or readiness is answered', async () => {
    expect((await server.ask('GET', '/healthz')).body).toEqual({ status: 'ok' });
    expect((await server.ask('GET', '/readyz')).body).toEqual({ status: 'ready' });
  });
});

describe('a route that does not say who may use it', () => {
  @Controller('api/silent')
  class SilentController {
    @Get()
    tell() {
      return 'everything';
    }
  }

  it('keeps the server from starting', async () => {
    const database = await databases[0]!.create();
    await expect(startServer(database.url, {}, { controllers: [SilentController] })).rejects.toThrow(
      /do not say who may use them: SilentController\.tell/,
    );
    await database.drop();
  });
});

describe('the description of the API', () => {
  it('names every route with what it does, and the whole site file', async () => {
    const database = await databases[0]!.create();
    const server = await startServer(database.url);
    const { status, body } = await server.ask('GET', '/api/openapi.json');
    expect(status).toBe(200);
    expect(body.openapi).toBe('3.0.0');
    const operations = Object.entries(body.paths as Record<string, Record<string, { summary: string }>>).flatMap(
      ([path, item]) => Object.entries(item).map(([method, { summary }]) => `${method} ${path}: ${summary}`),
    );
    expect(operations).toContain('post /api/sites: Adds a site. The body is the site file.');
    expect(operations.every((line) => /: .{10,}/.test(line))).toBe(true);
    expect(operations.length).toBeGreaterThan(20);
    const text = JSON.stringify(body);
    for (const word of ['faultLevelMva', 'impedancePct', 'reactorPct', 'recordId', 'problem+json']) {
      expect(text).toContain(word);
    }
    await server.close();
    await database.drop();
  });

  it('holds every route of the router and none that it does not serve, and says what each of the API answers', async () => {
    const database = await databases[0]!.create();
    const server = await startServer(database.url);
    const { paths } = (await server.ask('GET', '/api/openapi.json')).body as {
      paths: Record<string, Record<string, { responses: Record<string, { content?: object }> }>>;
    };
    const described = Object.entries(paths).flatMap(([path, item]) => Object.keys(item).map((key) => `${key} ${path}`));
    const served = server.routes
      .filter(({ path }) => !path.endsWith('*'))
      .map(({ method, path }) => `${method.toLowerCase()} ${path.replace(/:(\w+)/g, '{$1}')}`);
    expect(described.sort()).toEqual([...new Set(served)].sort());
    const silent = served.filter((line) => {
      const [method, path] = line.split(' ') as [string, string];
      const { responses } = paths[path]![method]!;
      const good = Object.entries(responses).filter(([status]) => status.startsWith('2'));
      return (
        path.startsWith('/api/') && !good.some(([status, { content }]) => status === '204' || content !== undefined)
      );
    });
    expect(silent).toEqual([]);
    await server.close();
    await database.drop();
  });
});
