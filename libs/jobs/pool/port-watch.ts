import type { MessagePort } from 'node:worker_threads';
import type { Watch } from '#libs/engine/index.js';

/** Progress is said at most this often, as a share of the whole. */
const STEP = 0.01;

/**
 * A watch for work in another thread: it reports over a port. It never says stop, because a thread whose work is not
 * wanted any more is ended from outside.
 * @param port the worker's end of a channel
 */
export function portWatch(port: MessagePort): Watch {
  let said = 0;
  return {
    report(fraction) {
      if (fraction < said + STEP) return;
      said = fraction;
      port.postMessage(fraction);
    },
    stopped: () => false,
  };
}
