import { createHmac, timingSafeEqual } from 'node:crypto';
import type { Keys } from './keys.js';

/**
 * What the browser that registers keeps in a cookie: an HMAC over the address and the stored hash of the password. The
 * hash carries a random salt, so every registration has a proof of its own, and it stops holding once somebody else
 * registers the address anew.
 */
export function registrationProof(keys: Keys, email: string, passwordHash: string): string {
  return createHmac('sha256', keys.registration).update(`${email}\n${passwordHash}`).digest('base64url');
}

export function provesRegistration(
  keys: Keys,
  person: { readonly email: string; readonly passwordHash: string },
  proof: string | undefined,
): boolean {
  const expected = Buffer.from(registrationProof(keys, person.email, person.passwordHash));
  const given = Buffer.from(proof ?? '');
  return given.length === expected.length && timingSafeEqual(given, expected);
}
