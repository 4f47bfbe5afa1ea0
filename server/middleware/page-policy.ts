import { randomBytes } from 'node:crypto';
import type { RequestHandler } from 'express';
import helmet from 'helmet';

/** The nonce of this response: index.html carries it for the few style elements that are made at run time. */
export function nonceOf(locals: Record<string, unknown>): string {
  return String(locals.nonce);
}

/** What a page of the app may load and do: its own scripts, nothing evaluated, nothing from elsewhere. */
export function pagePolicy(isSecure: () => boolean): RequestHandler[] {
  const directives = {
    defaultSrc: ["'none'"],
    scriptSrc: ["'self'"],
    styleSrc: [
      "'self'",
      (_request: unknown, response: unknown) =>
        `'nonce-${nonceOf((response as { locals: Record<string, unknown> }).locals)}'`,
    ],
    imgSrc: ["'self'", 'data:'],
    fontSrc: ["'self'"],
    connectSrc: ["'self'"],
    workerSrc: ["'self'"],
    frameSrc: ["'self'"],
    manifestSrc: ["'self'"],
    formAction: ["'self'"],
    baseUri: ["'none'"],
    frameAncestors: ["'none'"],
    objectSrc: ["'none'"],
  };
  const common = {
    contentSecurityPolicy: { useDefaults: false, directives },
    xFrameOptions: { action: 'deny' },
  } as const;
  const secure = helmet(common);
  const plain = helmet({ ...common, strictTransportSecurity: false }); // on loopback, without TLS
  return [
    (_request, response, next) => {
      response.locals.nonce = randomBytes(16).toString('base64');
      next();
    },
    (request, response, next) => (isSecure() ? secure : plain)(request, response, next),
  ];
}
