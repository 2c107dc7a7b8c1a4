import type { Actor } from './actor.js';

/**
 * Makes sure that who approves is who they were when they signed in.
 * @throws RefusedRequest where accounts exist and the password is missing or another
 */
export type Confirm = (actor: Actor, password: string | undefined) => Promise<void>;
