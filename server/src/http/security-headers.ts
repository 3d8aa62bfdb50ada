import { randomBytes } from 'node:crypto';
import type { RequestHandler, Response } from 'express';
import helmet from 'helmet';

/** Nonce of the page's content security policy, made for each request. */
export function nonceOf(response: Response): string {
  const nonce: unknown = response.locals['nonce'];
  if (typeof nonce !== 'string') throw new Error('The nonce is made before any page is served.');
  return nonce;
}

/**
 * Security headers: only our own scripts and styles run, nobody frames the page. Strict transport only where people
 * come by https: over http it would lock a workshop's own machine out.
 */
export function securityHeaders(isSecure: boolean): RequestHandler[] {
  const withNonce = (_request: unknown, response: unknown): string => {
    const locals = typeof response === 'object' && response !== null && 'locals' in response ? response.locals : {};
    const nonce = typeof locals === 'object' && locals !== null && 'nonce' in locals ? String(locals.nonce) : '';
    return `'nonce-${nonce}'`;
  };
  return [
    (_request, response, next) => {
      response.locals['nonce'] = randomBytes(16).toString('base64');
      next();
    },
    helmet({
      contentSecurityPolicy: {
        useDefaults: false,
        directives: {
          defaultSrc: ["'self'"],
          scriptSrc: ["'self'", withNonce],
          styleSrc: ["'self'", withNonce],
          imgSrc: ["'self'", 'data:', 'blob:'],
          fontSrc: ["'self'"],
          connectSrc: ["'self'"],
          workerSrc: ["'self'"],
          objectSrc: ["'none'"],
          frameAncestors: ["'none'"],
          baseUri: ["'self'"],
          formAction: ["'self'"],
          ...(isSecure ? { upgradeInsecureRequests: [] } : {}),
        },
      },
      strictTransportSecurity: isSecure ? { maxAge: 15552000 } : false,
      xFrameOptions: { action: 'deny' },
      referrerPolicy: { policy: 'same-origin' },
      crossOriginEmbedderPolicy: false,
      // Browsers ignore it over plain http and warn about it on every page.
      originAgentCluster: isSecure,
      crossOriginOpenerPolicy: isSecure ? { policy: 'same-origin' } : false,
    }),
    (_request, response, next) => {
      response.set('Permissions-Policy', 'camera=(self), geolocation=(), microphone=(), payment=()');
      next();
    },
  ];
}
