import { ROUTE_CONTRACTS } from '@foldwright/shared/contracts/registry';
import type { RouteContract } from '@foldwright/shared/contracts/route';
import type { Express, RequestHandler, Response } from 'express';
import express from 'express';
import * as z from 'zod/mini';
import { admit } from '../policies/access';
import { refuseForgery } from './csrf';
import type { FileAnswer } from './file-answer';
import { writeFileAnswer } from './file-answer';
import { Problem } from './problem';
import type { UploadedFile } from '../files/uploaded-file';
import type { BoundRoute } from './route-call';
import type { ReceiveUpload } from './upload';
import { readIdempotencyKey, readIfMatch, validate } from './validate';
import type { Visitor } from './visitor';
import { NOBODY } from './visitor';

export interface ServeOptions {
  readonly routes: readonly BoundRoute[];
  /** Every contract that has to be kept; the registry unless a test says otherwise. */
  readonly contracts?: readonly RouteContract[];
  readonly publicOrigin: string;
  readonly receiveUpload: ReceiveUpload;
}

const LARGEST_JSON = '4mb';
const LARGEST_RAW = '1mb';

/**
 * Put the routes of the registry on the application.
 * @throws Error naming every contract without a handler, handler without a contract, and contract with two handlers
 */
export function serveRoutes(app: Express, options: ServeOptions): void {
  const contracts = options.contracts ?? ROUTE_CONTRACTS;
  const bound = new Map<RouteContract, BoundRoute>();
  const wrong: string[] = [];
  for (const route of options.routes) {
    if (!contracts.includes(route.contract)) wrong.push(`${route.contract.id} is not in the registry`);
    if (bound.has(route.contract)) wrong.push(`${route.contract.id} has two handlers`);
    bound.set(route.contract, route);
  }
  for (const contract of contracts) if (!bound.has(contract)) wrong.push(`${contract.id} has no handler`);
  if (wrong.length > 0) throw new Error(`The routes don’t match their contracts: ${wrong.join('; ')}.`);
  for (const route of bound.values()) mount(app, route, options);
}

function mount(app: Express, route: BoundRoute, options: ServeOptions): void {
  const { method, path } = route.contract;
  // Bodies are read only after the caller was let in, so that a stranger can't make the server work.
  const chain = [letIn(route.contract, options.publicOrigin), ...bodyParsers(route.contract), serve(route, options)];
  if (method === 'GET') app.get(path, chain);
  else if (method === 'POST') app.post(path, chain);
  else if (method === 'PUT') app.put(path, chain);
  else if (method === 'PATCH') app.patch(path, chain);
  else app.delete(path, chain);
}

/** Whoever sent the request, as `identifyVisitor` found out. */
function visitorOf(response: Response): Visitor {
  const visitor: Visitor | undefined = response.locals['visitor'];
  return visitor ?? NOBODY;
}

function letIn(contract: RouteContract, publicOrigin: string): RequestHandler {
  return (request, response, next) => {
    const visitor = visitorOf(response);
    const admission = admit(contract.access, visitor);
    if (admission.kind === 'not-signed-in') {
      throw new Problem('not-signed-in', { detail: 'Nobody is signed in, or the session has ended.' });
    }
    if (admission.kind === 'not-allowed') {
      throw new Problem('not-allowed', {
        detail:
          visitor.current === null
            ? 'You belong to no workshop here, or not any more.'
            : 'Your role in this workshop doesn’t include this.',
        kept: 'Nothing was changed.',
        next:
          visitor.current === null
            ? 'Load the page again; an owner of the workshop can invite you.'
            : 'An owner of the workshop can change roles.',
      });
    }
    // An outside service signs its message instead; it has no session to steal.
    if (contract.access !== 'service') refuseForgery(request, publicOrigin);
    response.locals['actor'] = admission.actor;
    next();
  };
}

function bodyParsers(contract: RouteContract): RequestHandler[] {
  if (contract.bodyKind === 'json') return [express.json({ limit: LARGEST_JSON, strict: true })];
  if (contract.bodyKind === 'raw') return [express.raw({ type: () => true, limit: LARGEST_RAW })];
  return [];
}

function serve(route: BoundRoute, options: ServeOptions): RequestHandler {
  const { contract } = route;
  return async (request, response) => {
    const actor: unknown = response.locals['actor'];
    const upload: UploadedFile | null =
      contract.bodyKind === 'upload' ? await options.receiveUpload(request, response) : null;
    const ifMatch = contract.ifMatch ? readIfMatch(request) : null;
    const idempotencyKey = contract.idempotent ? readIdempotencyKey(request) : null;
    const input = validate(contract, request);
    const rawBody = contract.bodyKind === 'raw' ? bytesOf(request.body) : null;
    response.status(contract.successStatus).set('Cache-Control', 'no-store');
    const call = { actor, ...input, upload, ifMatch, idempotencyKey, rawBody, request, response };
    const answer = await route.handle(call);
    write(contract, response, answer);
  };
}

const bytesOf = (body: unknown): Buffer => (Buffer.isBuffer(body) ? body : Buffer.alloc(0));

const isFileAnswer = (answer: unknown): answer is FileAnswer =>
  typeof answer === 'object' && answer !== null && 'bytes' in answer && Buffer.isBuffer(answer.bytes);

function write(contract: RouteContract, response: Response, answer: unknown): void {
  if (contract.answer === 'stream') return;
  if (contract.answer === 'empty') {
    response.end();
    return;
  }
  if (contract.answer === 'file') {
    if (!isFileAnswer(answer)) throw new Error(`${contract.id} has to answer a file.`);
    writeFileAnswer(response, answer);
    return;
  }
  if (contract.response === undefined) throw new Error(`${contract.id} has no schema for its answer.`);
  // The schema is the last gate outwards: what it doesn't name stays inside.
  const body = z.parse(contract.response, answer);
  if (typeof body === 'object' && body !== null && 'revision' in body && typeof body.revision === 'number') {
    response.set('ETag', `"${body.revision}"`);
  }
  response.json(body);
}
