import { join, resolve } from 'node:path';

/** What the server can be told from outside, read once at start. */
export interface Settings {
  port: number;
  host: string;
  /** scheme and name people reach the server by, where something stands before it; null where nothing does */
  origin: string | null;
  /** where sites, records and plans are kept; see libs/store */
  dbUrl: string;
  /** uploads are spooled here before they are read */
  spoolDir: string;
  /** largest meter file [bytes] */
  uploadBytes: number;
  /** silence of a server after which another takes its jobs over [s] */
  jobLeaseS: number;
  logLevel: string;
  /** whether an empty database gets the example site */
  demo: boolean;
}

const LOCAL_HOSTS = ['127.0.0.1', 'localhost', '::1'];
const LOG_LEVELS = ['fatal', 'error', 'warn', 'info', 'debug', 'silent'];

/** Whether nobody but this machine reaches the server. */
export function isLocal({ host, origin }: Pick<Settings, 'host' | 'origin'>): boolean {
  return LOCAL_HOSTS.includes(host) && origin === null;
}

/**
 * Reads the settings from environment variables.
 * @param env PORT, HOST, ORIGIN, DATA_DIR, DB_URL, UPLOAD_MAX_MB, JOB_LEASE_S, LOG_LEVEL, DEMO; each may be absent
 * @throws Error naming every variable that is wrong
 */
export function readSettings(env: Record<string, string | undefined>): Settings {
  const faults: string[] = [];
  const number = (name: string, fallback: number, most: number, least = 0) => {
    const text = env[name] ?? String(fallback);
    const value = Number(text);
    if (/^\d{1,9}$/.test(text) && value >= least && value <= most) return value;
    faults.push(`${name} must be a whole number from ${least} to ${most}, found "${text}"`);
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
    origin: env.ORIGIN ?? null,
    dbUrl: env.DB_URL ?? `sqlite:${join(dataDir, 'varwright.sqlite')}`,
    spoolDir: join(dataDir, 'spool'),
    uploadBytes: number('UPLOAD_MAX_MB', 100, 2000) * 1_000_000,
    jobLeaseS: number('JOB_LEASE_S', 10, 600, 2),
    logLevel: word('LOG_LEVEL', 'info', LOG_LEVELS),
    demo: word('DEMO', 'on', ['on', 'off']) === 'on',
  };
  if (settings.origin !== null && !/^https?:\/\/[a-z0-9.-]+(:\d{1,5})?$/.test(settings.origin)) {
    faults.push(`ORIGIN must be a scheme and a name such as https://plans.example.org, found "${settings.origin}"`);
  }
  if (faults.length > 0) throw new Error(faults.join('\n'));
  return settings;
}
