import { createHmac } from 'node:crypto';

/**
 * Value of the signature header of an event: the time and an HMAC-SHA256 over `time.body`.
 * Source: the published webhook signature scheme that the `stripe` package verifies.
 */
export function signEvent(body: string, secret: string, now: Date): string {
  const seconds = Math.floor(now.getTime() / 1000);
  const digest = createHmac('sha256', secret).update(`${seconds}.${body}`).digest('hex');
  return `t=${seconds},v1=${digest}`;
}
