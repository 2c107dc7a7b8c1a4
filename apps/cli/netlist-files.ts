import { rm, writeFile } from 'node:fs/promises';
import { extname } from 'node:path';
import { InputProblem, type SiteNetlist } from '#libs/engine/index.js';
import { usage } from './command-line.js';

/**
 * Writes a site's netlists: the network to the file named, the closing beside it with `.inrush` before the ending.
 * @param path what was typed after --netlist
 * @param netlists texts
 * @returns the files written
 * @throws InputProblem of code `usage` where nothing can be written there; then neither file is left
 */
export async function writeNetlists(path: string, { network, inrush }: SiteNetlist): Promise<string[]> {
  const written: string[] = [];
  try {
    for (const [file, text] of [
      [path, network] as const,
      ...(inrush === null ? [] : [[inrushPath(path), inrush] as const]),
    ]) {
      await writeFile(file, text);
      written.push(file);
    }
  } catch (error) {
    if (!(error instanceof Error && 'code' in error)) throw error;
    await Promise.all(written.map((file) => rm(file, { force: true })));
    const expected = '--netlist with a file that can be written';
    throw new InputProblem([usage(expected, `${JSON.stringify(path)} (${error.code})`)]);
  }
  return written;
}

/**
 * Where the closing's netlist stands.
 * @param path the network's
 * @returns the same with `.inrush` before its ending
 */
export function inrushPath(path: string): string {
  const ending = extname(path);
  return `${path.slice(0, path.length - ending.length)}.inrush${ending}`;
}
