import { InputProblem } from '#libs/engine/index.js';

const files = new WeakMap<InputProblem, string>();

/**
 * Does work on one file and remembers, where it is refused, which file that was.
 * @param path what was typed
 * @param work reading and checking it
 * @returns what the work gives
 */
export async function inFile<T>(path: string, work: () => Promise<T>): Promise<T> {
  try {
    return await work();
  } catch (error) {
    if (error instanceof InputProblem) files.set(error, path);
    throw error;
  }
}

/** The file a problem was met in, where it was one. */
export function fileOf(problem: InputProblem): string | undefined {
  return files.get(problem);
}
