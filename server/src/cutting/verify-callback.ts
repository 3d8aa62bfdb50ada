import { createHmac, timingSafeEqual } from 'node:crypto';
import { UnprovenCallback } from './cutting-service';

/** How far the time in a callback may lie from ours, ms. */
const MESSAGE_AGE_MS = 5 * 60_000;

/**
 * Check that a callback was written by whoever holds the secret, and lately: HMAC-SHA256 in hex over `time.body`.
 * @param time ms since 1970, as the header carries it
 * @throws UnprovenCallback
 */
export function verifyCallback(
  body: Buffer,
  message: { time: string | undefined; signature: string | undefined },
  secret: string,
  now: Date,
): void {
  const { time, signature } = message;
  if (time === undefined || signature === undefined) throw new UnprovenCallback('The message carries no signature.');
  if (!/^\d{1,16}$/.test(time) || Math.abs(now.getTime() - Number(time)) > MESSAGE_AGE_MS) {
    throw new UnprovenCallback('The message is too old, or its clock is wrong.');
  }
  const expected = createHmac('sha256', secret).update(`${time}.`).update(body).digest();
  const given = Buffer.from(/^[0-9a-f]{64}$/.test(signature) ? signature : '', 'hex');
  if (given.length !== expected.length || !timingSafeEqual(given, expected)) {
    throw new UnprovenCallback('The signature does not fit the message.');
  }
}
