import { couplesAtPrimary } from '../duty/limits-point.js';
import type { Bank } from '../layout/bank.js';
import { bankLevels, type Level } from '../layout/levels.js';
import type { CornerCase } from '../network/corners.js';
import { type NetworkModel, siteNetwork } from '../network/network-model.js';
import { InputProblem } from '../problem.js';
import { settleBank } from './settle-bank.js';
import { settleSite } from './settle-site.js';
import type { SettledSite } from './settled-site.js';
import type { Site } from './site.js';

/** A site's network and bank without a record: what a scan looks at. */
export interface NetworkScene {
  site: SettledSite;
  bank: Bank;
  levels: Level[];
  model: NetworkModel;
}

/** A level asked for may be this far from one the bank has [kvar]. */
const LEVEL_REACH_KVAR = 0.5;

/**
 * Network, bank and levels of a site. Without a record the damping load is 0 unless the site gives it, and there is no
 * load current to hold distortion against.
 * @param site validated site
 * @returns what a scan looks at
 * @throws InputProblem where the inputs contradict each other
 * @source method-network
 */
export function networkScene(site: Site): NetworkScene {
  const { site: settled } = settleSite(site, null);
  const { bank } = settleBank(site.bank ?? { stages: [] }, site.frequencyHz);
  const { nominalV, topology } = settled;
  return {
    site: settled,
    bank,
    levels: bankLevels(bank, nominalV),
    model: siteNetwork(settled.supply, settled.loads, {
      nominalV,
      loadA: 0,
      topology,
      primary: couplesAtPrimary(settled),
    }),
  };
}

/**
 * The level a caller asks for.
 * @param levels levels of the bank, ascending
 * @param levelKvar asked for, the highest where absent [kvar]
 * @returns the nearest level
 * @throws InputProblem where none is within 0.5 kvar
 */
export function chosenLevel(levels: readonly Level[], levelKvar: number | undefined): Level {
  if (levelKvar === undefined) return levels[levels.length - 1]!;
  const nearest = levels.reduce((best, level) =>
    Math.abs(level.levelKvar - levelKvar) < Math.abs(best.levelKvar - levelKvar) ? level : best,
  );
  if (Math.abs(nearest.levelKvar - levelKvar) <= LEVEL_REACH_KVAR) return nearest;
  throw new InputProblem([
    {
      code: 'unknown-level',
      path: 'level',
      expected: `one of the levels ${levels.map((level) => level.levelKvar).join(', ')}`,
      found: `${levelKvar}`,
      unit: 'kvar',
    },
  ]);
}

/**
 * The corner a caller asks for.
 * @param model the network
 * @param corner place in the list of corners, 0 the nominal one
 * @returns the corner
 * @throws InputProblem where there is none of that number
 */
export function chosenCorner({ corners }: NetworkModel, corner: number): CornerCase {
  const chosen = corners.corners[corner];
  if (chosen !== undefined) return chosen;
  throw new InputProblem([
    {
      code: 'out-of-range',
      path: 'corner',
      expected: `a whole number from 0, the nominal corner, to ${corners.corners.length - 1}`,
      found: `${corner}`,
    },
  ]);
}

/**
 * Orders a caller asks for: below the fundamental the growth of resistances has no meaning.
 * @param ordersH orders
 * @returns the same
 * @throws InputProblem naming the first that is no number from 1 on
 */
export function chosenOrders(ordersH: Float64Array): Float64Array {
  const at = ordersH.findIndex((h) => !(h >= 1 && h < Number.POSITIVE_INFINITY));
  if (at < 0) return ordersH;
  const problem = { path: `orders[${at}]`, expected: 'an order from 1 on', found: `${ordersH[at]}` };
  throw new InputProblem([{ code: 'out-of-range', ...problem }]);
}
