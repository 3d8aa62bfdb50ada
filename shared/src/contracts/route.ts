import type * as z from 'zod/mini';

export type HttpMethod = 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';

/** What a person may be in one workshop, plus the two roles that stand outside of any. */
export const ROLES = ['owner', 'fabricator', 'viewer', 'customer', 'operator'] as const;
export type Role = (typeof ROLES)[number];

/**
 * Who may call a route. `public`: anybody, signed in or not. `signed-in`: any session. `service`: an outside service that
 * signs its message. A list of roles: members of the current workshop with one of them (`operator` stands outside workshops).
 */
export type Access = 'public' | 'signed-in' | 'service' | readonly Role[];

/** How a body travels. `raw` is verified before it is parsed; `upload` is multipart with one file in the field `file`. */
export type BodyKind = 'json' | 'upload' | 'raw';

/** How an answer travels. `stream` is server-sent events; `file` is bytes with a content type of its own. */
export type AnswerKind = 'json' | 'empty' | 'file' | 'stream';

/** One route of the product: Express, the OpenAPI description, the typed client and the role matrix are driven by it. */
export interface RouteContract {
  readonly id: string;
  readonly method: HttpMethod;
  /** Express notation, `/api/parts/:partId`. */
  readonly path: string;
  readonly summary: string;
  readonly tag: string;
  readonly access: Access;
  readonly params?: z.ZodMiniType;
  readonly query?: z.ZodMiniType;
  readonly body?: z.ZodMiniType;
  readonly bodyKind?: BodyKind;
  readonly answer: AnswerKind;
  readonly response?: z.ZodMiniType;
  readonly successStatus: 200 | 201 | 202 | 204;
  /** Whether the caller must send `If-Match` with the row's revision. */
  readonly ifMatch?: boolean;
  /** Whether the caller must send an `Idempotency-Key`. */
  readonly idempotent?: boolean;
  /** Problem slugs it can answer besides the general ones. */
  readonly problems?: readonly string[];
}

/** Keeps the literal types of a contract. */
export const defineRoute = <const R extends RouteContract>(route: R): R => route;

/** Parsed input of a route, by its schemas. */
export type RouteParams<R extends RouteContract> = R extends { readonly params: infer S extends z.ZodMiniType }
  ? z.output<S>
  : undefined;
export type RouteQuery<R extends RouteContract> = R extends { readonly query: infer S extends z.ZodMiniType }
  ? z.output<S>
  : undefined;
export type RouteBody<R extends RouteContract> = R extends { readonly body: infer S extends z.ZodMiniType }
  ? z.output<S>
  : undefined;
export type RouteResponse<R extends RouteContract> = R extends { readonly response: infer S extends z.ZodMiniType }
  ? z.output<S>
  : undefined;
