import * as z from 'zod/mini';
import type {
  BendDeclaration,
  BendLengths,
  BendOverride,
  CardReading,
  Feature,
  HolePurpose,
  Layout,
  OutlineEdge,
  OutlineLoop,
  ReliefSettings,
} from '../bending/layout';
import type { Point } from '../geometry/point';
import type { Assembly, Mark } from '../part/assembly';
import type { DocumentSlice, PartCommand, SliceChange } from '../part/commands';
import type { Making, PartDocument, SheetStock, Template } from '../part/part-document';

const COORDINATE_LIMIT_MM = 5000;
const coordinate = z.number().check(z.gte(-COORDINATE_LIMIT_MM), z.lte(COORDINATE_LIMIT_MM));
const positiveMm = z.number().check(z.gt(0), z.lte(COORDINATE_LIMIT_MM));
const entityId = z.string().check(z.regex(/^[A-Za-z0-9_-]{1,40}$/));
const shortText = z.string().check(z.minLength(1), z.maxLength(200));

export const pointSchema = z.strictObject({ x: coordinate, y: coordinate }) satisfies z.ZodMiniType<Point>;

export const outlineEdgeSchema = z.strictObject({
  id: entityId,
  start: pointSchema,
  bulge: z.number().check(z.gte(-1000), z.lte(1000)),
}) satisfies z.ZodMiniType<OutlineEdge>;

export const outlineLoopSchema = z.strictObject({
  id: entityId,
  edges: z.array(outlineEdgeSchema).check(z.minLength(2), z.maxLength(4000)),
}) satisfies z.ZodMiniType<OutlineLoop>;

const thread = z.string().check(z.regex(/^M\d{1,2}(\.\d)?$/));
export const holePurposeSchema = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('clearance'), thread, fit: z.enum(['close', 'medium', 'coarse']) }),
  z.strictObject({ kind: z.literal('tapped'), thread }),
  z.strictObject({ kind: z.literal('rivet-nut'), thread }),
  z.strictObject({ kind: z.literal('countersunk'), thread }),
  z.strictObject({ kind: z.literal('pass-through'), diameterMm: positiveMm }),
  z.strictObject({ kind: z.literal('plain'), diameterMm: positiveMm }),
  z.strictObject({ kind: z.literal('lightening'), diameterMm: positiveMm }),
]) satisfies z.ZodMiniType<HolePurpose>;

export const featureSchema = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('hole'), id: entityId, centre: pointSchema, purpose: holePurposeSchema }),
  z.strictObject({ kind: z.literal('slot'), id: entityId, from: pointSchema, to: pointSchema, widthMm: positiveMm }),
]) satisfies z.ZodMiniType<Feature>;

export const lengthReferenceSchema = z.enum([
  'outsideApex',
  'insideApex',
  'outsideTangent',
  'insideTangent',
  'tangent',
]);

export const cardReadingSchema = z.strictObject({
  readOn: z.enum(['faceA', 'faceB', 'crease']),
  bearingFace: z.enum(['A', 'B']),
  hinge: z.discriminatedUnion('kind', [
    z.strictObject({ kind: z.literal('liner'), face: z.enum(['A', 'B']) }),
    z.strictObject({ kind: z.literal('middle') }),
    z.strictObject({ kind: z.literal('depth'), depthMm: z.number().check(z.gte(0), z.lte(50)) }),
  ]),
}) satisfies z.ZodMiniType<CardReading>;

const bendLengthsSchema = z.discriminatedUnion('from', [
  z.strictObject({ from: z.literal('reference'), reference: lengthReferenceSchema }),
  z.strictObject({ from: z.literal('template'), override: z.nullable(cardReadingSchema) }),
]) satisfies z.ZodMiniType<BendLengths>;

const bendOverrideSchema = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('kFactor'), kFactor: z.number().check(z.gt(0), z.lte(0.5)), reason: shortText }),
  z.strictObject({
    kind: z.literal('deduction'),
    deductionMm: coordinate,
    reference: lengthReferenceSchema,
    reason: shortText,
  }),
]) satisfies z.ZodMiniType<BendOverride>;

export const bendDeclarationSchema = z.strictObject({
  id: entityId,
  line: z.strictObject({ from: pointSchema, to: pointSchema }),
  bendAngleDeg: z.number().check(z.gt(0), z.lte(180)),
  direction: z.enum(['towards', 'away']),
  lengths: bendLengthsSchema,
  insideRadiusMm: z.nullable(z.number().check(z.gte(0), z.lte(200))),
  override: z.nullable(bendOverrideSchema),
  sideEdges: z.enum(['trimmed', 'blended']),
}) satisfies z.ZodMiniType<BendDeclaration>;

export const reliefSettingsSchema = z.strictObject({
  mode: z.enum(['automatic', 'none']),
  widthMm: z.nullable(positiveMm),
  depthMm: z.nullable(positiveMm),
  shape: z.enum(['obround', 'rectangular']),
}) satisfies z.ZodMiniType<ReliefSettings>;

export const layoutSchema = z.strictObject({
  outer: outlineLoopSchema,
  cutouts: z.array(outlineLoopSchema).check(z.maxLength(500)),
  features: z.array(featureSchema).check(z.maxLength(500)),
  bends: z.array(bendDeclarationSchema).check(z.maxLength(60)),
  reliefs: reliefSettingsSchema,
  baseAnchor: pointSchema,
}) satisfies z.ZodMiniType<Layout>;

export const sheetStockSchema = z.strictObject({
  materialId: entityId,
  thicknessMm: z.number().check(z.gte(0.3), z.lte(12)),
  grainDirectionDeg: z.nullable(z.number().check(z.gte(-360), z.lte(360))),
  vOpeningMm: z.nullable(z.number().check(z.gt(0), z.lte(400))),
}) satisfies z.ZodMiniType<SheetStock>;

export const templateKindSchema = z.enum(['card', 'single-wall', 'double-wall', 'board', 'mdf', 'sheet-metal']);

export const templateSchema = z.strictObject({
  kind: templateKindSchema,
  thicknessMm: z.number().check(z.gt(0), z.lte(20)),
  reading: cardReadingSchema,
  flangesFold: z.exactOptional(z.enum(['towards', 'away'])),
}) satisfies z.ZodMiniType<Template>;

export const makingSchema = z.strictObject({
  bender: z.enum(['own-brake', 'outside']),
  statement: z.enum(['cut-and-bend-to-our-flat', 'formed-sizes-rule']),
}) satisfies z.ZodMiniType<Making>;

const declaredUsesSchema = z.array(
  z.enum(['vehicle', 'fuel', 'pressure', 'heat', 'vibration', 'lifting-people', 'seat', 'steering', 'brakes']),
);
const scale = z.number().check(z.gte(0.9), z.lte(1.1));
const calibrationSchema = z.strictObject({ scaleX: scale, scaleY: scale });

const point3 = z.strictObject({ x: coordinate, y: coordinate, z: coordinate });
const name = z.string().check(z.minLength(1), z.maxLength(60));
export const assemblySchema = z.strictObject({
  finishId: entityId,
  hardwareSet: z.enum(['before-coating', 'after-coating']),
  seat: z.nullable(
    z.strictObject({
      material: z.enum(['steel', 'stainless', 'aluminium', 'other']),
      isWet: z.boolean(),
      corners: z
        .array(z.strictObject({ bendId: entityId, radiusMm: z.number().check(z.gte(0), z.lte(200)) }))
        .check(z.maxLength(60)),
    }),
  ),
  neighbours: z
    .array(
      z.discriminatedUnion('kind', [
        z.strictObject({ kind: z.literal('box'), id: entityId, name, min: point3, max: point3 }),
        z.strictObject({
          kind: z.literal('cylinder'),
          id: entityId,
          name,
          from: point3,
          to: point3,
          radiusMm: positiveMm,
        }),
      ]),
    )
    .check(z.maxLength(60)),
  bolts: z.nullable(
    z.strictObject({
      featureIds: z.array(entityId).check(z.minLength(1), z.maxLength(60)),
      placeHalfWidthMm: z.number().check(z.gte(0), z.lte(20)),
      wantedChance: z.number().check(z.gt(0), z.lt(1)),
    }),
  ),
}) satisfies z.ZodMiniType<Assembly>;

const marksSchema = z
  .array(
    z.strictObject({
      id: entityId,
      text: z.string().check(z.regex(/^[\x20-\x7e]{1,40}$/)),
      at: pointSchema,
      heightMm: z.number().check(z.gt(0), z.lte(100)),
      turnDeg: z.number().check(z.gte(-360), z.lte(360)),
    }),
  )
  .check(z.maxLength(40)) satisfies z.ZodMiniType<readonly Mark[]>;

export const partDocumentSchema = z.strictObject({
  schemaVersion: z.literal(1),
  stocks: z.strictObject({ trial: sheetStockSchema, production: sheetStockSchema }),
  template: z.nullable(templateSchema),
  calibration: calibrationSchema,
  layout: layoutSchema,
  making: makingSchema,
  declaredUses: declaredUsesSchema,
  assembly: z.exactOptional(assemblySchema),
  marks: z.exactOptional(marksSchema),
}) satisfies z.ZodMiniType<PartDocument>;

export const stockRoleSchema = z.enum(['trial', 'production']);

const listPlace = z.exactOptional(z.int().check(z.gte(0), z.lte(4000)));
const sliceSchema = z.discriminatedUnion('slice', [
  z.strictObject({ slice: z.literal('stock'), role: stockRoleSchema, value: sheetStockSchema }),
  z.strictObject({ slice: z.literal('template'), value: z.nullable(templateSchema) }),
  z.strictObject({ slice: z.literal('calibration'), value: calibrationSchema }),
  z.strictObject({ slice: z.literal('outer'), value: outlineLoopSchema }),
  z.strictObject({
    slice: z.literal('cutout'),
    id: entityId,
    value: z.nullable(outlineLoopSchema),
    index: listPlace,
  }),
  z.strictObject({
    slice: z.literal('feature'),
    id: entityId,
    value: z.nullable(featureSchema),
    index: listPlace,
  }),
  z.strictObject({
    slice: z.literal('bend'),
    id: entityId,
    value: z.nullable(bendDeclarationSchema),
    index: listPlace,
  }),
  z.strictObject({ slice: z.literal('reliefs'), value: reliefSettingsSchema }),
  z.strictObject({ slice: z.literal('baseAnchor'), value: pointSchema }),
  z.strictObject({ slice: z.literal('making'), value: makingSchema }),
  z.strictObject({ slice: z.literal('declaredUses'), value: declaredUsesSchema }),
  z.strictObject({ slice: z.literal('assembly'), value: z.nullable(assemblySchema) }),
  z.strictObject({ slice: z.literal('marks'), value: marksSchema }),
]) satisfies z.ZodMiniType<DocumentSlice>;

const sliceChangeSchema = z.strictObject({
  before: sliceSchema,
  after: sliceSchema,
}) satisfies z.ZodMiniType<SliceChange>;

export const partCommandSchema = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('setStock'), role: stockRoleSchema, stock: sheetStockSchema }),
  z.strictObject({ kind: z.literal('setTemplate'), template: z.nullable(templateSchema) }),
  z.strictObject({ kind: z.literal('setCalibration'), scaleX: scale, scaleY: scale }),
  z.strictObject({
    kind: z.literal('replaceLayout'),
    layout: layoutSchema,
    origin: z.enum(['trace', 'starter', 'import']),
  }),
  z.strictObject({ kind: z.literal('moveVertex'), edgeId: entityId, to: pointSchema }),
  z.strictObject({ kind: z.literal('insertVertex'), edgeId: entityId, newEdge: outlineEdgeSchema }),
  z.strictObject({ kind: z.literal('removeVertex'), edgeId: entityId }),
  z.strictObject({
    kind: z.literal('setEdgeLength'),
    edgeId: entityId,
    lengthMm: positiveMm,
    hold: z.enum(['start', 'end']),
  }),
  z.strictObject({ kind: z.literal('slideEdge'), edgeId: entityId, byMm: coordinate }),
  z.strictObject({
    kind: z.literal('setEdgeBulge'),
    edgeId: entityId,
    bulge: z.number().check(z.gte(-1000), z.lte(1000)),
  }),
  z.strictObject({ kind: z.literal('roundCorner'), edgeId: entityId, radiusMm: positiveMm, newEdgeId: entityId }),
  z.strictObject({ kind: z.literal('addCutout'), loop: outlineLoopSchema }),
  z.strictObject({ kind: z.literal('removeCutout'), loopId: entityId }),
  z.strictObject({ kind: z.literal('addFeature'), feature: featureSchema }),
  z.strictObject({ kind: z.literal('moveFeature'), featureId: entityId, by: pointSchema }),
  z.strictObject({ kind: z.literal('setHolePurpose'), featureId: entityId, purpose: holePurposeSchema }),
  z.strictObject({ kind: z.literal('setSlotSize'), featureId: entityId, lengthMm: positiveMm, widthMm: positiveMm }),
  z.strictObject({ kind: z.literal('removeFeature'), featureId: entityId }),
  z.strictObject({ kind: z.literal('addBend'), bend: bendDeclarationSchema }),
  z.strictObject({ kind: z.literal('changeBend'), bendId: entityId, bend: bendDeclarationSchema }),
  z.strictObject({ kind: z.literal('removeBend'), bendId: entityId }),
  z.strictObject({ kind: z.literal('setReliefs'), reliefs: reliefSettingsSchema }),
  z.strictObject({ kind: z.literal('setBaseAnchor'), to: pointSchema }),
  z.strictObject({ kind: z.literal('setMaking'), making: makingSchema }),
  z.strictObject({ kind: z.literal('setDeclaredUses'), uses: declaredUsesSchema }),
  z.strictObject({ kind: z.literal('setAssembly'), assembly: z.nullable(assemblySchema) }),
  z.strictObject({ kind: z.literal('setMarks'), marks: marksSchema }),
  z.strictObject({
    kind: z.literal('revert'),
    reason: z.enum(['undo', 'redo']),
    of: z.string().check(z.maxLength(200)),
    changes: z.array(sliceChangeSchema).check(z.minLength(1), z.maxLength(2000)),
  }),
]) satisfies z.ZodMiniType<PartCommand>;
