import { evenFactors } from './change-towards.js';

/** Load in the years to come, relative to the record's; practice. */
export const LOAD_MOVES = [0.8, 1.2] as const;

/** Least and greatest factor on the load that is tried. */
export const LOADS_TRIED = { least: 0.25, most: 4 } as const;

/** How a change with the load is looked for: every factor is a simulation. */
export const LOAD_SEARCH = { steps: 2, closedIn: 1e-2 } as const;

/** Factors on the load that are asked of most ways: each moves the record once for all of them. */
export const COMMON_LOADS: readonly number[] = [
  ...LOAD_MOVES,
  ...evenFactors(LOADS_TRIED.least, LOAD_SEARCH.steps),
  ...evenFactors(LOADS_TRIED.most, LOAD_SEARCH.steps),
];
