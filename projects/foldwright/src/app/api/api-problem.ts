import { HttpErrorResponse } from '@angular/common/http';
import { PROBLEMS, type ProblemDetails, type ProblemSlug, problemSchema } from '@foldwright/shared/contracts/problems';
import * as z from 'zod/mini';

/** What went wrong, by name: a problem of the API, no connection, or an answer that doesn't keep the contract. */
export type ApiProblemSlug = ProblemSlug | 'offline' | 'unreadable-answer';

/** Everything that a person is told about a request that failed. Code decides by `slug`, never by the words. */
export class ApiProblem extends Error {
  override readonly name = 'ApiProblem';

  constructor(
    readonly slug: ApiProblemSlug,
    readonly details: ProblemDetails,
  ) {
    super(`${details.title}: ${details.detail}`);
  }

  get status(): number {
    return this.details.status;
  }

  /** What is wrong with one field, by JSON pointer (`/email`), or null. */
  fieldError(pointer: string): string | null {
    return this.details.errors?.find((error) => error.pointer === pointer)?.detail ?? null;
  }

  /** The slug's extra member, parsed; null when it is missing or of another shape. */
  extra<S extends z.ZodMiniType>(schema: S): z.output<S> | null {
    const parsed = z.safeParse(schema, this.details.extra);
    return parsed.success ? parsed.data : null;
  }
}

/** Turns whatever a request threw into an `ApiProblem`; anything that is no failed request is thrown on. */
export function problemFromError(error: unknown): ApiProblem {
  if (error instanceof ApiProblem) return error;
  if (!(error instanceof HttpErrorResponse)) throw error;
  if (error.status === 0) return offlineProblem(error.url ?? '');
  const parsed = z.safeParse(problemSchema, jsonBody(error.error));
  if (!parsed.success) return unreadableAnswer(error.url ?? '', error.status);
  const slug = parsed.data.type.replace(/^.*\/problems\//, '');
  return new ApiProblem(isProblemSlug(slug) ? slug : 'internal', parsed.data);
}

/** An answer that the contract's schema doesn't take: this page and the server are of different versions. */
export function unreadableAnswer(url: string, status: number): ApiProblem {
  return new ApiProblem('unreadable-answer', {
    type: '/problems/unreadable-answer',
    title: 'This page doesn’t understand the answer',
    status,
    detail: 'The server answered in a way this page doesn’t know. It may be newer than the page.',
    instance: url,
    kept: 'What is stored on the server is unchanged.',
    next: 'Load the page again.',
  });
}

function offlineProblem(url: string): ApiProblem {
  return new ApiProblem('offline', {
    type: '/problems/offline',
    title: 'No connection',
    status: 0,
    detail: 'The server can’t be reached from here.',
    instance: url,
    kept: 'What was stored before is kept.',
    next: 'Look at the network, then try again.',
  });
}

function isProblemSlug(slug: string): slug is ProblemSlug {
  return slug in PROBLEMS;
}

/** Bodies of file requests arrive as text even when the problem is JSON. */
function jsonBody(body: unknown): unknown {
  if (typeof body !== 'string') return body;
  try {
    return JSON.parse(body);
  } catch {
    // Not JSON, so not a problem of this API either; the schema refuses it in the next step.
    return null;
  }
}
