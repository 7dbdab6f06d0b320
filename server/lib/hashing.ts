import { createHash, randomBytes } from 'node:crypto';
import canonicalize from 'canonicalize';
import { hash, verify } from '@node-rs/argon2';

export const sha256Hex = (text: string | Buffer): string => createHash('sha256').update(text).digest('hex');

/** Canonical JSON of RFC 8785: one spelling for equal values. Throws on what JSON cannot hold. */
export function canonicalJson(value: unknown): string {
  const text = canonicalize(value);
  if (text === undefined) throw new TypeError('The value has no JSON form.');
  return text;
}

/** URL-safe secret with 192 bits. */
export const newSecret = (): string => randomBytes(24).toString('base64url');

// OWASP Password Storage Cheat Sheet (2024): argon2id with 19 MiB, 2 passes, 1 lane.
// The enum is ambient, so its value is written out.
const argon2id = 2;
const argon = { algorithm: argon2id, memoryCost: 19_456, timeCost: 2, parallelism: 1 };
export const hashPassword = (password: string): Promise<string> => hash(password, argon);
export const verifyPassword = (stored: string, password: string): Promise<boolean> =>
  verify(stored, password);
