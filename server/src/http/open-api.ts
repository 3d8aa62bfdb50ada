import { PROBLEMS, problemSchema } from '@foldwright/shared/contracts/problems';
import type { ProblemSlug } from '@foldwright/shared/contracts/problems';
import { ROUTE_CONTRACTS } from '@foldwright/shared/contracts/registry';
import type { RouteContract } from '@foldwright/shared/contracts/route';
import * as z from 'zod/mini';
import { SESSION_COOKIE } from './session';

type Json = Record<string, unknown>;

const isProblemSlug = (slug: string): slug is ProblemSlug => slug in PROBLEMS;

/** JSON Schema (2020-12, as OpenAPI 3.1 takes it) of what is sent (`input`) or answered (`output`). */
function schemaOf(schema: z.ZodMiniType, io: 'input' | 'output'): Json {
  const { $schema: _dialect, ...rest } = z.toJSONSchema(schema, {
    target: 'draft-2020-12',
    io,
    unrepresentable: 'any',
  });
  return rest;
}

const isObject = (value: unknown): value is Json =>
  typeof value === 'object' && value !== null && !Array.isArray(value);

/** Path or query parameters, one for each member of their schema. Numbers in an address are described as numbers. */
function parametersIn(place: 'path' | 'query', schema: z.ZodMiniType | undefined): Json[] {
  if (schema === undefined) return [];
  const whole = schemaOf(schema, 'output');
  const properties = isObject(whole['properties']) ? whole['properties'] : {};
  const required: unknown[] = Array.isArray(whole['required']) ? whole['required'] : [];
  return Object.entries(properties).map(([name, member]) => ({
    name,
    in: place,
    required: place === 'path' || required.includes(name),
    schema: member,
  }));
}

function headersOf(contract: RouteContract): Json[] {
  const header = (name: string, description: string, schema: Json): Json => ({
    name,
    in: 'header',
    required: true,
    description,
    schema,
  });
  const changes = contract.method !== 'GET' && contract.access !== 'service';
  return [
    ...(changes ? [header('x-csrf-token', 'Token of the session, from `GET /api/session`.', { type: 'string' })] : []),
    ...(contract.ifMatch ? [header('If-Match', 'Revision of the row that was seen.', { type: 'string' })] : []),
    ...(contract.idempotent
      ? [
          header('Idempotency-Key', 'Made anew for each thing to be done; a repetition gets the first answer.', {
            type: 'string',
            minLength: 1,
            maxLength: 200,
          }),
        ]
      : []),
  ];
}

function bodyOf(contract: RouteContract): Json {
  if (contract.bodyKind === 'raw') {
    const schema = { description: 'Signed by the service; verified before it is parsed.' };
    return { requestBody: { required: true, content: { 'application/json': { schema } } } };
  }
  if (contract.body === undefined) return {};
  const schema = schemaOf(contract.body, contract.bodyKind === 'upload' ? 'output' : 'input');
  if (contract.bodyKind !== 'upload')
    return { requestBody: { required: true, content: { 'application/json': { schema } } } };
  const properties = isObject(schema['properties']) ? schema['properties'] : {};
  const required: unknown[] = Array.isArray(schema['required']) ? schema['required'] : [];
  const multipart = {
    ...schema,
    properties: { ...properties, file: { type: 'string', contentMediaType: 'application/octet-stream' } },
    required: [...required, 'file'],
  };
  return { requestBody: { required: true, content: { 'multipart/form-data': { schema: multipart } } } };
}

function contentOf(contract: RouteContract): Json {
  if (contract.answer === 'json' && contract.response !== undefined) {
    return { content: { 'application/json': { schema: schemaOf(contract.response, 'output') } } };
  }
  if (contract.answer === 'file') return { content: { 'application/octet-stream': { schema: {} } } };
  if (contract.answer === 'stream') return { content: { 'text/event-stream': { schema: { type: 'string' } } } };
  return {};
}

/** Slugs any route of this shape can answer, beside those its contract names. */
function generalProblems(contract: RouteContract): ProblemSlug[] {
  const takesInput = [contract.params, contract.query, contract.body].some((schema) => schema !== undefined);
  const isOpen = contract.access === 'public' || contract.access === 'service';
  return [
    ...(takesInput ? (['invalid-input'] as const) : []),
    ...(isOpen ? [] : (['not-signed-in'] as const)),
    ...(Array.isArray(contract.access) ? (['not-allowed'] as const) : []),
    ...(contract.method !== 'GET' && contract.access !== 'service' ? (['bad-csrf-token'] as const) : []),
    ...(contract.params === undefined ? [] : (['not-found'] as const)),
    ...(contract.ifMatch ? (['if-match-missing'] as const) : []),
    ...(contract.idempotent ? (['idempotency-key-missing'] as const) : []),
    'too-many-requests',
    'internal',
  ];
}

function problemAnswers(contract: RouteContract): Json {
  const named = (contract.problems ?? []).filter(isProblemSlug);
  const byStatus = new Map<number, Set<string>>();
  for (const slug of [...generalProblems(contract), ...named]) {
    const { status } = PROBLEMS[slug];
    byStatus.set(status, (byStatus.get(status) ?? new Set()).add(`\`/problems/${slug}\`: ${PROBLEMS[slug].title}`));
  }
  const content = { 'application/problem+json': { schema: { $ref: '#/components/schemas/Problem' } } };
  const entries = [...byStatus].sort(([a], [b]) => a - b);
  return Object.fromEntries(
    entries.map(([status, lines]) => [String(status), { description: [...lines].join('; '), content }]),
  );
}

function accessWords({ access }: RouteContract): string {
  if (access === 'public') return 'For everybody.';
  if (access === 'signed-in') return 'For everybody who is signed in.';
  if (access === 'service') return 'For an outside service that signs its message.';
  return `For ${access.join(', ')}.`;
}

function operationOf(contract: RouteContract): Json {
  const isOpen = contract.access === 'public' || contract.access === 'service';
  const parameters = [
    ...parametersIn('path', contract.params),
    ...parametersIn('query', contract.query),
    ...headersOf(contract),
  ];
  return {
    operationId: contract.id,
    tags: [contract.tag],
    summary: contract.summary,
    description: accessWords(contract),
    security: isOpen ? [] : [{ session: [] }],
    ...(parameters.length === 0 ? {} : { parameters }),
    ...bodyOf(contract),
    responses: {
      [String(contract.successStatus)]: { description: contract.summary, ...contentOf(contract) },
      ...problemAnswers(contract),
    },
  };
}

/** The OpenAPI 3.1 description of every route in the registry. Source: OpenAPI Specification 3.1.0. */
export function describeApi(contracts: readonly RouteContract[] = ROUTE_CONTRACTS): Json {
  const paths: Record<string, Json> = {};
  for (const contract of contracts) {
    const address = contract.path.replace(/:(\w+)/g, '{$1}');
    paths[address] = { ...paths[address], [contract.method.toLowerCase()]: operationOf(contract) };
  }
  return {
    openapi: '3.1.0',
    info: {
      title: 'Foldwright',
      version: '1',
      description:
        'From a photo of a cardboard mock-up to a released, ordered and paid bracket. Lengths in mm, angles in degrees, money in minor units with an ISO 4217 code.',
    },
    servers: [{ url: '/' }],
    tags: [...new Set(contracts.map(({ tag }) => tag))].map((name) => ({ name })),
    paths,
    components: {
      schemas: { Problem: schemaOf(problemSchema, 'output') },
      securitySchemes: { session: { type: 'apiKey', in: 'cookie', name: SESSION_COOKIE } },
    },
  };
}
