import { HttpClient, HttpEventType, HttpHeaders, httpResource } from '@angular/common/http';
import { Injectable, type Signal, computed, inject } from '@angular/core';
import type {
  RouteBody,
  RouteContract,
  RouteParams,
  RouteQuery,
  RouteResponse,
} from '@foldwright/shared/contracts/route';
import { readSession } from '@foldwright/shared/contracts/session';
import { type Observable, catchError, firstValueFrom, from, map, of, switchMap } from 'rxjs';
import * as z from 'zod/mini';
import { type ApiProblem, problemFromError, unreadableAnswer } from './api-problem';
import { type UrlValue, routeUrl } from './route-url';
import { SessionToken } from './session-token';

/** Only those parts of a request that its contract names; the rest may be left out. */
type Part<K extends string, T> = [T] extends [undefined] ? { readonly [P in K]?: undefined } : { readonly [P in K]: T };

/** Input of one route: path parameters, query and body by its schemas, and the headers it asks for. */
export type RouteInput<R extends RouteContract> = Part<'params', RouteParams<R>> &
  Part<'query', RouteQuery<R>> &
  Part<'body', RouteBody<R>> & { readonly ifMatch?: number; readonly idempotencyKey?: string };

/** One thing read from the server, kept up to date by `reload`. The last value stays while a newer one is on its way. */
export interface ApiRead<T> {
  readonly value: Signal<T | undefined>;
  readonly problem: Signal<ApiProblem | null>;
  readonly isLoading: Signal<boolean>;
  reload(): void;
  /** Puts in what a change answered, so that nothing has to be fetched twice. */
  set(value: T): void;
}

/** How far an upload is; ends with `done`. */
export type UploadProgress<T> =
  | { readonly kind: 'sending'; readonly sentBytes: number; readonly totalBytes: number }
  | { readonly kind: 'done'; readonly value: T };

type AnyInput = {
  readonly params?: unknown;
  readonly query?: unknown;
  readonly body?: unknown;
  readonly ifMatch?: number;
  readonly idempotencyKey?: string;
};

/**
 * The only place that speaks HTTP. Every call is described by its contract: method, path, what is sent and the schema the
 * answer must keep. Fails with an `ApiProblem` and nothing else.
 */
@Injectable({ providedIn: 'root' })
export class ApiClient {
  private readonly http = inject(HttpClient);
  private readonly token = inject(SessionToken);

  /**
   * Sends one request and answers what the contract promises.
   * @param withinMs after so long without an answer it counts as no connection; forever when not said
   */
  async call<R extends RouteContract>(route: R, input: RouteInput<R>, withinMs?: number): Promise<RouteResponse<R>> {
    const answer = await firstValueFrom(this.send(route, input, withinMs));
    return this.parse(route, answer);
  }

  /** Reads and keeps reading: again whenever a signal used in `input` changes; nothing while it answers undefined. */
  read<R extends RouteContract>(route: R, input: () => RouteInput<R> | undefined): ApiRead<RouteResponse<R>> {
    const url = computed(() => {
      const given = input();
      return given === undefined ? undefined : this.url(route, given);
    });
    const resource = httpResource<RouteResponse<R>>(url, { parse: (answer) => this.parse(route, answer) });
    return {
      value: keepLast(url, () => (resource.hasValue() ? resource.value() : undefined)),
      problem: computed(() => {
        const error = resource.error();
        return error === undefined ? null : problemFromError(error);
      }),
      isLoading: resource.isLoading,
      reload: () => void resource.reload(),
      set: (value) => resource.set(value),
    };
  }

  /** Sends one file as multipart together with the body's fields, and tells how far it is. Unsubscribing stops it. */
  upload<R extends RouteContract>(
    route: R,
    input: RouteInput<R>,
    file: File,
  ): Observable<UploadProgress<RouteResponse<R>>> {
    const given: AnyInput = input;
    const form = new FormData();
    // Fields go before the file, so that the server knows them when the first bytes arrive.
    for (const [name, value] of Object.entries(urlValues(given.body))) form.append(name, String(value));
    form.append('file', file, file.name);
    return this.http
      .request(route.method, this.url(route, input), {
        body: form,
        headers: this.headers(given),
        observe: 'events',
        reportProgress: true,
      })
      .pipe(
        switchMap((event): Observable<UploadProgress<RouteResponse<R>>> => {
          if (event.type === HttpEventType.UploadProgress) {
            return of({ kind: 'sending', sentBytes: event.loaded, totalBytes: event.total ?? file.size });
          }
          if (event.type === HttpEventType.Response) return of({ kind: 'done', value: this.parse(route, event.body) });
          return from([]);
        }),
        catchError((error: unknown): never => {
          throw problemFromError(error);
        }),
      );
  }

  /** Address of a route, for links and pictures. */
  url<R extends RouteContract>(route: R, input: RouteInput<R>): string {
    const given: AnyInput = input;
    return routeUrl(route.path, urlValues(given.params), urlValues(given.query));
  }

  private send<R extends RouteContract>(route: R, input: RouteInput<R>, withinMs?: number): Observable<unknown> {
    return this.attempt(route, input, withinMs).pipe(
      catchError((error: unknown) => {
        const problem = problemFromError(error);
        if (problem.slug !== 'bad-csrf-token') throw problem;
        // Another tab signed in again, so this page's token is old. The session tells the new one; once is enough.
        return this.renewToken().pipe(switchMap(() => this.attempt(route, input, withinMs)));
      }),
      catchError((error: unknown): never => {
        throw problemFromError(error);
      }),
    );
  }

  private attempt<R extends RouteContract>(route: R, input: RouteInput<R>, withinMs?: number): Observable<unknown> {
    const given: AnyInput = input;
    return this.http.request(route.method, this.url(route, input), {
      ...(given.body === undefined ? {} : { body: given.body }),
      headers: this.headers(given),
      responseType: 'json',
      ...(withinMs === undefined ? {} : { timeout: withinMs }),
    });
  }

  private renewToken(): Observable<void> {
    return this.http
      .get(readSession.path)
      .pipe(map((answer) => this.token.renew(this.parse(readSession, answer).csrfToken)));
  }

  private headers(input: AnyInput): HttpHeaders {
    let headers = new HttpHeaders();
    const token = this.token.read();
    if (token !== null) headers = headers.set('x-csrf-token', token);
    if (input.ifMatch !== undefined) headers = headers.set('If-Match', `"${input.ifMatch}"`);
    if (input.idempotencyKey !== undefined) headers = headers.set('Idempotency-Key', input.idempotencyKey);
    return headers;
  }

  private parse<R extends RouteContract>(route: R, answer: unknown): RouteResponse<R> {
    const schema: z.ZodMiniType = route.response ?? z.unknown();
    const parsed = z.safeParse(schema, route.response === undefined ? undefined : answer);
    if (!parsed.success) throw unreadableAnswer(route.path, route.successStatus);
    // The schema of `R` has just accepted the answer; the compiler can't follow that through a generic.
    return parsed.data as RouteResponse<R>;
  }
}

/** A key under which the server counts a change once, however often it arrives. */
export function newIdempotencyKey(): string {
  return crypto.randomUUID();
}

const urlValueSchema = z.record(z.string(), z.optional(z.union([z.string(), z.number(), z.boolean()])));

function urlValues(values: unknown): Readonly<Record<string, UrlValue>> {
  return z.parse(urlValueSchema, values ?? {});
}

/** Remembers the last value of one address: a page doesn't go blank while it reads again, or when that fails. */
function keepLast<T>(url: Signal<string | undefined>, current: () => T | undefined): Signal<T | undefined> {
  let last: { readonly url: string | undefined; readonly value: T } | undefined;
  return computed(() => {
    const address = url();
    const value = current();
    if (value !== undefined) last = { url: address, value };
    return last?.url === address ? last?.value : undefined;
  });
}
