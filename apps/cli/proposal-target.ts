import { rmSync } from 'node:fs';
import { open, rename, stat } from 'node:fs/promises';
import { basename, dirname, join } from 'node:path';
import { InputProblem } from '#libs/engine/index.js';
import { usage } from './command-line.js';

/** A place a file will stand in whole, or not at all. */
export interface ProposalTarget {
  write(bytes: Uint8Array): Promise<void>;
}

/**
 * Makes sure a file can be written before anything is computed: a file beside the target is opened at once, filled
 * at the end and renamed. It goes when the program ends before that.
 * @param path what was typed
 * @param option the option it was typed after
 * @returns the way to write it
 * @throws InputProblem of code `usage` where nothing can be written there
 */
export async function proposalTarget(path: string, option = 'pdf'): Promise<ProposalTarget> {
  const unfinished = join(dirname(path), `.${basename(path)}.${process.pid}`);
  const file = await writable({ path, option }, async () => {
    if ((await stat(path).catch(() => null))?.isDirectory()) throw Object.assign(new Error(path), { code: 'EISDIR' });
    return open(unfinished, 'wx');
  });
  const remove = () => rmSync(unfinished, { force: true });
  process.once('exit', remove);
  return {
    async write(bytes) {
      await writable({ path, option }, async () => {
        await file.writeFile(bytes);
        await file.sync();
        await file.close();
        await rename(unfinished, path);
      });
      process.removeListener('exit', remove);
    },
  };
}

async function writable<T>({ path, option }: { path: string; option: string }, work: () => Promise<T>): Promise<T> {
  try {
    return await work();
  } catch (error) {
    if (!(error instanceof Error && 'code' in error)) throw error;
    const expected = `--${option} with a file that can be written`;
    throw new InputProblem([usage(expected, `${JSON.stringify(path)} (${error.code})`)]);
  }
}
