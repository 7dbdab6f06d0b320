/**
 * Device secrets are 192 random bits that the server makes itself, so no list of likely ones exists and a fast hash
 * is as hard to reverse as a slow one. A slow one (argon2id: 66 ms here) would need minutes of processor time
 * when thousands of devices reconnect after a power cut, and would hand anybody who can open a socket a way to
 * keep the server busy. People's passwords are another matter: server/lib/hashing.ts.
 */
import { createHash, timingSafeEqual } from 'node:crypto';

const prefix = 'sha256:';
const digestOf = (secret: string | Buffer): Buffer => createHash('sha256').update(secret).digest();

/** What is stored in devices.secret_hash for a secret made by `newSecret()`. */
export const hashDeviceSecret = (secret: string): string => prefix + digestOf(secret).toString('hex');

/** Compares in constant time; false for anything that is not a stored device hash. */
export function isDeviceSecret(storedHash: string, presented: string | Buffer): boolean {
  if (!storedHash.startsWith(prefix)) return false;
  const stored = Buffer.from(storedHash.slice(prefix.length), 'hex');
  const digest = digestOf(presented);
  return stored.length === digest.length && timingSafeEqual(stored, digest);
}
