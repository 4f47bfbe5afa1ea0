import type { CookieOptions, Request, Response } from 'express';
import type { Keys } from './keys.js';

/** How long a device stays signed in without being used. */
export const SESSION_DAYS = 30;
const LIFE_MS = SESSION_DAYS * 86_400_000;
const REFRESH_PATH = '/api/account';
const VERIFY_PATH = '/api/account/verify';
const REGISTRATION_MS = 7 * 86_400_000; // a letter can be asked for again

export interface Tokens {
  readonly access: string;
  readonly refresh: string;
}

/** The two cookies of a session, and the one of a registration that waits for its letter: out of reach for scripts, sent from our own pages only, over TLS but on loopback. */
export class SessionCookies {
  private readonly accessName: string;
  private readonly refreshName: string;
  private readonly registrationName: string;

  constructor(
    keys: Keys,
    private readonly isSecure: () => boolean,
  ) {
    this.accessName = `hummock-access-${keys.cookieSuffix}`;
    this.refreshName = `hummock-refresh-${keys.cookieSuffix}`;
    this.registrationName = `hummock-registration-${keys.cookieSuffix}`;
  }

  set(response: Response, tokens: Tokens): void {
    response.cookie(this.accessName, tokens.access, { ...this.options('/api'), maxAge: LIFE_MS }); // outlives the token: an ended session is told from none
    response.cookie(this.refreshName, tokens.refresh, { ...this.options(REFRESH_PATH), maxAge: LIFE_MS });
  }

  clear(response: Response): void {
    response.clearCookie(this.accessName, this.options('/api'));
    response.clearCookie(this.refreshName, this.options(REFRESH_PATH));
  }

  setRegistration(response: Response, proof: string): void {
    response.cookie(this.registrationName, proof, { ...this.options(VERIFY_PATH), maxAge: REGISTRATION_MS });
  }
  clearRegistration(response: Response): void {
    response.clearCookie(this.registrationName, this.options(VERIFY_PATH));
  }
  registrationOf(request: Request): string | undefined {
    return cookieOf(request, this.registrationName);
  }

  accessOf(request: Request): string | undefined {
    return cookieOf(request, this.accessName);
  }
  refreshOf(request: Request): string | undefined {
    return cookieOf(request, this.refreshName);
  }

  private options(path: string): CookieOptions {
    return { httpOnly: true, sameSite: 'lax', secure: this.isSecure(), path };
  }
}

function cookieOf(request: Request, name: string): string | undefined {
  for (const pair of (request.headers.cookie ?? '').split(';')) {
    const [key, ...value] = pair.trim().split('=');
    if (key === name) return value.join('=');
  }
  return undefined;
}
