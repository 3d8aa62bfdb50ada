import * as z from 'zod/mini';
import type { Trace, TracePrimitive } from '../fitting/trace';
import { TRACE_STAGES } from '../fitting/trace';
import { templateKindSchema } from './part-document-schema';
import { defineRoute } from './route';
import { rowId, timestamp } from './scalars';

const tracePoint = z.readonly(z.tuple([z.number(), z.number()]));
const tracePrimitive = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('line'), from: tracePoint, to: tracePoint }),
  z.object({ kind: z.literal('arc'), from: tracePoint, to: tracePoint, centre: tracePoint, clockwise: z.boolean() }),
]) satisfies z.ZodMiniType<TracePrimitive>;

export const traceSchema = z.object({
  units: z.literal('mm'),
  frame: z.literal('scale-sheet'),
  outer: z.array(tracePrimitive),
  cutouts: z.array(z.array(tracePrimitive)),
  holes: z.array(z.object({ centre: tracePoint, diameterMm: z.number() })),
  slots: z.array(z.object({ from: tracePoint, to: tracePoint, widthMm: z.number() })),
  uncertaintyMm: z.number(),
  method: z.enum(['markers', 'scan', 'rectangle', 'two-points']),
  pixelsPerMm: z.number(),
  markersUsed: z.int(),
  tiltDeg: z.number(),
  bands: z.array(z.object({ primitiveIndex: z.int(), halfWidthMm: z.number(), residualMm: z.number() })),
  mostlyFrom: z.string(),
  warnings: z.array(z.string()),
  timingsMs: z.record(z.string(), z.number()),
}) satisfies z.ZodMiniType<Trace>;

export const jobSchema = z.object({
  id: rowId,
  kind: z.enum(['trace']),
  state: z.enum(['waiting', 'running', 'done', 'failed', 'stopped']),
  /** Stages in order with what was found in each so far ("20 of 22 markers"). */
  stages: z.array(
    z.object({ stage: z.enum(TRACE_STAGES), state: z.enum(['to-come', 'running', 'done']), note: z.string() }),
  ),
  /** Words for the person when it failed: what happened, what was kept, what to do. */
  failure: z.nullable(z.object({ code: z.string(), detail: z.string(), kept: z.string(), next: z.string() })),
  attempt: z.int(),
  updatedAt: timestamp,
});
export type Job = z.output<typeof jobSchema>;

export const photoSchema = z.object({
  id: rowId,
  partId: rowId,
  fileName: z.string(),
  templateKind: templateKindSchema,
  templateThicknessMm: z.number(),
  widthPx: z.nullable(z.int()),
  heightPx: z.nullable(z.int()),
  uploadedAt: timestamp,
  uploadedBy: z.string(),
  job: z.nullable(jobSchema),
  trace: z.nullable(traceSchema),
  /** Rectified photo in the scale sheet's frame; null until read. */
  rectified: z.nullable(z.object({ pixelsPerMm: z.number(), widthMm: z.number(), heightMm: z.number() })),
});
export type Photo = z.output<typeof photoSchema>;

const makers = ['owner', 'fabricator'] as const;
const everyMember = ['owner', 'fabricator', 'viewer'] as const;
const photoIdParams = z.strictObject({ photoId: rowId });
const jobIdParams = z.strictObject({ jobId: rowId });

/** Facts a photo can't tell about the template; sent with the file as form fields, hence the coercion. */
export const photoFactsSchema = z.strictObject({
  templateKind: templateKindSchema,
  templateThicknessMm: z.coerce.number().check(z.gt(0), z.lte(20)),
  /** What a person measured on the printed 100 mm rulers; 100 when they agree. */
  rulerXMm: z.coerce.number().check(z.gte(90), z.lte(110)),
  rulerYMm: z.coerce.number().check(z.gte(90), z.lte(110)),
});

export const uploadPhoto = defineRoute({
  id: 'uploadPhoto',
  method: 'POST',
  path: '/api/parts/:partId/photos',
  tag: 'photos',
  access: makers,
  summary: 'Upload a photo of the template and start reading it (multipart, file in `file`)',
  params: z.strictObject({ partId: rowId }),
  body: photoFactsSchema,
  bodyKind: 'upload',
  answer: 'json',
  response: photoSchema,
  successStatus: 202,
  problems: ['file-too-large', 'file-type-not-taken', 'wrong-state'],
});
export const readPhoto = defineRoute({
  id: 'readPhoto',
  method: 'GET',
  path: '/api/photos/:photoId',
  tag: 'photos',
  access: everyMember,
  summary: 'A photo with the state of its reading and its trace',
  params: photoIdParams,
  answer: 'json',
  response: photoSchema,
  successStatus: 200,
});
export const readPhotoImage = defineRoute({
  id: 'readPhotoImage',
  method: 'GET',
  path: '/api/photos/:photoId/image',
  tag: 'photos',
  access: everyMember,
  summary: 'The picture: as taken (upright, stripped of its metadata) or rectified',
  params: photoIdParams,
  query: z.strictObject({ view: z.enum(['as-taken', 'rectified']) }),
  answer: 'file',
  successStatus: 200,
});
export const rereadPhoto = defineRoute({
  id: 'rereadPhoto',
  method: 'POST',
  path: '/api/photos/:photoId/reading',
  tag: 'photos',
  access: makers,
  summary: 'Read the photo again with other facts about the template',
  params: photoIdParams,
  body: z.strictObject({ templateKind: templateKindSchema, templateThicknessMm: z.number().check(z.gt(0), z.lte(20)) }),
  bodyKind: 'json',
  answer: 'json',
  response: photoSchema,
  successStatus: 202,
  problems: ['wrong-state'],
});
export const readJob = defineRoute({
  id: 'readJob',
  method: 'GET',
  path: '/api/jobs/:jobId',
  tag: 'jobs',
  access: everyMember,
  summary: 'State and stages of a job',
  params: jobIdParams,
  answer: 'json',
  response: jobSchema,
  successStatus: 200,
});
export const stopJob = defineRoute({
  id: 'stopJob',
  method: 'DELETE',
  path: '/api/jobs/:jobId',
  tag: 'jobs',
  access: makers,
  summary: 'Stop a job',
  params: jobIdParams,
  answer: 'json',
  response: jobSchema,
  successStatus: 200,
  problems: ['wrong-state'],
});
export const retryJob = defineRoute({
  id: 'retryJob',
  method: 'POST',
  path: '/api/jobs/:jobId/retry',
  tag: 'jobs',
  access: makers,
  summary: 'Run a failed or stopped job again',
  params: jobIdParams,
  answer: 'json',
  response: jobSchema,
  successStatus: 202,
  problems: ['wrong-state'],
});
export const readScaleSheet = defineRoute({
  id: 'readScaleSheet',
  method: 'GET',
  path: '/api/scale-sheet',
  tag: 'photos',
  access: 'public',
  summary: 'The scale sheet to print',
  query: z.strictObject({ paper: z.enum(['A4', 'Letter']), variant: z.enum(['light', 'dark']) }),
  answer: 'file',
  successStatus: 200,
});
