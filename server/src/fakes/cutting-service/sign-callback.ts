import { createHmac } from 'node:crypto';

/** Headers of a callback: when it was sent, ms since 1970, and an HMAC-SHA256 over `time.body` in hex. */
export function signCallback(body: string, secret: string, now: Date): Record<string, string> {
  const time = String(now.getTime());
  return {
    'x-ashmarrow-time': time,
    'x-ashmarrow-signature': createHmac('sha256', secret).update(`${time}.${body}`).digest('hex'),
  };
}
