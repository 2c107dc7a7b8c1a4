import { join, resolve } from 'node:path';

/** What the server can be told from outside, read once at start. */
export interface Settings {
  port: number;
  host: string;
  /** where sites, records and plans are kept; see libs/store */
  dbUrl: string;
  /** uploads are spooled here before they are read */
  spoolDir: string;
  /** largest meter file [bytes] */
  uploadBytes: number;
  logLevel: string;
  /** whether an empty database gets the example site */
  demo: boolean;
}

const LOCAL_HOSTS = ['127.0.0.1', 'localhost', '::1'];
const LOG_LEVELS = ['fatal', 'error', 'warn', 'info', 'debug', 'silent'];

/**
 * Reads the settings from environment variables.
 * @param env PORT, HOST, DATA_DIR, DB_URL, UPLOAD_MAX_MB, LOG_LEVEL, DEMO; each may be absent
 * @throws Error naming every variable that is wrong
 */
export function readSettings(env: Record<string, string | undefined>): Settings {
  const faults: string[] = [];
  const number = (name: string, fallback: number, most: number) => {
    const text = env[name] ?? String(fallback);
    const value = Number(text);
    if (/^\d{1,9}$/.test(text) && value <= most) return value;
    faults.push(`${name} must be a whole number from 0 to ${most}, found "${text}"`);
    return fallback;
  };
  const word = (name: string, fallback: string, words: string[]) => {
    const value = env[name] ?? fallback;
    if (!words.includes(value)) faults.push(`${name} must be one of ${words.join(', ')}, found "${value}"`);
    return value;
  };
  const dataDir = resolve(env.DATA_DIR ?? 'var');
  const settings: Settings = {
    port: number('PORT', 3000, 65_535),
    host: env.HOST ?? '127.0.0.1',
    dbUrl: env.DB_URL ?? `sqlite:${join(dataDir, 'varwright.sqlite')}`,
    spoolDir: join(dataDir, 'spool'),
    uploadBytes: number('UPLOAD_MAX_MB', 100, 2000) * 1_000_000,
    logLevel: word('LOG_LEVEL', 'info', LOG_LEVELS),
    demo: word('DEMO', 'on', ['on', 'off']) === 'on',
  };
  if (!LOCAL_HOSTS.includes(settings.host)) {
    faults.push(
      `HOST must be ${LOCAL_HOSTS.join(', ')}, found "${settings.host}": there are no accounts yet, ` +
        'so whoever reaches the server could read and change everything',
    );
  }
  if (faults.length > 0) throw new Error(faults.join('\n'));
  return settings;
}
