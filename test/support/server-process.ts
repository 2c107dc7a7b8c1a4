import { type ChildProcess, spawn } from 'node:child_process';
import { once } from 'node:events';
import { join } from 'node:path';
import { clientOf, type TestServer } from './test-server.js';

const MAIN = join(import.meta.dirname, '../../dist/apps/server/main.js');

/** The built server as a process of its own, to be ended in any way. */
export interface ServerProcess extends Omit<TestServer, 'close' | 'routes'> {
  /** sends a signal and waits for the end; gives the exit code, null where a signal ended it */
  end: (signal: 'SIGKILL' | 'SIGTERM' | 'SIGINT') => Promise<number | null>;
  /** what it wrote to stderr so far */
  said: () => string;
}

/**
 * Starts the built server and waits until it listens.
 * @param dbUrl its database
 * @param dataDir its folder
 * @param env further settings
 * @throws Error with what it said where it does not start
 */
export async function startProcess(
  dbUrl: string,
  dataDir: string,
  env: Record<string, string> = {},
): Promise<ServerProcess> {
  const own = { DB_URL: dbUrl, DATA_DIR: dataDir, PORT: '0', DEMO: 'off', LOG_LEVEL: 'error' };
  const { NODE_OPTIONS: _, ...outer } = process.env;
  const child = spawn(process.execPath, [MAIN], {
    env: { ...outer, ...own, ...env },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  let said = '';
  let printed = '';
  child.stderr.on('data', (chunk) => {
    said += chunk;
  });
  child.stdout.on('data', (chunk) => {
    printed += chunk;
  });
  const base = await addressOf(child, () => said);
  const end: ServerProcess['end'] = async (signal) => {
    const ended = once(child, 'exit');
    child.kill(signal);
    const [code, by] = (await ended) as [number | null, NodeJS.Signals | null];
    if (by !== null && by !== signal) throw new Error(`the server was ended by ${by}, not by ${signal}: ${said}`);
    if (printed !== '') throw new Error(`the server wrote to stdout: ${printed}`);
    return code;
  };
  return { ...clientOf(base), end, said: () => said };
}

async function addressOf(child: ChildProcess, said: () => string): Promise<string> {
  const ended = once(child, 'exit').then(() => {
    throw new Error(`the server did not start: ${said()}`);
  });
  const listening = (async () => {
    for (;;) {
      const base = /serves at (http:\/\/\S+?)\/?\n/.exec(said())?.[1];
      if (base !== undefined) return base;
      await new Promise((resolve) => setTimeout(resolve, 20));
    }
  })();
  ended.catch(() => undefined);
  return Promise.race([listening, ended]);
}
