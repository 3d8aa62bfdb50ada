import * as z from 'zod/mini';
import type { BendRow, FlatBend, FlatPattern, FormedSize, Provenance } from '../bending/development';
import type { Segment } from '../geometry/path';
import type { Finding } from '../rules/finding';
import { holePurposeSchema, lengthReferenceSchema, partCommandSchema } from './part-document-schema';

/** Computed points may lie outside the limits of placed ones, so they have a schema of their own. */
const point = z.object({ x: z.number(), y: z.number() });
const point3 = z.object({ x: z.number(), y: z.number(), z: z.number() });

const segment = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('line'), from: point, to: point }),
  z.object({ kind: z.literal('arc'), from: point, to: point, centre: point, clockwise: z.boolean() }),
]) satisfies z.ZodMiniType<Segment>;

export const provenanceSchema = z.object({
  text: z.string(),
  source: z.string(),
  confidence: z.enum(['published', 'common-practice', 'memory', 'measured', 'entered']),
}) satisfies z.ZodMiniType<Provenance>;

export const bendRowSchema = z.object({
  bendId: z.string(),
  name: z.string(),
  bendAngleDeg: z.number(),
  direction: z.enum(['towards', 'away']),
  insideRadiusMm: z.number(),
  kFactor: z.number(),
  kProvenance: provenanceSchema,
  kNote: z.nullable(z.string()),
  bendAllowanceMm: z.number(),
  bendDeductionMm: z.number(),
  deductionReference: lengthReferenceSchema,
  layoutDeductionMm: z.number(),
  vOpeningMm: z.number(),
  bendLengthMm: z.number(),
  forceKn: z.number(),
}) satisfies z.ZodMiniType<BendRow>;

const stretch = z.object({ from: point, to: point });

const flatBendSchema = z.object({
  bendId: z.string(),
  name: z.string(),
  centreLines: z.array(stretch),
  tangentLines: z.array(stretch),
  direction: z.enum(['towards', 'away']),
  bendAngleDeg: z.number(),
  insideRadiusMm: z.number(),
  bendAllowanceMm: z.number(),
  towardsChild: point,
}) satisfies z.ZodMiniType<FlatBend>;

export const flatPatternSchema = z.object({
  outer: z.array(segment),
  cutouts: z.array(z.array(segment)),
  holes: z.array(
    z.object({ featureId: z.string(), centre: point, diameterMm: z.number(), purpose: holePurposeSchema }),
  ),
  slots: z.array(z.object({ featureId: z.string(), from: point, to: point, widthMm: z.number() })),
  bends: z.array(flatBendSchema),
  bounds: z.object({ min: point, max: point }),
  areaMm2: z.number(),
  cutLengthMm: z.number(),
  pierces: z.int(),
  massKg: z.number(),
}) satisfies z.ZodMiniType<FlatPattern>;

export const formedSizeSchema = z.object({
  label: z.string(),
  valueMm: z.number(),
  spreadMm: z.number(),
  mostlyFrom: z.string(),
}) satisfies z.ZodMiniType<FormedSize>;

export const findingSchema = z.object({
  id: z.string(),
  rule: z.enum([
    'flangeTooShort',
    'holeInBendZone',
    'missingRelief',
    'radiusBelowMinimum',
    'holeTooSmall',
    'landTooThin',
    'outlineCrossesItself',
    'cannotBeDeveloped',
    'declaredUse',
    'edgeInBendZone',
    'insideCornerTooSharp',
    'pieceDropsOut',
    'blankOutOfRange',
    'brakeTooSmall',
    'dieOpeningUnusual',
    'etchedText',
    'deliveredRadius',
    'seatCorner',
    'unitsSlip',
    'drawnTwice',
    'tinyEdge',
    'wrongHand',
    'bendOrder',
    'selfInterference',
    'threadTooShort',
    'coatedTooSmall',
    'hardwareNeedsMask',
    'finishNotForMetal',
    'unlikeMetals',
    'washerNotSeated',
    'noRoomForFastener',
    'neighbourFouled',
    'boltsStart',
  ]),
  severity: z.enum(['blocker', 'caution', 'hint']),
  title: z.string(),
  detail: z.string(),
  foundMm: z.nullable(z.number()),
  requiredMm: z.nullable(z.number()),
  why: provenanceSchema,
  ids: z.array(z.string()),
  at: z.nullable(z.object({ layout: point, flat: point })),
  advice: z.string(),
  mend: z.nullable(z.object({ label: z.string(), commands: z.array(partCommandSchema) })),
}) satisfies z.ZodMiniType<Finding>;

/** What the server computed of one draft or revision for one stock. */
export const computedPartSchema = z.object({
  role: z.enum(['trial', 'production']),
  stockLabel: z.string(),
  /** Null when the layout can't be developed; `findings` says why. */
  development: z.nullable(
    z.object({
      flat: flatPatternSchema,
      bendTable: z.array(bendRowSchema),
      formedBox: z.object({ min: point3, max: point3 }),
      formedSizes: z.array(formedSizeSchema),
    }),
  ),
  findings: z.array(findingSchema),
});
export type ComputedPart = z.output<typeof computedPartSchema>;
