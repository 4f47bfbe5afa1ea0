import type { RequestHandler } from 'express';
import { AppError } from '../../shared/errors.js';
import { text } from '../../shared/text.js';

const SAFE = new Set(['GET', 'HEAD', 'OPTIONS']);

/**
 * A request that changes something has to prove that it comes from a page of this server: by the browser's word
 * (Sec-Fetch-Site), else by its origin, which is the public one or that of the host asked for. One that brings
 * neither is refused.
 */
export function sameOrigin(publicUrl: () => string): RequestHandler {
  return (request, _response, next) => {
    if (SAFE.has(request.method)) return next();
    const site = request.get('sec-fetch-site');
    const origin = request.get('origin');
    const isOurs =
      (origin !== undefined && isOriginOf(origin, publicUrl(), request.get('host'))) || origin === undefined;
    const isProven = site === undefined ? origin !== undefined && isOurs : site === 'same-origin' && isOurs;
    if (!isProven) throw new AppError('cross-site', text.server.crossSite);
    next();
  };
}

function isOriginOf(origin: string, publicUrl: string, host: string | undefined): boolean {
  if (origin === publicUrl) return true;
  const url = URL.canParse(origin) ? new URL(origin) : undefined;
  return url !== undefined && host !== undefined && url.host === host;
}
