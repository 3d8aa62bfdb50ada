import { readFileSync } from 'node:fs';
import path from 'node:path';
import type { Express, RequestHandler } from 'express';
import express from 'express';
import { nonceOf } from './security-headers';

/** Placeholder in the built page for the nonce of its content security policy. */
const NONCE_MARK = '__CSP_NONCE__';
/** The builder puts a hash into the names of everything it makes, so such a file never changes. */
const HASHED_NAME = /-[A-Z0-9]{8}\.\w+$/;

/**
 * The built client: files as they are, and the page itself for every other address, since the client has routes of its
 * own. The page is written anew for each request because it carries the nonce.
 * @throws when there is no built client in the folder
 */
export function serveClient(app: Express, directory: string): void {
  const page = readFileSync(path.join(directory, 'index.html'), 'utf8');
  if (!page.includes(NONCE_MARK)) throw new Error(`The page in ${directory} has no place for its nonce.`);
  const sendPage: RequestHandler = (_request, response) => {
    response
      .set({ 'Content-Type': 'text/html; charset=utf-8', 'Cache-Control': 'no-store' })
      .end(page.replaceAll(NONCE_MARK, nonceOf(response)));
  };
  app.get(['/', '/index.html'], sendPage);
  app.use(
    express.static(directory, {
      index: false,
      redirect: false,
      setHeaders: (response, file) =>
        response.setHeader(
          'Cache-Control',
          HASHED_NAME.test(file) ? 'public, max-age=31536000, immutable' : 'public, max-age=0, must-revalidate',
        ),
    }),
  );
  app.get('/{*address}', (request, response, next) => {
    // A missing script or picture is missing; only addresses of the client's routes get the page.
    if (path.extname(request.path) === '') sendPage(request, response, next);
    else response.status(404).type('text').end('Not found');
  });
}
