import type { RouteContract } from '@foldwright/shared/contracts/route';
import type { Request } from 'express';
import * as z from 'zod/mini';
import { issueEntries } from './issue-words';
import { Problem } from './problem';

export interface CheckedInput {
  readonly params: unknown;
  readonly query: unknown;
  readonly body: unknown;
}

/**
 * Check address, query and body against the contract.
 * @throws Problem `invalid-input` with every issue of all three at once
 */
export function validate(contract: RouteContract, request: Request): CheckedInput {
  const errors: { pointer: string; detail: string }[] = [];
  const check = (schema: z.ZodMiniType | undefined, value: unknown, prefix: string): unknown => {
    if (schema === undefined) return undefined;
    const result = z.safeParse(schema, value, { reportInput: true });
    if (result.success) return result.data;
    errors.push(...issueEntries(result.error.issues, prefix));
    return undefined;
  };
  const input = {
    params: check(contract.params, request.params, 'params'),
    query: check(contract.query, request.query, 'query'),
    body: check(contract.body, request.body, ''),
  };
  if (errors.length > 0) {
    const detail =
      errors.length === 1 ? 'One thing has to be put right.' : `${errors.length} things have to be put right.`;
    throw new Problem('invalid-input', { detail, errors });
  }
  return input;
}

/**
 * Revision from an `If-Match` header, quoted or not.
 * @throws Problem `if-match-missing`, or `invalid-input` when it is no revision
 */
export function readIfMatch(request: Request): number {
  const header = request.get('if-match');
  if (header === undefined) {
    throw new Problem('if-match-missing', {
      detail: 'A change has to say which revision it is based on.',
      next: 'Send the revision you read as If-Match.',
    });
  }
  const match = /^(?:W\/)?"?(\d{1,9})"?$/.exec(header.trim());
  if (match === null) {
    throw new Problem('invalid-input', {
      detail: 'If-Match is not a revision.',
      errors: [{ pointer: 'headers/if-match', detail: 'Send the revision as a number.' }],
    });
  }
  return Number(match[1]);
}

/** @throws Problem `idempotency-key-missing`, or `invalid-input` when it is longer than 200 characters */
export function readIdempotencyKey(request: Request): string {
  const key = request.get('idempotency-key')?.trim() ?? '';
  if (key === '') {
    throw new Problem('idempotency-key-missing', {
      detail: 'Without a key, pressing twice would do it twice.',
      next: 'Send an Idempotency-Key, made anew for each thing you want done.',
    });
  }
  if (key.length > 200) {
    throw new Problem('invalid-input', {
      detail: 'The Idempotency-Key is too long.',
      errors: [{ pointer: 'headers/idempotency-key', detail: 'At most 200 characters.' }],
    });
  }
  return key;
}
