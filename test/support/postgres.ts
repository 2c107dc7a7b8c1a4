import { execFileSync } from 'node:child_process';
import { chownSync, mkdtempSync, realpathSync, rmSync } from 'node:fs';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import type { TestProject } from 'vitest/node';

declare module 'vitest' {
  interface ProvidedContext {
    /** Address of a PostgreSQL server of this test run, or null where the machine has none. */
    postgresUrl: string | null;
  }
}

/** Starts an empty PostgreSQL for a test run and hands its address to the tests as `postgresUrl`. */
export default async function setup(project: TestProject): Promise<() => void> {
  const bin = findBin();
  if (bin === null) {
    const reason = 'no `postgres` program on this machine: the tests on PostgreSQL cannot run';
    if (process.env.CI === 'true') throw new Error(reason);
    process.stderr.write(`skipped: ${reason}\n`);
    project.provide('postgresUrl', null);
    return () => {};
  }
  const server = start(bin, await freePort());
  project.provide('postgresUrl', server.url);
  return server.stop;
}

function findBin(): string | null {
  const look = 'command -v postgres || ls -d /usr/lib/postgresql/*/bin/postgres 2>/dev/null | sort -V | tail -n 1';
  const found = execFileSync('sh', ['-c', look], { encoding: 'utf8' }).trim();
  return found === '' ? null : dirname(realpathSync(found));
}

function start(bin: string, port: number): { url: string; stop: () => void } {
  const dir = mkdtempSync(join(tmpdir(), 'varwright-postgres-'));
  const who = serverUser();
  if (who !== null) chownSync(dir, who.uid, who.gid);
  // The server's user may not enter the folder the tests run in, hence cwd.
  const run = (program: string, ...args: string[]) =>
    execFileSync(join(bin, program), args, {
      ...who,
      cwd: dir,
      stdio: 'ignore',
      env: { PATH: process.env.PATH, LC_ALL: 'C.UTF-8' },
    });
  const options = [`-p ${port}`, 'listen_addresses=127.0.0.1', `unix_socket_directories=${dir}`]
    .concat('fsync=off', 'full_page_writes=off', 'max_connections=200')
    .join(' -c ');
  const data = join(dir, 'data');
  run('initdb', '-D', data, '-U', 'app', '--auth=trust', '-E', 'UTF8', '-N');
  run('pg_ctl', '-D', data, '-w', '-l', join(dir, 'log'), '-o', options, 'start');
  const stop = () => {
    run('pg_ctl', '-D', data, '-m', 'immediate', 'stop');
    rmSync(dir, { recursive: true, force: true });
  };
  return { url: `postgres://app@127.0.0.1:${port}/postgres`, stop };
}

/** initdb refuses root: then the system's own postgres user runs the server. */
function serverUser(): { uid: number; gid: number } | null {
  if (process.getuid?.() !== 0) return null;
  const id = (flag: string) => Number(execFileSync('id', [flag, 'postgres'], { encoding: 'utf8' }));
  return { uid: id('-u'), gid: id('-g') };
}

function freePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const probe = createServer().once('error', reject);
    probe.listen(0, '127.0.0.1', () => {
      const address = probe.address();
      probe.close(() => resolve(typeof address === 'object' && address !== null ? address.port : 0));
    });
  });
}
