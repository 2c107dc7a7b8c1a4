import { execFileSync, spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

/** A C program that does the same work, built on the spot for this machine. */
export interface CTwin {
  /** Feeds it numbers, or a file by its path; gives back its median time of one run, those of each of its parts, and the numbers it wrote. */
  run: (input: Float64Array | string, runs: number) => { ns: number; partsNs: number[]; output: Float64Array };
  remove: () => void;
}

/** Whether the machine has a C compiler, and the header too where one is named. */
export function canBuild(header = 'stdio.h'): boolean {
  const source = `#include <${header}>\n`;
  return spawnSync('gcc', ['-E', '-x', 'c', '-'], { input: source, stdio: ['pipe', 'ignore', 'ignore'] }).status === 0;
}

/** The twin of that name in this folder, or null where the machine has no C compiler. */
export function buildTwin(name: string, libraries: readonly string[] = []): CTwin | null {
  if (!canBuild()) return null;
  const dir = mkdtempSync(join(tmpdir(), 'varwright-bench-'));
  const source = fileURLToPath(new URL(`../../../test/bench/${name}.c`, import.meta.url));
  const program = join(dir, name);
  const flags = ['-O3', '-march=native', '-std=gnu11', '-Wall', '-Werror'];
  const linked = ['m', ...libraries].map((library) => `-l${library}`);
  execFileSync('gcc', [...flags, '-o', program, source, ...linked]);
  const [inputFile, outputFile] = [join(dir, 'input'), join(dir, 'output')];
  return {
    run: (input, runs) => {
      if (typeof input !== 'string') {
        writeFileSync(inputFile, new Uint8Array(input.buffer, input.byteOffset, input.byteLength));
      }
      const args = [typeof input === 'string' ? input : inputFile, outputFile, String(runs)];
      const partsNs = execFileSync(program, args, { encoding: 'utf8' }).trim().split('\n').map(Number);
      const bytes = readFileSync(outputFile);
      return { ns: partsNs[0]!, partsNs, output: new Float64Array(Uint8Array.from(bytes).buffer) };
    },
    remove: () => rmSync(dir, { recursive: true }),
  };
}
