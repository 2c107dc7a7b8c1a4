import { describe, expect, it } from 'vitest';
import { readSettings } from './settings.js';

describe('the settings', () => {
  it('are the local ones where nothing is said', () => {
    expect(readSettings({})).toMatchObject({ port: 3000, host: '127.0.0.1', demo: true, uploadBytes: 100_000_000 });
    expect(readSettings({}).dbUrl).toMatch(/^sqlite:\/.*\/var\/varwright\.sqlite$/);
  });

  it('take the database from DB_URL and the folder from DATA_DIR', () => {
    const url = 'postgres://app@127.0.0.1/plans';
    expect(readSettings({ DB_URL: url, DATA_DIR: '/data' })).toMatchObject({ dbUrl: url, spoolDir: '/data/spool' });
  });

  const wrong: [Record<string, string>, RegExp, string][] = [
    [{ HOST: '0.0.0.0' }, /no accounts yet/, 'nobody else may reach a server without accounts'],
    [{ HOST: '192.168.1.4' }, /no accounts yet/, 'a local network is not localhost'],
    [{ PORT: '70000' }, /PORT must be a whole number/, 'there are 65 536 ports'],
    [{ PORT: '3000x' }, /PORT must be/, 'a number with a tail is not that number'],
    [{ DEMO: 'yes' }, /DEMO must be one of on, off/, 'a word that is not on the list is not guessed at'],
  ];

  it.each(wrong)('refuse %j (%s), because %s', (env, reason) => {
    expect(() => readSettings(env)).toThrow(reason);
  });

  it('name every variable that is wrong', () => {
    expect(() => readSettings({ PORT: 'x', LOG_LEVEL: 'loud' })).toThrow(/PORT[\s\S]*LOG_LEVEL/);
  });
});
