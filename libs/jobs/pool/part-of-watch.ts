import type { Watch } from '#libs/engine/index.js';

/**
 * The watch of one part of a work.
 * @param watch of the whole
 * @param from share of the whole that is done when the part begins, 0 … 1
 * @param to share that is done when it ends
 * @returns a watch for the part
 */
export function partOfWatch(watch: Watch, from: number, to: number): Watch {
  return {
    report: (fraction) => watch.report(from + (to - from) * fraction),
    stopped: () => watch.stopped(),
  };
}
