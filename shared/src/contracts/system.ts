import * as z from 'zod/mini';
import { defineRoute } from './route';

export const healthSchema = z.object({
  ok: z.boolean(),
  checks: z.array(
    z.object({ name: z.enum(['database', 'queue', 'worker', 'disk']), ok: z.boolean(), detail: z.string() }),
  ),
});

/** What the live stream carries; ids let a page fetch what changed. `seq` is the `Last-Event-ID`. */
export const liveEventSchema = z.discriminatedUnion('kind', [
  z.object({
    kind: z.literal('draft-changed'),
    seq: z.int(),
    draftId: z.uuid(),
    partId: z.uuid(),
    revision: z.int(),
    clientId: z.string(),
    by: z.string(),
  }),
  z.object({ kind: z.literal('part-changed'), seq: z.int(), partId: z.uuid() }),
  z.object({
    kind: z.literal('job-changed'),
    seq: z.int(),
    jobId: z.uuid(),
    photoId: z.nullable(z.uuid()),
    partId: z.nullable(z.uuid()),
  }),
  z.object({ kind: z.literal('order-changed'), seq: z.int(), orderId: z.uuid() }),
  z.object({ kind: z.literal('stock-changed'), seq: z.int(), positionId: z.uuid() }),
  z.object({ kind: z.literal('sale-changed'), seq: z.int(), saleId: z.uuid() }),
  z.object({ kind: z.literal('question-changed'), seq: z.int(), questionId: z.uuid() }),
  z.object({ kind: z.literal('mail-changed'), seq: z.int(), mailId: z.uuid() }),
  z.object({ kind: z.literal('members-changed'), seq: z.int() }),
]);
export type LiveEvent = z.output<typeof liveEventSchema>;

export const readHealth = defineRoute({
  id: 'readHealth',
  method: 'GET',
  path: '/api/health',
  tag: 'system',
  access: 'public',
  summary: 'Whether database, queue, worker and disk answer (200 or 503)',
  answer: 'json',
  response: healthSchema,
  successStatus: 200,
});
export const readOpenApi = defineRoute({
  id: 'readOpenApi',
  method: 'GET',
  path: '/api/openapi.json',
  tag: 'system',
  access: 'public',
  summary: 'This description',
  answer: 'json',
  response: z.record(z.string(), z.unknown()),
  successStatus: 200,
});
export const streamEvents = defineRoute({
  id: 'streamEvents',
  method: 'GET',
  path: '/api/events',
  tag: 'system',
  access: 'signed-in',
  summary: 'Live events of the current workshop (server-sent, resumable by Last-Event-ID)',
  answer: 'stream',
  successStatus: 200,
});
