import type { Quantity } from '../record/build-columns.js';
import type { Family } from './reading-type.js';

/** One quantity of a record out of one or the other flow direction. */
export interface FlowPart {
  /** codes that say the same, the likeliest first */
  flows: readonly number[];
  quantity: Quantity;
  /** the scheme holds without it */
  optional?: true;
  /** code whose values count with the other sign */
  negativeFlow?: number;
}

/** The parts that together make up a quantity. */
export type FlowScheme = readonly FlowPart[];

/**
 * Ways in which meters split a quantity by direction: those that tell both directions, then the others; of each the one
 * that tells most first. A split into quadrants counts reactive energy by its own sign, + in I and II, − in III and IV,
 * whichever way active energy flows.
 * Sums across that sign (Q1+Q3, Q2+Q4, Q2+Q3 of reactive energy) tell no sign while energy is exported, and are not used.
 */
export const FLOW_SCHEMES: Record<Family, readonly (readonly FlowScheme[])[]> = {
  active: [
    [
      [
        { flows: [1, 8], quantity: 'active' },
        { flows: [19, 10], quantity: 'exported' },
      ],
      [{ flows: [4], quantity: 'active' }],
      [
        { flows: [15], quantity: 'active' },
        { flows: [18], quantity: 'active' },
        { flows: [16], quantity: 'exported', optional: true },
        { flows: [17], quantity: 'exported', optional: true },
      ],
    ],
    [
      [{ flows: [1, 8], quantity: 'active' }],
      [{ flows: [0], quantity: 'active' }],
      [{ flows: [20, 21], quantity: 'active' }],
    ],
  ],
  reactive: [
    [
      [
        { flows: [2, 5, 1], quantity: 'lagging' },
        { flows: [3, 13, 19], quantity: 'leading' },
      ],
      [{ flows: [4], quantity: 'reactive' }],
      [
        { flows: [9], quantity: 'reactive' },
        { flows: [12, 14], quantity: 'reactive', optional: true, negativeFlow: 14 },
      ],
      [
        { flows: [15], quantity: 'lagging' },
        { flows: [18], quantity: 'leading' },
        { flows: [16], quantity: 'lagging', optional: true },
        { flows: [17], quantity: 'leading', optional: true },
      ],
    ],
    [
      [{ flows: [2, 5, 1], quantity: 'lagging' }],
      [{ flows: [15], quantity: 'lagging' }],
      [{ flows: [0], quantity: 'reactive' }],
      [{ flows: [20, 21, 8], quantity: 'reactive' }],
    ],
  ],
  voltage: [[[{ flows: [0, 1], quantity: 'voltage' }]]],
};

/** Flow directions of reactive energy that tell leading kvar, by their sign or by themselves. */
export const LEADING_FLOWS: readonly number[] = [3, 13, 19, 4, 9, 12, 14, 17, 18];

/** Flow directions that count export as if it were import. */
export const TOTAL_FLOWS: readonly number[] = [20, 21];
