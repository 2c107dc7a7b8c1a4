import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { databases, type TestDatabase } from '../support/databases.js';
import { startServer, type TestServer } from '../support/test-server.js';

const cookieOf = (headers: Headers) => /varwright-session=[^;]*/.exec(headers.get('set-cookie') ?? '')?.[0] ?? '';

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
