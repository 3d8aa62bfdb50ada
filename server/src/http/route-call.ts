import type {
  RouteBody,
  RouteContract,
  RouteParams,
  RouteQuery,
  RouteResponse,
} from '@foldwright/shared/contracts/route';
import type { Request, Response } from 'express';
import type { UploadedFile } from '../files/uploaded-file';
import type { FileAnswer } from './file-answer';
import type { ActorFor } from './visitor';

/** Everything a handler gets: input that was checked against the contract, and who asks. */
export interface RouteCall<R extends RouteContract> {
  readonly actor: ActorFor<R['access']>;
  readonly params: RouteParams<R>;
  readonly query: RouteQuery<R>;
  readonly body: RouteBody<R>;
  /** Revision that the caller saw; present when the contract asks for `If-Match`. */
  readonly ifMatch: R['ifMatch'] extends true ? number : null;
  readonly idempotencyKey: R['idempotent'] extends true ? string : null;
  /** Bytes as they came; present for raw bodies. */
  readonly rawBody: R['bodyKind'] extends 'raw' ? Buffer : null;
  readonly upload: R['bodyKind'] extends 'upload' ? UploadedFile : null;
  readonly request: Request;
  /** Only for streams, for another status than the contract's, and for cookies. */
  readonly response: Response;
}

export type RouteAnswer<R extends RouteContract> = R['answer'] extends 'json'
  ? RouteResponse<R>
  : R['answer'] extends 'file'
    ? FileAnswer
    : void;

export type RouteHandler<R extends RouteContract> = (call: RouteCall<R>) => Promise<RouteAnswer<R>>;

/** A contract with its handler, types put aside. Made only by `bind`, which has checked that they fit. */
export interface BoundRoute {
  readonly contract: RouteContract;
  readonly handle: (call: object) => Promise<unknown>;
}

/** Join a contract and the handler that keeps it. */
export function bind<const R extends RouteContract>(contract: R, handler: RouteHandler<R>): BoundRoute {
  // The one place where the types of a route are put aside: `serveRoute` builds the call from the same contract.
  return { contract, handle: handler as unknown as BoundRoute['handle'] };
}
