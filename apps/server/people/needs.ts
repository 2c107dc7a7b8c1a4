import { declareRoute } from '../public.js';
import type { Role } from './actor.js';

/**
 * Declares a route open to people of a role, or of one that may do more.
 * @param role the least role
 * @param does what the route does, in one sentence: it stands in the API's description
 */
export const Needs = (role: Role, does: string) => declareRoute({ does, role });
