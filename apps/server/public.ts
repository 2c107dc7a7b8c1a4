import { SetMetadata } from '@nestjs/common';
import type { Role } from './people/actor.js';

const DECLARED = 'varwright:declared';

/** What a route says of itself. */
export interface Declared {
  /** what it does, in one sentence */
  does: string;
  /** least role that may use it, null where whoever reaches the server may */
  role: Role | null;
}

/** Declares who may use a route; one that declares nothing keeps the server from starting. */
export const declareRoute = (declared: Declared) => SetMetadata(DECLARED, declared);

/**
 * Declares a route open to whoever reaches the server.
 * @param does what the route does, in one sentence: it stands in the API's description
 */
export const Public = (does: string) => declareRoute({ does, role: null });

/** What a handler declares, undefined where it is silent. */
export function declarationOf(handler: object): Declared | undefined {
  return Reflect.getMetadata(DECLARED, handler);
}
