import * as z from 'zod';
import { label } from './schema-parts.js';

const SHORTEST_PASSWORD = 12;

const signInName = z
  .string()
  .regex(/^[\p{L}\p{N}][\p{L}\p{N}.@_-]{0,79}$/u, { error: 'letters, digits and . @ _ -, up to 80' })
  .describe('typed at sign-in; capitals make no difference');

const newPassword = z
  .string()
  .min(SHORTEST_PASSWORD)
  .max(200)
  .describe(`a password of at least ${SHORTEST_PASSWORD} characters`);

const role = z
  .enum(['viewer', 'planner', 'reviewer', 'administrator'])
  .describe('each may do what those before it may');

/** Name of an organisation, as it is typed at sign-in. */
export const organisationNameSchema = signInName;

/** Body of a sign-in. */
export const signInSchema = z
  .strictObject({
    organisation: z.string().max(80).optional().describe('may be left out where the server has one organisation'),
    signInName: z.string().min(1).max(80),
    password: z.string().min(1).max(200),
  })
  .meta({ id: 'SignIn' });

/** Body of a new account. */
export const newPersonSchema = z
  .strictObject({ signInName, name: label(200), role, password: newPassword })
  .meta({ id: 'NewPerson' });

/** Body of a change of an account: what is left out stays. */
export const personChangeSchema = z
  .strictObject({ name: label(200).optional(), role: role.optional(), password: newPassword.optional() })
  .meta({ id: 'PersonChange' });

/** Body of a change of one's own password. */
export const ownPasswordSchema = z
  .strictObject({ present: z.string().min(1).max(200), password: newPassword })
  .meta({ id: 'OwnPassword' });

/** Body of a new API key. */
export const newKeySchema = z
  .strictObject({
    name: label(80).describe('what it is for'),
    role: role.optional().describe('at most its maker’s, which it has where nothing is said'),
    days: z.int().min(1).max(3660).optional().describe('until it expires; absent, it does not'),
  })
  .meta({ id: 'NewKey' });

export type SignIn = z.output<typeof signInSchema>;
export type NewPersonGiven = z.output<typeof newPersonSchema>;
export type PersonChangeGiven = z.output<typeof personChangeSchema>;
export type OwnPassword = z.output<typeof ownPasswordSchema>;
export type NewKey = z.output<typeof newKeySchema>;
