import { execFile } from 'node:child_process';
import { cpSync, existsSync, mkdirSync, mkdtempSync, rmSync, statSync, symlinkSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterAll, beforeAll, expect, test } from 'vitest';

const repository = fileURLToPath(new URL('../..', import.meta.url));
let root = '';
let first: Awaited<ReturnType<typeof run>>[] = [];

// One folder, built from nothing by three commands at once; each test then finds what the one before left.
beforeAll(async () => {
  root = mkdtempSync(join(tmpdir(), 'varwright-built-'));
  for (const name of ['.config', 'package.json', 'tsconfig.json']) {
    cpSync(join(repository, name), join(root, name), { recursive: true });
  }
  symlinkSync(join(repository, 'node_modules'), join(root, 'node_modules'));
  write('libs/engine/word.ts', "export const word: string = 'first';\n");
  write(
    'apps/cli/main.ts',
    "import { word } from '#libs/engine/word.js';\nconsole.log(word, ...process.argv.slice(2));\nprocess.exitCode = 6;\n",
  );
  first = await Promise.all([run('a'), run('plan', 'two words'), run('c')]);
});
afterAll(() => rmSync(root, { recursive: true }));

test('the program alone speaks on stdout, gets its arguments and keeps its exit code; three at once all run on a whole build', () => {
  expect(first.map(({ stdout }) => stdout)).toEqual(['first a\n', 'first plan two words\n', 'first c\n']);
  expect(first.map(({ code }) => code)).toEqual([6, 6, 6]);
});

test('nothing is built where nothing has changed', async () => {
  const built = () => statSync(join(root, 'dist', '.built')).mtimeMs;
  const before = built();
  expect(await run()).toMatchObject({ stdout: 'first\n' });
  expect(built()).toBe(before);
});

test('a changed source is built before the program runs, data beside it stands beside the compiled module, and a removed one is gone', async () => {
  write('libs/engine/phrase.ts', "export const word = 'second';\n");
  write('apps/cli/main.ts', "import { word } from '#libs/engine/phrase.js';\nconsole.log(word);\n");
  write('apps/cli/demo.csv', 'kW,kvar\n');
  rmSync(join(root, 'libs/engine/word.ts'));
  expect(existsSync(join(root, 'dist/libs/engine/word.js'))).toBe(true);
  expect(await run()).toMatchObject({ stdout: 'second\n', code: 0 });
  expect(existsSync(join(root, 'dist/libs/engine/word.js'))).toBe(false);
  expect(existsSync(join(root, 'dist/apps/cli/demo.csv'))).toBe(true);
  // a build, on a machine that may be busy
}, 60_000);

test('a source that does not compile ends in 1 with nothing on stdout, and is not taken for built afterwards', async () => {
  write('libs/engine/phrase.ts', "export const word: number = 'third';\n");
  for (let attempt = 0; attempt < 2; attempt++) {
    const { stdout, stderr, code } = await run();
    expect({ stdout, code }).toEqual({ stdout: '', code: 1 });
    expect(stderr).toContain('libs/engine/phrase.ts(1,14)');
  }
  // two builds, on a machine that may be busy
}, 60_000);

function write(file: string, text: string): void {
  mkdirSync(dirname(join(root, file)), { recursive: true });
  writeFileSync(join(root, file), text);
}

function run(...args: string[]): Promise<{ stdout: string; stderr: string; code: number }> {
  return new Promise((resolve) => {
    const program = join(root, '.config', 'built.mjs');
    execFile(process.execPath, [program, 'apps/cli/main.js', ...args], (error, stdout, stderr) => {
      resolve({ stdout, stderr, code: typeof error?.code === 'number' ? error.code : 0 });
    });
  });
}
