// Compiles on each change and restarts the server on what was compiled, until interrupted.
import { spawn, spawnSync } from 'node:child_process';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

const root = fileURLToPath(new URL('..', import.meta.url));
const built = spawnSync(process.execPath, [join(root, '.config', 'built.mjs')], { stdio: 'inherit' });
if (built.status !== 0) process.exit(built.status ?? 1);

const tsc = join(root, 'node_modules', 'typescript', 'bin', 'tsc');
const build = join(root, '.config', 'tsconfig.build.json');
const vite = join(root, 'node_modules', 'vite', 'bin', 'vite.js');
const page = join(root, '.config', 'vite.config.mjs');
const server = join(root, '.config', 'vite-server.config.mjs');
const children = [
  [tsc, '-p', build, '--watch', '--preserveWatchOutput'],
  [vite, 'build', '--watch', '--config', page, '--logLevel', 'warn'],
  [vite, 'build', '--watch', '--config', server, '--logLevel', 'warn'],
  ['--watch', join(root, 'dist', 'apps', 'server', 'main.js'), ...process.argv.slice(2)],
].map((args) => spawn(process.execPath, args, { stdio: 'inherit', cwd: root }));

for (const child of children) child.on('exit', stop);
process.on('SIGINT', stop);
process.on('SIGTERM', stop);

function stop() {
  for (const child of children) child.kill('SIGTERM');
}
