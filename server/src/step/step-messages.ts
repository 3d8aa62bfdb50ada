import type { SolidPlan } from '@foldwright/shared/solid/solid-plan';
import * as z from 'zod/mini';
import type { SolidMeasures } from './measure-solid';

/** What the process that makes solids is asked. */
export interface StepRequest {
  readonly solids: readonly { readonly name: string; readonly plan: SolidPlan }[];
  /** Moment to state in the files, ISO 8601. */
  readonly stamp: string;
}

/** What it answers for each solid, in order. */
export type StepAnswer =
  | { readonly ok: true; readonly step: string; readonly measures: SolidMeasures; readonly builtInMs: number }
  | { readonly ok: false; readonly reason: string };

const point = z.object({ x: z.number(), y: z.number() });
const point3 = z.object({ x: z.number(), y: z.number(), z: z.number() });
const segment = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('line'), from: point, to: point }),
  z.object({ kind: z.literal('arc'), from: point, to: point, centre: point, clockwise: z.boolean() }),
]);
const loops = z.array(z.array(z.object({ segment, isSeam: z.boolean() })));
const planSchema = z.object({
  thicknessMm: z.number(),
  pieces: z.array(
    z.discriminatedUnion('kind', [
      z.object({
        kind: z.literal('slab'),
        pose: z.object({ origin: point3, ux: point3, uy: point3, uz: point3 }),
        loops,
      }),
      z.object({
        kind: z.literal('bend'),
        bendId: z.string(),
        centre: point3,
        axis: point3,
        start: point3,
        turned: point3,
        insideRadiusMm: z.number(),
        loops,
        radPerMm: z.number(),
      }),
    ]),
  ),
}) satisfies z.ZodMiniType<SolidPlan>;
const requestSchema = z.object({
  solids: z.array(z.object({ name: z.string(), plan: planSchema })),
  stamp: z.string(),
}) satisfies z.ZodMiniType<StepRequest>;

const three = z.tuple([z.number(), z.number(), z.number()]);
const answersSchema = z.array(
  z.discriminatedUnion('ok', [
    z.object({
      ok: z.literal(true),
      step: z.string(),
      measures: z.object({
        volumeMm3: z.number(),
        surfaceMm2: z.number(),
        box: z.object({ min: three, max: three }),
      }),
      builtInMs: z.number(),
    }),
    z.object({ ok: z.literal(false), reason: z.string() }),
  ]),
) satisfies z.ZodMiniType<readonly StepAnswer[]>;

/** @throws Error for text that is no request */
export function readStepRequest(text: string): StepRequest {
  return z.parse(requestSchema, JSON.parse(text));
}

/** @throws Error for text that is no answer */
export function readStepAnswers(text: string): readonly StepAnswer[] {
  return z.parse(answersSchema, JSON.parse(text));
}
