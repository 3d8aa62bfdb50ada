import { randomUUID } from 'node:crypto';
import type { RequestHandler, Response } from 'express';
import type { Logger } from 'pino';

/** Id under which a request stands in the log and in a problem that answers it. */
export function requestIdOf(response: Response): string {
  const id: unknown = response.locals['requestId'];
  return typeof id === 'string' ? id : 'none';
}

/** From this length on a part of an address is a private link or an invitation: whoever has it is let in. */
const SHORTEST_SECRET = 40;

/** An address as it may stand in a log: without what would let a reader of the log in. */
export const loggedPath = (path: string): string =>
  path
    .split('/')
    .map((part) => (part.length < SHORTEST_SECRET ? part : '…'))
    .join('/');

/** Gives every request an id and writes one line when it ends. Neither headers, bodies nor queries are logged. */
export function requestLog(logger: Logger): RequestHandler {
  return (request, response, next) => {
    const requestId = randomUUID();
    const began = process.hrtime.bigint();
    response.locals['requestId'] = requestId;
    response.set('X-Request-Id', requestId);
    response.once('close', () => {
      const ms = Number(process.hrtime.bigint() - began) / 1e6;
      const line = {
        requestId,
        method: request.method,
        path: loggedPath(request.path),
        status: response.statusCode,
        ms: Math.round(ms * 10) / 10,
      };
      if (response.statusCode >= 500) logger.error(line, 'request failed');
      else logger.debug(line, 'request');
    });
    next();
  };
}
