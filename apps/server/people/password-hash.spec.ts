// Test vectors of scrypt: RFC 7914, section 12, second and third.
import { scryptSync } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import { hashPassword, isPassword } from './password-hash.js';

const CHEAP = { logN: 4, blockSize: 1, parallel: 1 };

describe('a stored password', () => {
  it('fits the password it was made from, and no other', async () => {
    const stored = await hashPassword('correct horse battery', CHEAP);
    expect(await isPassword('correct horse battery', stored)).toBe(true);
    for (const wrong of ['', 'correct horse batterz', 'Correct horse battery', 'correct horse battery ']) {
      expect(await isPassword(wrong, stored)).toBe(false);
    }
  });

  it('is salted: twice the same password is not twice the same text, and none holds the password', async () => {
    const [a, b] = [await hashPassword('same password', CHEAP), await hashPassword('same password', CHEAP)];
    expect(a).not.toBe(b);
    expect(a).not.toContain('same');
    expect(a).toMatch(/^\$scrypt\$ln=4,r=1,p=1\$[\w-]{22}\$[\w-]{43}$/);
  });

  it('is the same to every keyboard that composes letters in its own way', async () => {
    expect(await isPassword('Zu\u0308rich im Regen', await hashPassword('Zürich im Regen', CHEAP))).toBe(true);
  });

  it('is checked with the parameters it was made with, whatever is usual by then', async () => {
    const stored = await hashPassword('older than the present cost', { logN: 5, blockSize: 2, parallel: 3 });
    expect(await isPassword('older than the present cost', stored)).toBe(true);
    // Control: with other parameters the same password leads elsewhere.
    expect(await isPassword('older than the present cost', stored.replace('p=3', 'p=2'))).toBe(false);
  });

  it('is derived by scrypt as its authors publish it', async () => {
    // Their salts are words of their own, so the stored text is put together here.
    const vectors: [string, string, [number, number, number], string][] = [
      ['password', 'NaCl', [10, 8, 16], 'fdbabe1c9d3472007856e7190d01e9fe7c6ad7cbc8237830e77376634b373162'],
      [
        'pleaseletmein',
        'SodiumChloride',
        [14, 8, 1],
        '7023bdcb3afd7348461c06cd81fd38ebfda8fbba904f8e3ea9b543f6545da1f2',
      ],
    ];
    for (const [password, salt, [logN, r, p], first] of vectors) {
      const hash = Buffer.from(first, 'hex').toString('base64url');
      const stored = `$scrypt$ln=${logN},r=${r},p=${p}$${Buffer.from(salt).toString('base64url')}$${hash}`;
      expect(await isPassword(password, stored)).toBe(true);
    }
    expect(scryptSync('password', 'NaCl', 32, { N: 1024, r: 8, p: 16 }).toString('hex')).toBe(vectors[0]![3]);
  });

  it('that is none of ours is a fault, not a refusal', async () => {
    await expect(isPassword('any', 'plain text')).rejects.toThrow(/no hash of ours/);
  });
});
