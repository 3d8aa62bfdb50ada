import type { Request } from 'express';
import type { Pool } from 'pg';
import { RateLimiterPostgres, RateLimiterRes } from 'rate-limiter-flexible';
import { Problem } from './problem';

const table = { tableName: 'rate_limits', tableCreated: true, clearExpiredByTimeout: false } as const;
const SIGN_IN_TRIES = 10;
const SIGN_IN_TRIES_FROM_ADDRESS = 100;
const SIGN_IN_WINDOW_S = 15 * 60;
const SIGN_UPS = 20;
const SIGN_UP_WINDOW_S = 15 * 60;
const INVITATIONS = 60;
const INVITATION_WINDOW_S = 3600;
const VISITOR_POSTS = 60;
const VISITOR_WINDOW_S = 10 * 60;

/** Limits on how often one address or one account may try, kept in PostgreSQL so that all web processes share them. */
export interface RateLimits {
  /** @throws Problem `too-many-requests` */
  countRequest(request: Request): Promise<void>;
  /** Count a try to sign in before it is made. @throws Problem `too-many-requests` */
  countSignIn(address: string, email: string): Promise<void>;
  /** Count something that anybody may write without an account: an order, its payment page, a question. @throws Problem `too-many-requests` */
  countVisitorPost(request: Request): Promise<void>;
  /** Count a workshop that somebody wants to start, with an account or without. @throws Problem `too-many-requests` */
  countSignUp(request: Request): Promise<void>;
  /** Count an invitation: anybody may start a workshop, so none may mail the world. @throws Problem `too-many-requests` */
  countInvitation(workshopId: string): Promise<void>;
  /** Forget the tries of an account that signed in. */
  forgiveSignIn(address: string, email: string): Promise<void>;
}

async function consume(limiter: RateLimiterPostgres, key: string, what: string): Promise<void> {
  try {
    await limiter.consume(key);
  } catch (refusal) {
    if (!(refusal instanceof RateLimiterRes)) throw refusal;
    const seconds = Math.max(1, Math.ceil(refusal.msBeforeNext / 1000));
    throw new Problem('too-many-requests', {
      detail: `${what} Try again in ${seconds < 90 ? `${seconds} s` : `${Math.ceil(seconds / 60)} minutes`}.`,
      extra: { retryAfterSeconds: seconds },
    });
  }
}

export function rateLimits(pool: Pool, requestsPerMinute: number): RateLimits {
  const limiter = (keyPrefix: string, points: number, duration: number) =>
    new RateLimiterPostgres({
      storeClient: pool,
      keyPrefix,
      points,
      duration,
      inMemoryBlockOnConsumed: points + 1,
      ...table,
    });
  const requests = limiter('requests', requestsPerMinute, 60);
  const perAccount = limiter('sign-in', SIGN_IN_TRIES, SIGN_IN_WINDOW_S);
  const perAddress = limiter('sign-in-from', SIGN_IN_TRIES_FROM_ADDRESS, SIGN_IN_WINDOW_S);
  const signUps = limiter('sign-up', SIGN_UPS, SIGN_UP_WINDOW_S);
  const invitations = limiter('invitations', INVITATIONS, INVITATION_WINDOW_S);
  const visitorPosts = limiter('visitor-posts', VISITOR_POSTS, VISITOR_WINDOW_S);
  const accountKey = (address: string, email: string) => `${address}|${email}`.slice(0, 200);
  return {
    countRequest: (request) => consume(requests, request.ip ?? 'unknown', 'That was very often in a minute.'),
    countVisitorPost: (request) =>
      consume(visitorPosts, request.ip ?? 'unknown', 'That was very often from this address.'),
    countSignUp: (request) =>
      consume(signUps, request.ip ?? 'unknown', 'Many workshops were started from this address.'),
    countInvitation: (workshopId) => consume(invitations, workshopId, 'This workshop has sent many invitations.'),
    async countSignIn(address, email) {
      await consume(perAccount, accountKey(address, email), 'That was wrong too often for this account.');
      await consume(perAddress, address, 'There were too many tries to sign in from this address.');
    },
    async forgiveSignIn(address, email) {
      await perAccount.delete(accountKey(address, email));
      await perAddress.reward(address);
    },
  };
}
