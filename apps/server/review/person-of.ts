import type { Person } from '#libs/review/review-act.js';
import type { Actor } from '../people/actor.js';

/** Whoever makes a request, as the log names them. */
export function personOf({ personId, name, role }: Actor): Person {
  return { id: personId, name, role };
}
