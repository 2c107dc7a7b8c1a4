import type { Look } from './look.js';

/**
 * A quick look with what it leaves out taken from the last full one: network, duties, remarks.
 * @param look what came last
 * @param full the last full look, null where there is none
 */
export function mergedLook(look: Look, full: Look | null): Look {
  if (look.depth === 'full' || full === null) return look;
  const { bank, requirement, control, operation, verdict } = look.result;
  return {
    ...full,
    depth: look.depth,
    result: { ...full.result, bank, requirement, control, operation, verdict },
  };
}
