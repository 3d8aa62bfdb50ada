import connectPgSimple from 'connect-pg-simple';
import type { Request, RequestHandler } from 'express';
import session from 'express-session';
import type { Pool } from 'pg';
import './session-types';

const LIFETIME_MS = 7 * 24 * 3600 * 1000;
export const SESSION_COOKIE = 'foldwright.sid';

export interface SessionOptions {
  readonly pool: Pool;
  readonly secret: string;
  /** Whether people reach this installation by https; then the cookie travels only there. */
  readonly isSecure: boolean;
  readonly onStoreError: (error: Error) => void;
}

/** Sessions in PostgreSQL; the browser holds only a signed id that scripts can't read. */
export function sessions({ pool, secret, isSecure, onStoreError }: SessionOptions): RequestHandler {
  const Store = connectPgSimple(session);
  return session({
    name: SESSION_COOKIE,
    secret,
    resave: false,
    saveUninitialized: false,
    cookie: { httpOnly: true, sameSite: 'lax', secure: isSecure, maxAge: LIFETIME_MS, path: '/' },
    store: new Store({
      pool,
      tableName: 'http_sessions',
      createTableIfMissing: false,
      pruneSessionInterval: 15 * 60,
      errorLog: (...parts: unknown[]) => onStoreError(new Error(parts.map(String).join(' '))),
    }),
  });
}

/** Whether the session a request came with has not been ended since, by whichever process. */
export function isSessionAlive(request: Request): Promise<boolean> {
  return new Promise((resolve, reject) => {
    request.sessionStore.get(request.sessionID, (error: unknown, stored) => {
      if (error) reject(error);
      else resolve(stored !== null && stored !== undefined);
    });
  });
}
