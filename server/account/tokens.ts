import { createHmac, timingSafeEqual } from 'node:crypto';
import { jwtVerify, SignJWT } from 'jose';
import { z } from 'zod';
import type { Keys } from './keys.js';

const ACCESS_MINUTES = 15;
const PARTIES = { issuer: 'hummock', audience: 'hummock' };
const ClaimsSchema = z.object({ sub: z.uuid(), sid: z.uuid() });

export interface AccessClaims {
  readonly personId: string;
  readonly sessionId: string;
}

export function signAccess(keys: Keys, { personId, sessionId }: AccessClaims, now: Date): Promise<string> {
  return new SignJWT({ sid: sessionId })
    .setProtectedHeader({ alg: 'HS256' })
    .setSubject(personId)
    .setIssuer(PARTIES.issuer)
    .setAudience(PARTIES.audience)
    .setIssuedAt(now)
    .setExpirationTime(new Date(now.getTime() + ACCESS_MINUTES * 60_000))
    .sign(keys.accessToken);
}

/** What the token says, or undefined when it is not ours, was changed, or is older than a quarter of an hour. */
export async function readAccess(keys: Keys, token: string, now: Date): Promise<AccessClaims | undefined> {
  try {
    const options = { ...PARTIES, algorithms: ['HS256'], currentDate: now };
    const claims = ClaimsSchema.parse((await jwtVerify(token, keys.accessToken, options)).payload);
    return { personId: claims.sub, sessionId: claims.sid };
  } catch {
    return undefined;
  }
}

/**
 * The refresh token of one generation of a session. It follows from the row and the server's secret, so the same
 * successor can be given twice although nothing of it is stored.
 */
export function refreshToken(keys: Keys, session: { id: string; salt: string }, generation: number): string {
  return `${session.id}.${generation}.${refreshProof(keys, session, generation)}`;
}

function refreshProof(keys: Keys, session: { id: string; salt: string }, generation: number): string {
  const message = `${session.id}.${generation}.${session.salt}`;
  return createHmac('sha256', keys.refreshToken).update(message).digest('base64url');
}

/** The session and generation that a refresh token claims; `provesItself` settles the claim. */
export function claimedBy(token: string): { sessionId: string; generation: number; proof: string } | undefined {
  const [sessionId = '', digits = '', proof = ''] = token.split('.');
  if (!z.uuid().safeParse(sessionId).success || !/^\d{1,9}$/.test(digits)) return undefined;
  return { sessionId, generation: Number(digits), proof };
}

export function provesItself(
  keys: Keys,
  session: { id: string; salt: string },
  claim: { generation: number; proof: string },
): boolean {
  const expected = Buffer.from(refreshProof(keys, session, claim.generation));
  const given = Buffer.from(claim.proof);
  return expected.length === given.length && timingSafeEqual(expected, given);
}
