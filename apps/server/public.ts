import { SetMetadata } from '@nestjs/common';

const PUBLIC = 'varwright:public';

/** What a route says of itself. */
export interface Declared {
  /** what it does, in one sentence */
  does: string;
}

/**
 * Declares a route open to whoever reaches the server; a route that declares nothing keeps the server from starting.
 * @param does what the route does, in one sentence: it stands in the API's description
 */
export const Public = (does: string) => SetMetadata(PUBLIC, { does } satisfies Declared);

/** What a handler declares, undefined where it is silent. */
export function declarationOf(handler: object): Declared | undefined {
  return Reflect.getMetadata(PUBLIC, handler);
}
