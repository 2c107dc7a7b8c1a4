import { InputProblem, type Problem } from '#libs/engine/index.js';

/** What comes back from another thread: an error would arrive there as a plain one, without its list of problems. */
export type WorkerAnswer<T> = { value: T } | { problems: readonly Problem[] };

/** Runs work and packs what it returns, or the input problem it throws; a fault is left to be thrown. */
export async function packAnswer<T>(work: () => T | Promise<T>): Promise<WorkerAnswer<T>> {
  try {
    return { value: await work() };
  } catch (error) {
    if (error instanceof InputProblem) return { problems: error.problems };
    throw error;
  }
}

/**
 * Unpacks an answer.
 * @throws InputProblem where the work threw one
 */
export function unpackAnswer<T>(answer: WorkerAnswer<T>): T {
  if ('problems' in answer) throw new InputProblem(answer.problems);
  return answer.value;
}
