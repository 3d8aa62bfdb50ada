import type { ErrorRequestHandler, RequestHandler, Response } from 'express';
import { MulterError } from 'multer';
import type { Logger } from 'pino';
import { Problem } from './problem';
import { loggedPath, requestIdOf } from './request-log';

/** What body-parser and its kin put on their errors. */
function statusOf(error: unknown): number | undefined {
  if (typeof error !== 'object' || error === null || !('status' in error)) return undefined;
  return typeof error.status === 'number' ? error.status : undefined;
}

/** A problem for what Express and the body parsers refuse by themselves; undefined for everything unforeseen. */
function foreseen(error: unknown): Problem | undefined {
  if (error instanceof Problem) return error;
  if (error instanceof MulterError) {
    return error.code === 'LIMIT_FILE_SIZE'
      ? new Problem('file-too-large', { detail: 'A file may have up to 25 MB.', kept: 'Nothing was stored.' })
      : new Problem('invalid-input', {
          detail: 'The upload is not put together as it has to be.',
          errors: [
            {
              pointer: `/${error.field ?? 'file'}`,
              detail: 'One file, in the field “file”, beside the facts about it.',
            },
          ],
        });
  }
  if (error instanceof URIError) return new Problem('not-found', { detail: 'The address can’t be read.' });
  const status = statusOf(error);
  if (status === 413) return new Problem('file-too-large', { detail: 'That is more than can be taken at once.' });
  if (status === 400 || status === 415) {
    return new Problem('invalid-input', {
      detail: 'What was sent can’t be read.',
      errors: [{ pointer: '', detail: 'This is not readable JSON, or it was cut off.' }],
    });
  }
  return undefined;
}

function write(response: Response, problem: Problem, instance: string): void {
  const seconds: unknown =
    problem.slug === 'too-many-requests' && typeof problem.words.extra === 'object' && problem.words.extra !== null
      ? Object.entries(problem.words.extra).find(([name]) => name === 'retryAfterSeconds')?.[1]
      : undefined;
  if (typeof seconds === 'number') response.set('Retry-After', String(seconds));
  response
    .status(problem.status)
    .set({ 'Content-Type': 'application/problem+json; charset=utf-8', 'Cache-Control': 'no-store' })
    .end(JSON.stringify(problem.toDetails(instance, requestIdOf(response))));
}

/** The last middleware: writes a problem; anything unforeseen is logged whole and told with nothing but the request's id. */
export function writeProblems(logger: Logger): ErrorRequestHandler {
  return (error: unknown, request, response, _next) => {
    const problem = foreseen(error);
    if (problem === undefined) {
      logger.error(
        { err: error, requestId: requestIdOf(response), method: request.method, path: loggedPath(request.path) },
        'unforeseen',
      );
    }
    if (response.headersSent) {
      response.destroy();
      return;
    }
    write(
      response,
      problem ??
        new Problem('internal', {
          detail: `Something unforeseen happened. It is in the log under ${requestIdOf(response)}.`,
          next: 'Try again; if it happens again, tell the operator this number.',
        }),
      request.originalUrl,
    );
  };
}

/** For addresses below /api that no route has. */
export const refuseUnknownAddress: RequestHandler = () => {
  throw new Problem('not-found', { detail: 'There is no such address.' });
};
