import { readFile } from 'node:fs/promises';
import { extname, join } from 'node:path';
import express, { Router } from 'express';
import { text } from '../../shared/text.js';
import { nonceOf } from './page-policy.js';

const YEAR_SECONDS = 31_536_000;
const NONCE_PLACE = /__CSP_NONCE__/g; // vite's html.cspNonce writes it

/** The built client: hashed files for ever, everything that is a page answers index.html with its own nonce. */
export function clientPages(clientDir: string): Router {
  const router = Router();
  const assets = {
    index: false,
    fallthrough: true,
    dotfiles: 'ignore',
    immutable: true,
    maxAge: YEAR_SECONDS * 1000,
  } as const;
  router.use('/assets', express.static(join(clientDir, 'assets'), assets));
  router.use(
    express.static(clientDir, {
      index: false,
      dotfiles: 'ignore',
      setHeaders: (response) => response.set('Cache-Control', 'no-cache'),
    }),
  );
  router.get('/{*any}', async (request, response, next) => {
    if (extname(request.path) !== '' || request.path.startsWith('/assets/')) return next();
    const page = await readFile(join(clientDir, 'index.html'), 'utf8').catch(() => undefined);
    if (page === undefined) return next();
    response.set('Cache-Control', 'no-store').type('html');
    response.send(page.replace(NONCE_PLACE, nonceOf(response.locals)));
  });
  router.use((_request, response) => {
    response
      .status(404)
      .set('Cache-Control', 'no-store')
      .type('txt')
      .send(`${text.errors.pageMissingTitle}. ${text.errors.pageMissingDetail}\n`);
  });
  return router;
}
