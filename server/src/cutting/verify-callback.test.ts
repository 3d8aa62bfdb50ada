import { createHmac } from 'node:crypto';
import { UnprovenCallback } from './cutting-service';
import { verifyCallback } from './verify-callback';

const NOW = new Date('2026-03-02T08:00:00Z');
const BODY = Buffer.from('{"id":"cb-1"}');
const signed = (time: string, secret = 'secret', body = BODY) => ({
  time,
  signature: createHmac('sha256', secret).update(`${time}.${body.toString()}`).digest('hex'),
});
const at = (offsetMs: number) => String(NOW.getTime() + offsetMs);

describe('verifyCallback', () => {
  it('takes what the holder of the secret wrote lately', () => {
    expect(() => verifyCallback(BODY, signed(at(-1000)), 'secret', NOW)).not.toThrow();
  });

  it.each([
    ['another secret', signed(at(0), 'other')],
    ['another body', signed(at(0), 'secret', Buffer.from('{}'))],
    ['a time that was not signed', { ...signed(at(0)), time: at(1) }],
    ['a message of six minutes ago', signed(at(-6 * 60_000))],
    ['a message from the future', signed(at(6 * 60_000))],
    ['no signature', { time: at(0), signature: undefined }],
    ['no time', { time: undefined, signature: signed(at(0)).signature }],
    ['a signature that is no hex', { time: at(0), signature: 'zz' }],
    ['a time that is no number', { ...signed(at(0)), time: 'now' }],
  ])('refuses %s', (_name, message) => {
    expect(() => verifyCallback(BODY, message, 'secret', NOW)).toThrow(UnprovenCallback);
  });
});
