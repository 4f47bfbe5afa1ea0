import { hash, verify } from '@node-rs/argon2';

/** Argon2id with 19 MiB, two passes, one lane: the least that OWASP's password storage sheet asks for. */
const COST = { memoryCost: 19_456, timeCost: 2, parallelism: 1 };

export function passwordHash(password: string): Promise<string> {
  return hash(password, COST);
}

/** A hash that no password opens, made with the same cost: an unknown address takes as long as a known one. */
const decoy = passwordHash('no one signs in with this');

export async function opens(storedHash: string | undefined, password: string): Promise<boolean> {
  const isRight = await verify(storedHash ?? (await decoy), password);
  return isRight && storedHash !== undefined;
}
