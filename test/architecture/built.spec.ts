import { execFile } from 'node:child_process';
import { cpSync, existsSync, mkdirSync, mkdtempSync, rmSync, statSync, symlinkSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterEach, beforeEach, expect, test } from 'vitest';

const repository = fileURLToPath(new URL('../..', import.meta.url));
let root = '';

beforeEach(() => {
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
});
afterEach(() => rmSync(root, { recursive: true }));

test('the program alone speaks on stdout, gets its arguments and keeps its exit code', async () => {
  expect(await run('plan', 'two words')).toMatchObject({ stdout: 'first plan two words\n', code: 6 });
});

test('nothing is built where nothing has changed', async () => {
  await run();
  const built = () => statSync(join(root, 'dist', '.built')).mtimeMs;
  const before = built();
  expect(await run()).toMatchObject({ stdout: 'first\n' });
  expect(built()).toBe(before);
});

test('a changed source is built before the program runs, and a removed one is gone', async () => {
  await run();
  write('libs/engine/phrase.ts', "export const word = 'second';\n");
  write('apps/cli/main.ts', "import { word } from '#libs/engine/phrase.js';\nconsole.log(word);\n");
  rmSync(join(root, 'libs/engine/word.ts'));
  expect(await run()).toMatchObject({ stdout: 'second\n', code: 0 });
  expect(existsSync(join(root, 'dist/libs/engine/word.js'))).toBe(false);
});

test('data beside the source stands beside the compiled module', async () => {
  write('apps/cli/demo.csv', 'kW,kvar\n');
  await run();
  expect(existsSync(join(root, 'dist/apps/cli/demo.csv'))).toBe(true);
});

test('a source that does not compile ends in 1 with nothing on stdout, and is not taken for built afterwards', async () => {
  await run();
  write('libs/engine/word.ts', "export const word: number = 'third';\n");
  for (let attempt = 0; attempt < 2; attempt++) {
    const { stdout, stderr, code } = await run();
    expect({ stdout, code }).toEqual({ stdout: '', code: 1 });
    expect(stderr).toContain('libs/engine/word.ts(1,14)');
  }
  // three builds, on a machine that may be busy
}, 60_000);

test('two commands at once both run on a whole build', async () => {
  const ends = await Promise.all([run('a'), run('b'), run('c')]);
  expect(ends.map(({ stdout }) => stdout)).toEqual(['first a\n', 'first b\n', 'first c\n']);
});

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
