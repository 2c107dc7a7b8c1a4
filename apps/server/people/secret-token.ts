import { createHash, randomBytes } from 'node:crypto';

/** 256 bits nobody can guess, in letters that need no escaping. */
export const makeToken = () => randomBytes(32).toString('base64url');

/** What is stored in place of a token: SHA-256 is enough, since a token is random. */
export const tokenHash = (token: string) => createHash('sha256').update(token).digest('hex');

/** Whether a text can be a token of ours; the database is asked for nothing else. */
export const isToken = (text: string) => /^[\w-]{43}$/.test(text);
