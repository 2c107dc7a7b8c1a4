import { describe, expect, it } from 'vitest';
import { isLocal, readSettings } from './settings.js';

describe('the settings', () => {
  it('are the local ones where nothing is said', () => {
    expect(readSettings({})).toMatchObject({ port: 3000, host: '127.0.0.1', demo: true, uploadBytes: 100_000_000 });
    expect(readSettings({}).dbUrl).toMatch(/^sqlite:\/.*\/var\/varwright\.sqlite$/);
  });

  it('take the database from DB_URL and the folder from DATA_DIR', () => {
    const url = 'postgres://app@127.0.0.1/plans';
    expect(readSettings({ DB_URL: url, DATA_DIR: '/data' })).toMatchObject({ dbUrl: url, spoolDir: '/data/spool' });
  });

  const reached: [Record<string, string>, boolean, string][] = [
    [{}, true, 'the default'],
    [{ HOST: '::1' }, true, 'the same in the newer protocol'],
    [{ HOST: '0.0.0.0' }, false, 'every network'],
    [{ HOST: '192.168.1.4' }, false, 'a local network is not localhost'],
    [{ ORIGIN: 'https://plans.example.org' }, false, 'something before the server lets others through'],
  ];

  it.each(reached)('with %j are for this machine alone: %s (%s)', (env, local) => {
    expect(isLocal(readSettings(env))).toBe(local);
  });

  const wrong: [Record<string, string>, RegExp, string][] = [
    [{ ORIGIN: 'plans.example.org' }, /ORIGIN must be a scheme and a name/, 'without a scheme nobody knows of https'],
    [{ ORIGIN: 'https://plans.example.org/x' }, /ORIGIN must be/, 'a path is no origin'],
    [{ PORT: '70000' }, /PORT must be a whole number/, 'there are 65 536 ports'],
    [{ PORT: '3000x' }, /PORT must be/, 'a number with a tail is not that number'],
    [
      { JOB_LEASE_S: '0' },
      /JOB_LEASE_S must be a whole number from 2/,
      'a server would lose its jobs while it does them',
    ],
    [{ DEMO: 'yes' }, /DEMO must be one of on, off/, 'a word that is not on the list is not guessed at'],
  ];

  it.each(wrong)('refuse %j (%s), because %s', (env, reason) => {
    expect(() => readSettings(env)).toThrow(reason);
  });

  it('name every variable that is wrong', () => {
    expect(() => readSettings({ PORT: 'x', LOG_LEVEL: 'loud' })).toThrow(/PORT[\s\S]*LOG_LEVEL/);
  });
});
