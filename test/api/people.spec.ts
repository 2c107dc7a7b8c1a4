import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { openStore } from '#libs/store/open-store.js';
import { PersonSession } from '#libs/store/person-session.js';
import { databases, type TestDatabase } from '../support/databases.js';
import { type MadePerson, makePeople } from '../support/made-people.js';
import { startServer, type TestServer } from '../support/test-server.js';
import { siteFile } from './site-builder.js';

type People = Awaited<ReturnType<typeof makePeople>>;

const cookieOf = (headers: Headers) => /varwright-session=[^;]*/.exec(headers.get('set-cookie') ?? '')?.[0] ?? '';

for (const { name, available, create } of databases) {
  describe.runIf(available)(`people, on ${name}`, () => {
    let database: TestDatabase;
    let server: TestServer;
    let ours: People;
    let theirs: People;
    const signIn = ({
      organisation,
      signInName,
      password,
    }: Pick<MadePerson, 'organisation' | 'signInName' | 'password'>) =>
      server.ask('POST', '/api/session', { organisation, signInName, password });

    beforeAll(async () => {
      database = await create();
      ours = await makePeople(database.url, 'north');
      theirs = await makePeople(database.url, 'south', ['administrator']);
      server = await startServer(database.url);
    });

    afterAll(async () => {
      await server.close();
      await database.drop();
    });

    it('are nobody without a session or a key, also on this machine', async () => {
      const { status, body } = await server.ask('GET', '/api/sites');
      expect([status, body.code]).toEqual([401, 'usage']);
      expect((await server.ask('GET', '/api/sites', undefined, { authorization: 'Bearer no' })).status).toBe(401);
      expect((await server.ask('GET', '/healthz')).status).toBe(200);
    });

    it('sign in to a session that ends when they sign out', async () => {
      const { status, headers, body } = await signIn(ours.planner);
      expect([status, body.name, body.role]).toEqual([200, 'planner of north', 'planner']);
      const set = headers.get('set-cookie')!;
      expect(set).toMatch(/^varwright-session=[\w-]{43}; Path=\/; HttpOnly; SameSite=Strict; Max-Age=43200$/);
      const cookie = { cookie: cookieOf(headers) };
      expect((await server.ask('GET', '/api/session', undefined, cookie)).body.personId).toBe(ours.planner.id);
      const ended = await server.ask('DELETE', '/api/session', undefined, cookie);
      expect([ended.status, ended.headers.get('set-cookie')]).toEqual([204, expect.stringContaining('Max-Age=0')]);
      expect((await server.ask('GET', '/api/session', undefined, cookie)).status).toBe(401);
    });

    it('whose session has expired are nobody', async () => {
      const cookie = { cookie: cookieOf((await signIn(ours.viewer)).headers) };
      const store = await openStore(database.url);
      await store.write((manager) =>
        manager.update(PersonSession, { personId: ours.viewer.id }, { expiresAt: new Date(0) }),
      );
      await store.close();
      expect((await server.ask('GET', '/api/session', undefined, cookie)).status).toBe(401);
    });

    it('are told the same whichever of organisation, name and password is wrong', async () => {
      const wrong = [
        { ...ours.viewer, password: 'not the password' },
        { ...ours.viewer, signInName: 'nobody' },
        { ...ours.viewer, organisation: 'nowhere' },
        { ...ours.viewer, organisation: 'south' },
        { ...ours.viewer, organisation: '' },
      ];
      const bodies = [];
      for (const one of wrong) bodies.push((await signIn(one)).body);
      expect(bodies[0]).toMatchObject({ status: 401, title: 'Not signed in' });
      for (const body of bodies) expect(body).toEqual(bodies[0]);
    });

    it('may try a password ten times in a quarter of an hour', async () => {
      const guess = () => signIn({ ...ours.reviewer, password: 'a guess of many' });
      const first = await Promise.all(Array.from({ length: 10 }, guess));
      expect(first.map(({ status }) => status)).toEqual(Array(10).fill(401));
      expect((await guess()).status).toBe(429);
      expect((await signIn(ours.reviewer)).status).toBe(429);
    });

    it('are led from a page to the page to sign in on, and from there back', async () => {
      const visit = (path: string, init: RequestInit = {}) =>
        fetch(server.base + path, { redirect: 'manual', ...init, headers: { accept: 'text/html', ...init.headers } });
      const refused = await visit('/');
      expect([refused.status, refused.headers.get('location')]).toEqual([303, '/sign-in']);
      const page = await visit('/sign-in');
      expect(await page.text()).toContain('<form method="post" action="/sign-in">');
      expect(page.headers.get('referrer-policy')).toBe('same-origin');
      const { organisation, signInName, password } = ours.planner;
      const send = (form: Record<string, string>, headers = {}) =>
        visit('/sign-in', { method: 'POST', body: new URLSearchParams(form), headers });
      const wrong = await send({ organisation, signInName, password: '<b>wrong</b>' });
      expect([wrong.status, await wrong.text()]).toEqual([401, expect.stringContaining('role="alert"')]);
      expect((await send({ organisation, signInName, password }, { origin: 'https://elsewhere.example' })).status).toBe(
        403,
      );
      const right = await send({ organisation, signInName, password }, { origin: server.base });
      expect([right.status, right.headers.get('location')]).toEqual([303, '/']);
      const cookie = cookieOf(right.headers);
      expect((await visit('/plain', { headers: { cookie } })).status).toBe(200);
      const out = await visit('/sign-out', { method: 'POST', headers: { cookie } });
      expect([out.status, (await visit('/plain', { headers: { cookie } })).status]).toEqual([303, 303]);
    });

    it('make keys that may do at most what they may, and revoke them', async () => {
      const { headers } = ours.planner;
      const make = (body: object) => server.ask('POST', '/api/keys', body, headers);
      expect((await make({ name: 'too much', role: 'administrator' })).status).toBe(403);
      const made = await make({ name: 'meter gateway', role: 'viewer', days: 30 });
      expect([made.status, made.headers.get('cache-control')]).toEqual([201, 'no-store']);
      const key = { authorization: `Bearer ${made.body.key}` };
      expect((await server.ask('GET', '/api/session', undefined, key)).body.role).toBe('viewer');
      expect((await server.ask('POST', '/api/sites', siteFile(), key)).status).toBe(403);
      const { keys } = (await server.ask('GET', '/api/keys', undefined, headers)).body;
      expect(JSON.stringify(keys)).not.toContain(made.body.key);
      expect(keys.every(({ personId }: { personId: string }) => personId === ours.planner.id)).toBe(true);
      const revoke = (who: MadePerson) => server.ask('DELETE', `/api/keys/${made.body.id}`, undefined, who.headers);
      expect((await revoke(ours.viewer)).status).toBe(404);
      expect((await revoke(theirs.administrator)).status).toBe(404);
      expect((await revoke(ours.administrator)).status).toBe(204);
      expect((await server.ask('GET', '/api/session', undefined, key)).status).toBe(401);
    });

    it('are opened, changed and closed by an administrator, the versions seen', async () => {
      const { headers } = ours.administrator;
      const given = { signInName: 'Jo.Field', name: 'Jo Field', role: 'reviewer', password: 'a password of Jo' };
      const opened = await server.ask('POST', '/api/people', given, headers);
      expect([opened.status, opened.body.signInName, opened.body.password]).toEqual([201, 'jo.field', undefined]);
      expect((await server.ask('POST', '/api/people', { ...given, signInName: 'jo.field' }, headers)).status).toBe(409);
      // The same name in another organisation is another person, and nobody learns of the first.
      const other = await server.ask('POST', '/api/people', given, theirs.administrator.headers);
      expect(other.status).toBe(201);
      const cookie = { cookie: cookieOf((await signIn({ ...given, organisation: 'north' })).headers) };
      const path = `/api/people/${opened.body.id}`;
      const change = (tag: string, body: object) => server.ask('PUT', path, body, { ...headers, 'if-match': tag });
      expect((await server.ask('PUT', path, {}, headers)).status).toBe(428);
      expect((await change('"1"', { role: 'viewer' })).body).toMatchObject({ role: 'viewer', version: 2 });
      const stale = await change('"1"', { name: 'Late' });
      expect([stale.status, stale.body.versions]).toEqual([412, { seen: 1, current: 2 }]);
      expect(stale.headers.get('etag')).toBe('"2"');
      // Another role ends the sessions that were begun with the former.
      expect((await server.ask('GET', '/api/session', undefined, cookie)).status).toBe(401);
      const again = await signIn({ ...given, organisation: 'north' });
      expect(again.body.role).toBe('viewer');
      const remove = await server.ask('DELETE', path, undefined, { ...headers, 'if-match': '"2"' });
      expect(remove.status).toBe(204);
      expect((await signIn({ ...given, organisation: 'north' })).status).toBe(401);
      expect((await change('"3"', { name: 'Back' })).status).toBe(409);
    });

    it('never lose their last administrator', async () => {
      const { id, headers } = theirs.administrator;
      const seen = { ...headers, 'if-match': '"1"' };
      const demoted = await server.ask('PUT', `/api/people/${id}`, { role: 'planner' }, seen);
      expect([demoted.status, demoted.body.code]).toEqual([409, 'conflict']);
      expect((await server.ask('DELETE', `/api/people/${id}`, undefined, seen)).status).toBe(409);
      expect((await server.ask('GET', '/api/session', undefined, headers)).body.role).toBe('administrator');
    });

    it('change their own password by the present one, which ends their other sessions', async () => {
      const [here, there] = [await signIn(ours.viewer), await signIn(ours.viewer)].map(({ headers }) => ({
        cookie: cookieOf(headers),
      }));
      const put = (present: string) =>
        server.ask('PUT', '/api/session/password', { present, password: 'another password' }, here);
      expect((await put('not it')).status).toBe(403);
      const changed = await put(ours.viewer.password);
      expect(changed.status).toBe(204);
      expect((await server.ask('GET', '/api/session', undefined, there)).status).toBe(401);
      const renewed = { cookie: cookieOf(changed.headers) };
      expect((await server.ask('GET', '/api/session', undefined, renewed)).status).toBe(200);
      expect((await signIn({ ...ours.viewer, password: 'another password' })).status).toBe(200);
      expect((await signIn(ours.viewer)).status).toBe(401);
    });

    it('count their sites from 1, whatever another organisation has', async () => {
      const add = (who: MadePerson) => server.ask('POST', '/api/sites', siteFile(), who.headers);
      expect([(await add(ours.planner)).body.number, (await add(ours.planner)).body.number]).toEqual([1, 2]);
      expect((await add(theirs.administrator)).body.number).toBe(1);
    });
  });
}

describe('a server that others reach', () => {
  it('does not start before it has an administrator, and then refuses who is nobody', async () => {
    const database = await databases[0]!.create();
    const dataDir = mkdtempSync(join(tmpdir(), 'varwright-open-'));
    for (const reach of [{ host: '0.0.0.0' }, { origin: 'https://plans.example.org' }]) {
      await expect(startServer(database.url, reach)).rejects.toThrow(/add an administrator first/);
    }
    await makePeople(database.url, 'main', ['administrator']);
    const server = await startServer(database.url, { origin: 'https://plans.example.org' });
    expect((await server.ask('GET', '/api/sites')).status).toBe(401);
    const body = { signInName: 'administrator', password: 'main knows it well' };
    const ways: [Record<string, string>, number][] = [
      [{}, 200],
      [{ origin: 'https://plans.example.org' }, 200],
      [{ origin: 'https://elsewhere.example' }, 403],
    ];
    for (const [headers, status] of ways) {
      const answer = await server.ask('POST', '/api/session', body, headers);
      expect(answer.status).toBe(status);
      if (status === 200) expect(answer.headers.get('set-cookie')).toMatch(/^__Host-varwright-session=.*; Secure$/);
    }
    await server.close();
    rmSync(dataDir, { recursive: true, force: true });
    await database.drop();
  });

  it('needs nobody’s account on this machine, until the first is opened: an administrator’s', async () => {
    const database = await databases[0]!.create();
    const server = await startServer(database.url);
    expect((await server.ask('GET', '/api/session')).body).toMatchObject({ personId: 'local', role: 'administrator' });
    expect((await server.ask('POST', '/api/keys', { name: 'mine' })).status).toBe(409);
    const given = { signInName: 'jo', name: 'Jo Field', password: 'a password of Jo' };
    const viewer = await server.ask('POST', '/api/people', { ...given, role: 'viewer' });
    expect([viewer.status, viewer.body.path]).toEqual([409, 'role']);
    expect((await server.ask('GET', '/api/sites')).status).toBe(200);
    expect((await server.ask('POST', '/api/people', { ...given, role: 'administrator' })).status).toBe(201);
    expect((await server.ask('GET', '/api/sites')).status).toBe(401);
    await server.close();
    await database.drop();
  });
});

describe('the pages of people and accounts', () => {
  let database: TestDatabase;
  let server: TestServer;
  let cookie = '';
  const visit = async (path: string, form?: Record<string, string>) => {
    const response = await fetch(server.base + path, {
      redirect: 'manual',
      headers: { accept: 'text/html', cookie },
      ...(form === undefined ? {} : { method: 'POST', body: new URLSearchParams(form) }),
    });
    cookie = cookieOf(response.headers) || cookie;
    return { status: response.status, to: response.headers.get('location'), text: await response.text() };
  };

  beforeAll(async () => {
    database = await databases[0]!.create();
    server = await startServer(database.url);
  });

  afterAll(async () => {
    await server.close();
    await database.drop();
  });

  it('lead the local user from no account to the first, and everybody to signing in from then on', async () => {
    expect((await visit('/account')).text).toContain('You need none');
    expect((await visit('/people')).text).toContain('Open the first account');
    const jo = { name: 'Jo <Field>', signInName: 'jo', role: 'administrator', password: 'a password of Jo' };
    const short = await visit('/people', { ...jo, password: 'short one' });
    expect([short.status, short.text]).toEqual([422, expect.stringContaining('role="alert"')]);
    expect(short.text).not.toContain('short one');
    expect(await visit('/people', jo)).toMatchObject({ status: 303, to: '/people' });
    expect(await visit('/people')).toMatchObject({ status: 303, to: '/sign-in' });
    expect(await visit('/sign-in', { organisation: '', signInName: 'Jo', password: jo.password })).toMatchObject({
      to: '/',
    });
    expect((await visit('/people')).text).toContain('Jo &lt;Field&gt;');
  });

  it('open, change and close an account, and refuse what was seen in an older version', async () => {
    await visit('/people', { name: 'Max Hill', signInName: 'max', role: 'viewer', password: 'a password of Max' });
    const path = /\/people\/[0-9a-f-]{36}(?=">Max)/.exec((await visit('/people')).text)![0];
    const form = { act: 'change', version: '1', name: 'Max Hill', role: 'planner' };
    expect(await visit(path, form)).toMatchObject({ status: 303, to: '/people' });
    const stale = await visit(path, form);
    expect([stale.status, stale.text]).toEqual([412, expect.stringContaining('expected version 2, found version 1')]);
    expect(await visit(path, { act: 'close', version: '2' })).toMatchObject({ status: 303 });
    expect((await visit('/people')).text).toMatch(/Max Hill<\/th><td>max<\/td><td>closed/);
  });

  it('make a key that is shown once, and revoke it', async () => {
    const made = await visit('/account/keys', { name: 'gateway', role: 'viewer', days: '' });
    const key = /<code>([\w-]{43})<\/code>/.exec(made.text)![1]!;
    const use = () => server.ask('GET', '/api/session', undefined, { authorization: `Bearer ${key}` });
    expect([made.status, (await use()).body.role]).toEqual([201, 'viewer']);
    const shown = (await visit('/account')).text;
    expect(shown).not.toContain(key);
    const revoke = /action="(\/account\/keys\/[^"]+)"/.exec(shown)![1]!;
    expect(await visit(revoke, {})).toMatchObject({ status: 303, to: '/account' });
    expect((await use()).status).toBe(401);
  });

  it('change a password and end the session', async () => {
    const form = { present: 'a password of Jo', password: 'another password' };
    expect((await visit('/account/password', { ...form, present: 'not it' })).status).toBe(403);
    expect(await visit('/account/password', form)).toMatchObject({ status: 303, to: '/account' });
    expect((await visit('/account')).status).toBe(200);
    expect(await visit('/sign-out', {})).toMatchObject({ status: 303, to: '/sign-in' });
    expect(await visit('/account')).toMatchObject({ status: 303, to: '/sign-in' });
  });
});
