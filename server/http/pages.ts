import { randomBytes } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import express, { type RequestHandler, Router } from 'express';
import helmet from 'helmet';

/** Stands in the built index.html wherever the nonce of the answer belongs (`html.cspNonce` of the build). */
export const noncePlaceholder = 'STEMMA-NONCE';

/** Sets a strict content security policy and the other headers; each answer has a nonce of its own for styles. */
export function safeHeaders(isHttps: boolean): RequestHandler[] {
  const giveNonce: RequestHandler = (_request, response, next) => {
    response.locals.nonce = randomBytes(16).toString('base64');
    next();
  };
  const headers = helmet({
    contentSecurityPolicy: {
      useDefaults: false,
      directives: {
        defaultSrc: ["'none'"],
        scriptSrc: ["'self'"],
        styleSrc: ["'self'", (_request, response) => `'nonce-${(response as express.Response).locals.nonce}'`],
        fontSrc: ["'self'"],
        imgSrc: ["'self'", 'data:'],
        connectSrc: ["'self'"],
        workerSrc: ["'self'"],
        formAction: ["'self'"],
        baseUri: ["'none'"],
        frameAncestors: ["'none'"],
      },
    },
    strictTransportSecurity: isHttps,
    referrerPolicy: { policy: 'same-origin' },
  });
  return [giveNonce, headers];
}

/** The built client: files with a hash in their name are kept by browsers, the page itself never is. */
export function servePages(folder: string): Router {
  const page = readFileSync(join(folder, 'index.html'), 'utf8');
  const router = Router();
  router.use(
    '/assets',
    express.static(join(folder, 'assets'), { immutable: true, maxAge: '1y', index: false, fallthrough: false }),
  );
  router.use(express.static(folder, { index: false, dotfiles: 'ignore' }));
  router.get('/{*path}', (_request, response) => {
    response
      .set('Cache-Control', 'no-store')
      .type('html')
      .send(page.replaceAll(noncePlaceholder, response.locals.nonce));
  });
  return router;
}
