import { randomBytes, timingSafeEqual } from 'node:crypto';
import type { Request } from 'express';
import { Problem } from './problem';

const SAFE_METHODS: ReadonlySet<string> = new Set(['GET', 'HEAD', 'OPTIONS']);

/** The session's token, made at first use; asking for it stores the session. */
export function csrfTokenOf(request: Request): string {
  request.session.csrfToken ??= randomBytes(32).toString('base64url');
  return request.session.csrfToken;
}

function isSame(sent: string, expected: string): boolean {
  const a = Buffer.from(sent);
  const b = Buffer.from(expected);
  return a.length === b.length && timingSafeEqual(a, b);
}

/**
 * Refuse a change that a page of somebody else could have caused: its origin must be ours when the browser names one,
 * and it must carry the token of its session.
 * @param publicOrigin origin under which people reach this installation
 * @throws Problem `bad-csrf-token`
 */
export function refuseForgery(request: Request, publicOrigin: string): void {
  if (SAFE_METHODS.has(request.method)) return;
  const origin = request.get('origin');
  const ownHost = `${request.protocol}://${request.get('host') ?? ''}`;
  const isForeign = origin !== undefined && origin !== publicOrigin && origin !== ownHost;
  const expected = request.session.csrfToken;
  if (!isForeign && expected !== undefined && isSame(request.get('x-csrf-token') ?? '', expected)) return;
  throw new Problem('bad-csrf-token', {
    detail: isForeign ? 'The change came from another site.' : 'The page’s token for changes is missing or old.',
    kept: 'Nothing was changed.',
    next: 'Load the page again and repeat the change.',
  });
}
