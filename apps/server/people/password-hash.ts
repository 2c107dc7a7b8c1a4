import { randomBytes, type ScryptOptions, scrypt, timingSafeEqual } from 'node:crypto';

/** What a hash costs whoever guesses; kept with each hash, so that later ones may cost more. */
export interface HashCost {
  /** N is 2 to this power; memory is 128 · N · blockSize [bytes] */
  logN: number;
  /** r */
  blockSize: number;
  /** p */
  parallel: number;
}

/** 64 MiB and some tenths of a second. */
export const PRESENT_COST: HashCost = { logN: 16, blockSize: 8, parallel: 2 };
const SALT_BYTES = 16;
const HASH_BYTES = 32;
const FORM = /^\$scrypt\$ln=(\d{1,2}),r=(\d{1,2}),p=(\d{1,2})\$([\w-]+)\$([\w-]+)$/;

/** Passwords are compared in one spelling, whatever keyboard wrote them. */
const spelled = (password: string) => password.normalize('NFKC');

/**
 * Hashes a password under a salt of its own.
 * @param password as it was typed
 * @param cost what guessing it shall cost
 * @returns `$scrypt$ln=…,r=…,p=…$salt$hash`
 */
export async function hashPassword(password: string, cost: HashCost = PRESENT_COST): Promise<string> {
  const salt = randomBytes(SALT_BYTES);
  const hash = await derive(password, salt, cost);
  const { logN, blockSize, parallel } = cost;
  const parameters = `ln=${logN},r=${blockSize},p=${parallel}`;
  return `$scrypt$${parameters}$${salt.toString('base64url')}$${hash.toString('base64url')}`;
}

/**
 * Holds a password against a stored hash, in a time that does not tell how much of it is right.
 * @param password as it was typed
 * @param stored from `hashPassword`
 * @throws Error where the stored text is no hash of ours
 */
export async function isPassword(password: string, stored: string): Promise<boolean> {
  const [, logN, blockSize, parallel, salt, hash] = FORM.exec(stored) ?? [];
  if (salt === undefined || hash === undefined) throw new Error('a stored password is no hash of ours');
  const cost = { logN: Number(logN), blockSize: Number(blockSize), parallel: Number(parallel) };
  const derived = await derive(password, Buffer.from(salt, 'base64url'), cost);
  const expected = Buffer.from(hash, 'base64url');
  return expected.length === HASH_BYTES && timingSafeEqual(derived, expected);
}

function derive(password: string, salt: Buffer, { logN, blockSize, parallel }: HashCost): Promise<Buffer> {
  const N = 2 ** logN;
  const options: ScryptOptions = { N, r: blockSize, p: parallel, maxmem: 256 * N * blockSize };
  return new Promise((resolve, reject) => {
    scrypt(spelled(password), salt, HASH_BYTES, options, (error, key) => (error ? reject(error) : resolve(key)));
  });
}
