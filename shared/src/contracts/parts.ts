import * as z from 'zod/mini';
import { computedPartSchema } from './development-schema';
import { partCommandSchema, partDocumentSchema, stockRoleSchema } from './part-document-schema';
import { photoSchema } from './photos';
import { revisionSummarySchema } from './revisions';
import { defineRoute } from './route';
import { oneLine, pdfPaper, rowId, timestamp } from './scalars';
import { handSchema } from './stock';

/** Steps of a part, in order; the furthest one reached is stored with the draft's state. */
export const PART_STEPS = ['mock-up', 'outline', 'bends', 'checks', 'full-size-print', 'release'] as const;

const positiveMm = z.number().check(z.gt(0), z.lte(3000));

/** Typed dimensions to start from, to the outside faces. */
export const starterSchema = z.discriminatedUnion('shape', [
  z.strictObject({ shape: z.literal('flat-plate'), widthMm: positiveMm, heightMm: positiveMm }),
  z.strictObject({
    shape: z.literal('l-bracket'),
    baseMm: positiveMm,
    flangeMm: positiveMm,
    widthMm: positiveMm,
    bendAngleDeg: z.number().check(z.gte(5), z.lte(165)),
  }),
  z.strictObject({
    shape: z.literal('u-bracket'),
    baseMm: positiveMm,
    leftFlangeMm: positiveMm,
    rightFlangeMm: positiveMm,
    widthMm: positiveMm,
    bendAngleDeg: z.number().check(z.gte(5), z.lte(165)),
  }),
  z.strictObject({
    shape: z.literal('z-bracket'),
    webMm: positiveMm,
    lowerFlangeMm: positiveMm,
    upperFlangeMm: positiveMm,
    widthMm: positiveMm,
  }),
  z.strictObject({
    shape: z.literal('hat-section'),
    topMm: positiveMm,
    sideMm: positiveMm,
    brimMm: positiveMm,
    widthMm: positiveMm,
  }),
  z.strictObject({ shape: z.literal('tray'), lengthMm: positiveMm, widthMm: positiveMm, flangeMm: positiveMm }),
  z.strictObject({
    shape: z.literal('gusseted-l'),
    baseMm: positiveMm,
    flangeMm: positiveMm,
    widthMm: positiveMm,
    gussetMm: positiveMm,
  }),
]);
export type Starter = z.output<typeof starterSchema>;

export const draftSummarySchema = z.object({
  id: rowId,
  /** Letter the draft becomes when released. */
  letter: z.string(),
  revision: z.int(),
  furthestStep: z.enum(PART_STEPS),
  updatedAt: timestamp,
  updatedBy: z.string(),
  blockers: z.int(),
  cautions: z.int(),
  hints: z.int(),
});

export const partSummarySchema = z.object({
  id: rowId,
  number: z.string(),
  name: z.string(),
  revision: z.int(),
  draft: z.nullable(draftSummarySchema),
  latestRevision: z.nullable(revisionSummarySchema),
  /** What the list draws the part from: the draft's document if there is one, else the latest revision's. Null before a mock-up is accepted. */
  document: z.nullable(partDocumentSchema),
  /** What it is made of today: decides how it is drawn. */
  state: z.enum(['card', 'blued', 'trial-steel', 'alloy']),
  openQuestion: z.nullable(z.string()),
  updatedAt: timestamp,
});
export type PartSummary = z.output<typeof partSummarySchema>;

export const partDetailSchema = z.object({
  id: rowId,
  number: z.string(),
  name: z.string(),
  revision: z.int(),
  draft: z.nullable(draftSummarySchema),
  revisions: z.array(revisionSummarySchema),
  photos: z.array(photoSchema),
  hand: handSchema,
  /** The part that is its mirror image, if there is one. */
  otherHandPartId: z.nullable(rowId),
  canEdit: z.boolean(),
});
export type PartDetail = z.output<typeof partDetailSchema>;

export const draftSchema = z.object({
  id: rowId,
  partId: rowId,
  letter: z.string(),
  revision: z.int(),
  document: partDocumentSchema,
  furthestStep: z.enum(PART_STEPS),
  updatedAt: timestamp,
  updatedBy: z.string(),
});
export type Draft = z.output<typeof draftSchema>;

/** One accepted batch of commands, as the history and the audit trail show it. */
export const commandLogEntrySchema = z.object({
  revision: z.int(),
  commands: z.array(partCommandSchema),
  by: z.string(),
  /** The browser tab that sent it, so that a tab knows its own echo. */
  clientId: z.string(),
  at: timestamp,
});

const partIdParams = z.strictObject({ partId: rowId });
const draftIdParams = z.strictObject({ draftId: rowId });
const everyMember = ['owner', 'fabricator', 'viewer'] as const;
const makers = ['owner', 'fabricator'] as const;

export const listParts = defineRoute({
  id: 'listParts',
  method: 'GET',
  path: '/api/parts',
  tag: 'parts',
  access: everyMember,
  summary: 'The parts of the workshop',
  query: z.strictObject({ search: z.optional(z.string().check(z.maxLength(100))) }),
  answer: 'json',
  response: z.object({ parts: z.array(partSummarySchema) }),
  successStatus: 200,
});
export const createPart = defineRoute({
  id: 'createPart',
  method: 'POST',
  path: '/api/parts',
  tag: 'parts',
  access: makers,
  summary: 'Start a part, empty for a mock-up or from typed dimensions',
  body: z.strictObject({ name: oneLine(80), number: z.optional(oneLine(24)), starter: z.nullable(starterSchema) }),
  bodyKind: 'json',
  answer: 'json',
  response: partDetailSchema,
  successStatus: 201,
  idempotent: true,
  problems: ['already-exists'],
});
export const readPart = defineRoute({
  id: 'readPart',
  method: 'GET',
  path: '/api/parts/:partId',
  tag: 'parts',
  access: everyMember,
  summary: 'One part with its draft, revisions and photos',
  params: partIdParams,
  answer: 'json',
  response: partDetailSchema,
  successStatus: 200,
});
export const renamePart = defineRoute({
  id: 'renamePart',
  method: 'PATCH',
  path: '/api/parts/:partId',
  tag: 'parts',
  access: makers,
  summary: 'Change name or number',
  params: partIdParams,
  body: z.strictObject({ name: oneLine(80), number: oneLine(24) }),
  bodyKind: 'json',
  answer: 'json',
  response: partDetailSchema,
  successStatus: 200,
  ifMatch: true,
  problems: ['already-exists', 'stale-row'],
});
export const startDraft = defineRoute({
  id: 'startDraft',
  method: 'POST',
  path: '/api/parts/:partId/draft',
  tag: 'drafts',
  access: makers,
  summary: 'Start the next draft from the latest revision',
  params: partIdParams,
  answer: 'json',
  response: draftSchema,
  successStatus: 201,
  problems: ['wrong-state'],
});
export const readDraft = defineRoute({
  id: 'readDraft',
  method: 'GET',
  path: '/api/drafts/:draftId',
  tag: 'drafts',
  access: everyMember,
  summary: 'The draft’s document',
  params: draftIdParams,
  answer: 'json',
  response: draftSchema,
  successStatus: 200,
});
export const sendCommands = defineRoute({
  id: 'sendCommands',
  method: 'POST',
  path: '/api/drafts/:draftId/commands',
  tag: 'drafts',
  access: makers,
  summary: 'Change the draft by commands based on a known revision',
  params: draftIdParams,
  body: z.strictObject({
    baseRevision: z.int().check(z.gte(0)),
    /** Made by the browser per batch: a batch that arrives twice counts once. */
    batchId: rowId,
    clientId: z.string().check(z.minLength(1), z.maxLength(60)),
    commands: z.array(partCommandSchema).check(z.minLength(1), z.maxLength(200)),
    reachedStep: z.optional(z.enum(PART_STEPS)),
  }),
  bodyKind: 'json',
  answer: 'json',
  response: draftSchema,
  successStatus: 200,
  problems: ['draft-moved-on', 'command-refused', 'wrong-state'],
});
/** Member `extra` of a `draft-moved-on` problem: what the draft is now and what came in between. */
export const draftMovedOnExtraSchema = z.object({ draft: draftSchema, since: z.array(commandLogEntrySchema) });

export const readDraftHistory = defineRoute({
  id: 'readDraftHistory',
  method: 'GET',
  path: '/api/drafts/:draftId/history',
  tag: 'drafts',
  access: everyMember,
  summary: 'What was changed, by whom, newest first',
  params: draftIdParams,
  query: z.strictObject({ sinceRevision: z.optional(z.coerce.number().check(z.gte(0))) }),
  answer: 'json',
  response: z.object({ entries: z.array(commandLogEntrySchema) }),
  successStatus: 200,
});
export const computeDraft = defineRoute({
  id: 'computeDraft',
  method: 'GET',
  path: '/api/drafts/:draftId/computed',
  tag: 'drafts',
  access: everyMember,
  summary: 'Flat pattern, bend table, formed sizes and findings, computed by the server for one stock',
  params: draftIdParams,
  query: z.strictObject({ stock: stockRoleSchema }),
  answer: 'json',
  response: z.object({ revision: z.int(), computed: computedPartSchema }),
  successStatus: 200,
});
export const printDraft = defineRoute({
  id: 'printDraft',
  method: 'GET',
  path: '/api/drafts/:draftId/full-size-print',
  tag: 'drafts',
  access: everyMember,
  summary: 'Full-size print of the draft’s flat pattern, tiled',
  params: draftIdParams,
  query: z.strictObject({ paper: pdfPaper, stock: stockRoleSchema }),
  answer: 'file',
  successStatus: 200,
  problems: ['cannot-be-developed'],
});
export const releaseDraft = defineRoute({
  id: 'releaseDraft',
  method: 'POST',
  path: '/api/drafts/:draftId/release',
  tag: 'drafts',
  access: makers,
  summary: 'Freeze the draft as a revision',
  params: draftIdParams,
  body: z.strictObject({
    baseRevision: z.int().check(z.gte(0)),
    note: z.string().check(z.maxLength(500)),
    acceptedCautionIds: z.array(z.string()).check(z.maxLength(200)),
  }),
  bodyKind: 'json',
  answer: 'json',
  response: revisionSummarySchema,
  successStatus: 201,
  idempotent: true,
  problems: ['draft-moved-on', 'has-blockers', 'cannot-be-developed', 'wrong-state'],
});
