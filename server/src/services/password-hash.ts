import type { ScryptOptions } from 'node:crypto';
import { randomBytes, scrypt, timingSafeEqual } from 'node:crypto';

// Cost: 2^15 blocks of 8 with one lane take 32 MB and some 60 ms here. Source: OWASP Password Storage Cheat Sheet,
// scrypt, which lists N=2^15, r=8, p=3; three lanes cost the time, not the memory.
const COST = { N: 2 ** 15, r: 8, p: 3, maxmem: 64 * 1024 * 1024 } as const;
const KEY_BYTES = 32;

const derive = (password: string, salt: Buffer, length: number, options: ScryptOptions): Promise<Buffer> =>
  new Promise((resolve, reject) => {
    scrypt(password.normalize('NFC'), salt, length, options, (error, key) => (error ? reject(error) : resolve(key)));
  });

/** A password as it is stored: method, cost, salt and key, so that the cost can be raised later. */
export async function hashPassword(password: string): Promise<string> {
  const salt = randomBytes(16);
  const key = await derive(password, salt, KEY_BYTES, COST);
  return ['scrypt', COST.N, COST.r, COST.p, salt.toString('base64url'), key.toString('base64url')].join('$');
}

/** Whether the password is the stored one, in the same time either way. A damaged hash fits no password. */
export async function isPasswordRight(password: string, stored: string): Promise<boolean> {
  const [method, n, r, p, salt, key] = stored.split('$');
  if (method !== 'scrypt' || salt === undefined || key === undefined) return false;
  const expected = Buffer.from(key, 'base64url');
  const cost = { N: Number(n), r: Number(r), p: Number(p), maxmem: COST.maxmem };
  const actual = await derive(password, Buffer.from(salt, 'base64url'), expected.length, cost);
  return timingSafeEqual(actual, expected);
}

let spare: Promise<string> | undefined;

/** Takes as long as checking a password, for accounts that don't exist: the answer's time tells nothing. */
export async function spendPasswordTime(password: string): Promise<void> {
  spare ??= hashPassword(randomBytes(16).toString('hex'));
  await isPasswordRight(password, await spare);
}
