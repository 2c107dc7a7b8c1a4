import { networkStates } from '../network/network-states.js';
import { joinedNodes } from '../network/nodal-case.js';
import { InputProblem } from '../problem.js';
import type { Metering } from '../requirement/bus-load.js';
import { transformerPassage } from '../supply/transformer-passage.js';
import type { SettledSite } from './settled-site.js';

/**
 * Where the meter stands. One record at the primary of boards of their own does not say how its load divides among them,
 * and the need at one board depends on it: refused rather than taken through all transformers in parallel.
 * @param site settled site
 * @returns the bus, or the primary of the transformers in parallel
 * @throws InputProblem where the meter stands at the primary of transformers on boards of their own
 * @source method-requirement
 */
export function meteringOf({ meteredAt, supply, topology }: SettledSite): Metering {
  if (meteredAt === 'bus') return { at: 'bus' };
  if (topology !== null) {
    const node = joinedNodes(topology, networkStates(topology)[0]!);
    const fed = [...new Set(topology.transformerBus.map((bus) => node[bus]!))];
    if (fed.length > 1) {
      const boards = fed.map((each) => `"${topology.buses[node.indexOf(each)]}"`).join(', ');
      throw new InputProblem([
        {
          code: 'inconsistent',
          path: 'meteredAt',
          expected: '"bus", with the record of the bank’s own board, where transformers feed boards of their own',
          found: `"primary", one record for the boards ${boards}`,
        },
      ]);
    }
  }
  return { at: 'primary', passage: transformerPassage(supply) };
}
