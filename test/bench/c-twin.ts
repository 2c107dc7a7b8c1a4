import { execFileSync, spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

/** A C program that does the same work, built on the spot for this machine. */
export interface CTwin {
  /** Feeds it the numbers, and gives back its median time of one run and the numbers it wrote. */
  run: (input: Float64Array, runs: number) => { ns: number; output: Float64Array };
  remove: () => void;
}

/** The twin of that name in this folder, or null where the machine has no C compiler. */
export function buildTwin(name: string): CTwin | null {
  if (spawnSync('gcc', ['--version']).status !== 0) return null;
  const dir = mkdtempSync(join(tmpdir(), 'varwright-bench-'));
  const source = fileURLToPath(new URL(`../../../test/bench/${name}.c`, import.meta.url));
  const program = join(dir, name);
  execFileSync('gcc', ['-O3', '-march=native', '-std=gnu11', '-Wall', '-Werror', '-o', program, source, '-lm']);
  const [inputFile, outputFile] = [join(dir, 'input'), join(dir, 'output')];
  return {
    run: (input, runs) => {
      writeFileSync(inputFile, new Uint8Array(input.buffer, input.byteOffset, input.byteLength));
      const ns = Number(execFileSync(program, [inputFile, outputFile, String(runs)], { encoding: 'utf8' }));
      const bytes = readFileSync(outputFile);
      return { ns, output: new Float64Array(Uint8Array.from(bytes).buffer) };
    },
    remove: () => rmSync(dir, { recursive: true }),
  };
}
