import { hkdfSync } from 'node:crypto';

/** A key for each purpose, derived from the one secret of the installation. */
export interface Keys {
  readonly accessToken: Uint8Array;
  readonly refreshToken: Uint8Array;
  readonly registration: Uint8Array;
  readonly cookieSuffix: string; // tells the cookies of two installations on one host apart: cookies ignore the port
}

export function keysFrom(secret: string): Keys {
  const derive = (purpose: string, bytes: number) =>
    new Uint8Array(hkdfSync('sha256', secret, '', `hummock ${purpose}`, bytes));
  return {
    accessToken: derive('access token', 32),
    refreshToken: derive('refresh token', 32),
    registration: derive('registration', 32),
    cookieSuffix: Buffer.from(derive('cookie names', 3)).toString('hex'),
  };
}
