// Runs a program of dist, after building it where a source has changed since.
//   node .config/built.mjs                     builds where needed
//   node .config/built.mjs apps/cli/main.js …  builds where needed, then runs the program with the rest as its arguments
// The page is a build of its own: the server needs it, the commands do not.
// Says nothing on stdout: that belongs to the program.
import { spawnSync } from 'node:child_process';
import {
  copyFileSync,
  existsSync,
  mkdirSync,
  readdirSync,
  readFileSync,
  rmSync,
  statSync,
  writeFileSync,
} from 'node:fs';
import { dirname, join, relative } from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';

const root = fileURLToPath(new URL('..', import.meta.url));
const dist = join(root, 'dist');
const stampFile = join(dist, '.built');
const lockFile = join(dist, '.building');
const sourceFolders = ['apps/server', 'apps/cli', 'libs', 'migrations'];
const settings = [
  'package.json',
  'tsconfig.json',
  '.config/tsconfig.build.json',
  '.config/vite-commands.config.mjs',
  '.config/vite-server.config.mjs',
];
const pageStampFile = join(dist, '.built-page');
const pageFolders = ['apps/web', 'libs/engine', 'libs/contract', 'libs/present'];
const pageSettings = ['package.json', '.config/vite.config.mjs', '.config/page-fonts.mjs'];

const [program, ...args] = process.argv.slice(2);
const needsPage = (program === undefined || program.startsWith('apps/server/')) && existsSync(join(root, 'apps/web'));
if (!buildIfNeeded()) {
  process.stderr.write('the build failed\n');
  process.exitCode = 1;
} else if (program !== undefined) {
  const path = join(dist, program);
  process.argv = [process.argv[0] ?? 'node', path, ...args];
  await import(pathToFileURL(path).href);
}

function buildIfNeeded() {
  if (isCurrent() && (!needsPage || isPageCurrent())) return true;
  takeLock();
  try {
    return (isCurrent() || build()) && (!needsPage || isPageCurrent() || buildPage());
  } finally {
    rmSync(lockFile, { force: true });
  }
}

function isCurrent() {
  return existsSync(stampFile) && readFileSync(stampFile, 'utf8') === stampOf(sourceFiles());
}

function isPageCurrent() {
  const stamp = () => stampOf(filesOf(pageFolders, pageSettings));
  return existsSync(pageStampFile) && readFileSync(pageStampFile, 'utf8') === stamp();
}

function buildPage() {
  const stamp = stampOf(filesOf(pageFolders, pageSettings));
  rmSync(pageStampFile, { force: true });
  if (!bundle('vite.config.mjs')) return false;
  writeFileSync(pageStampFile, stamp);
  return true;
}

/** @param {string} config in .config */
function bundle(config) {
  const vite = join(root, 'node_modules', 'vite', 'bin', 'vite.js');
  const words = [vite, 'build', '--config', join(root, '.config', config), '--logLevel', 'warn'];
  // whoever asks for it, and a test does, the page is built as it is served
  const env = { ...process.env, NODE_ENV: 'production' };
  return spawnSync(process.execPath, words, { cwd: root, env, stdio: ['ignore', 2, 2] }).status === 0;
}

function build() {
  const files = sourceFiles();
  const stamp = stampOf(files);
  rmSync(stampFile, { force: true });
  const tsc = join(root, 'node_modules', 'typescript', 'bin', 'tsc');
  const done = spawnSync(process.execPath, [tsc, '-p', join(root, '.config', 'tsconfig.build.json')], {
    stdio: ['ignore', 2, 2],
  });
  if (done.status !== 0) return false;
  copyAssets(files);
  removeOrphans();
  if (!bundle('vite-commands.config.mjs')) return false;
  if (existsSync(join(root, 'apps/server/main.ts')) && !bundle('vite-server.config.mjs')) return false;
  writeFileSync(stampFile, stamp);
  return true;
}

/** Every file the build depends on, as paths from the root. */
function sourceFiles() {
  return filesOf(sourceFolders, settings);
}

/**
 * @param {string[]} folders
 * @param {string[]} more
 */
function filesOf(folders, more) {
  const found = more.filter((file) => existsSync(join(root, file)));
  for (const folder of folders) {
    if (!existsSync(join(root, folder))) continue;
    for (const entry of readdirSync(join(root, folder), { recursive: true, withFileTypes: true })) {
      const path = relative(root, join(entry.parentPath, entry.name));
      if (entry.isFile() && !path.endsWith('.spec.ts') && !path.endsWith('.md')) found.push(path);
    }
  }
  return found.sort();
}

/** @param {string[]} files */
function stampOf(files) {
  const facts = files.map((file) => {
    const { mtimeMs, size } = statSync(join(root, file));
    return `${file} ${mtimeMs} ${size}`;
  });
  return `${process.version}\n${facts.join('\n')}\n`;
}

/**
 * What is not TypeScript (data, pages, pictures) stands in dist where it stands in the source.
 * @param {string[]} files
 */
function copyAssets(files) {
  for (const file of files) {
    if (file.endsWith('.ts') || settings.includes(file)) continue;
    mkdirSync(dirname(join(dist, file)), { recursive: true });
    copyFileSync(join(root, file), join(dist, file));
  }
}

/** A module whose source is gone must not go on being found. */
function removeOrphans() {
  for (const entry of readdirSync(dist, { recursive: true, withFileTypes: true })) {
    if (!entry.isFile() || entry.name.startsWith('.')) continue;
    const path = relative(dist, join(entry.parentPath, entry.name));
    const source = path.replace(/\.js(\.map)?$/, '.ts');
    if (sourceFolders.some((folder) => path.startsWith(`${folder}/`)) && !existsSync(join(root, source))) {
      rmSync(join(dist, path));
    }
  }
}

/** Two commands started at once build one after the other; the second then finds the work done. */
function takeLock() {
  mkdirSync(dist, { recursive: true });
  const nap = new Int32Array(new SharedArrayBuffer(4));
  for (;;) {
    try {
      writeFileSync(lockFile, String(process.pid), { flag: 'wx' });
      return;
    } catch (error) {
      if (!(error instanceof Error && 'code' in error && error.code === 'EEXIST')) throw error;
    }
    if (!ownerLives()) rmSync(lockFile, { force: true });
    else Atomics.wait(nap, 0, 0, 100);
  }
}

function ownerLives() {
  try {
    const owner = Number(readFileSync(lockFile, 'utf8'));
    // An empty file is a lock being written at this moment.
    if (owner !== 0) process.kill(owner, 0);
    return true;
  } catch (error) {
    return error instanceof Error && 'code' in error && error.code === 'EPERM';
  }
}
