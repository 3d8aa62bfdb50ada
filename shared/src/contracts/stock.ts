import * as z from 'zod/mini';
import { findFinish } from '../stock/finishes';
import { partDocumentSchema } from './part-document-schema';
import { defineRoute } from './route';
import { moneySchema, oneLine, rowId, timestamp } from './scalars';

/** Which machine side a bracket is for; `either` when it is its own mirror image or only one exists. */
export const handSchema = z.enum(['either', 'left', 'right']);
export type Hand = z.output<typeof handSchema>;

/** Id of a finish of `shared/stock/finishes`. */
export const finishId = z.string().check(z.regex(/^[a-z][a-z0-9-]{1,30}$/));
/** The same where somebody chooses one: only a finish that there is. */
export const knownFinishId = finishId.check(z.refine((id) => findFinish(id) !== null));
const count = z.int().check(z.gte(0), z.lte(1_000_000));
export const pieces = z.int().check(z.gte(1), z.lte(100_000));
export const words = z.string().check(z.trim(), z.maxLength(500));

/** A released bracket as stock, kits and sales refer to it. */
export const bracketRefSchema = z.object({
  revisionId: rowId,
  partId: rowId,
  partName: z.string(),
  partNumber: z.string(),
  letter: z.string(),
  hash: z.string(),
  hand: handSchema,
});
export type BracketRef = z.output<typeof bracketRefSchema>;

/** What a revision looks like, once however often it is in the answer. */
export const drawingSchema = z.object({ revisionId: rowId, document: partDocumentSchema });
export type Drawing = z.output<typeof drawingSchema>;

export const hardwareItemSchema = z.object({
  id: rowId,
  name: z.string(),
  /** What a person orders it by, for example a standard and a size. */
  specification: z.string(),
  cost: moneySchema,
  isInUse: z.boolean(),
  revision: z.int(),
});
export type HardwareItem = z.output<typeof hardwareItemSchema>;

/** What lies on the shelf of one thing. `onHand` = `reserved` + `free`. */
const quantitiesSchema = z.object({
  onHand: z.int(),
  reserved: z.int(),
  free: z.int(),
  /** Sold and paid for, not on the shelf, not at the cutting service yet. */
  short: z.int(),
});
export const bracketStockSchema = z.object({
  positionId: rowId,
  bracket: bracketRefSchema,
  finishId,
  ...quantitiesSchema.shape,
});
export type BracketStock = z.output<typeof bracketStockSchema>;
export const hardwareStockSchema = z.object({
  /** Null until the first piece came in. */
  positionId: z.nullable(rowId),
  hardware: hardwareItemSchema,
  ...quantitiesSchema.shape,
});
export type HardwareStock = z.output<typeof hardwareStockSchema>;

/** An order that the cutting service has shipped and that isn't on the shelf yet, all of it. */
export const arrivalSchema = z.object({
  orderId: rowId,
  orderNumber: z.int(),
  bracket: bracketRefSchema,
  /** How many of it are not on the shelf. */
  quantity: z.int(),
});
export type Arrival = z.output<typeof arrivalSchema>;

export const STOCK_MOVES = ['received', 'adjusted', 'reserved', 'released', 'shipped', 'returned'] as const;
export const stockMoveSchema = z.object({
  id: rowId,
  at: timestamp,
  kind: z.enum(STOCK_MOVES),
  /** Change of what is on hand. */
  onHandChange: z.int(),
  /** Change of what is reserved. */
  reservedChange: z.int(),
  onHandAfter: z.int(),
  reason: z.string(),
  by: z.string(),
  saleNumber: z.nullable(z.int()),
  orderNumber: z.nullable(z.int()),
});
export type StockMove = z.output<typeof stockMoveSchema>;

const hardwareInput = z.strictObject({
  name: oneLine(80),
  specification: z.string().check(z.trim(), z.maxLength(120)),
  cost: z.strictObject({ amountMinor: count, currency: moneySchema.shape.currency }),
  isInUse: z.boolean(),
});
export type HardwareInput = z.output<typeof hardwareInput>;

const makers = ['owner', 'fabricator'] as const;
const crew = ['owner', 'fabricator', 'viewer'] as const;

export const listStock = defineRoute({
  id: 'listStock',
  method: 'GET',
  path: '/api/stock',
  tag: 'stock',
  access: crew,
  summary: 'Finished brackets by revision and finish, and hardware',
  answer: 'json',
  response: z.object({
    brackets: z.array(bracketStockSchema),
    hardware: z.array(hardwareStockSchema),
    arrivals: z.array(arrivalSchema),
    drawings: z.array(drawingSchema),
  }),
  successStatus: 200,
});
export const receiveStock = defineRoute({
  id: 'receiveStock',
  method: 'POST',
  path: '/api/stock/receipts',
  tag: 'stock',
  access: makers,
  summary: 'Put what came in on the shelf; sales that wait for it get it, oldest first',
  body: z.strictObject({
    what: z.discriminatedUnion('kind', [
      z.strictObject({ kind: z.literal('bracket'), revisionId: rowId, finishId: knownFinishId }),
      z.strictObject({ kind: z.literal('hardware'), hardwareId: rowId }),
    ]),
    quantity: pieces,
    /** The order to the cutting service that it came from, if any. */
    orderId: z.nullable(rowId),
    reason: words,
  }),
  bodyKind: 'json',
  answer: 'json',
  response: z.object({ positionId: rowId, onHand: z.int(), reserved: z.int() }),
  successStatus: 201,
  idempotent: true,
  problems: ['wrong-state'],
});
export const adjustStock = defineRoute({
  id: 'adjustStock',
  method: 'POST',
  path: '/api/stock/:positionId/adjustments',
  tag: 'stock',
  access: makers,
  summary: 'Correct what lies on the shelf, with a reason; never below what is reserved',
  params: z.strictObject({ positionId: rowId }),
  body: z.strictObject({
    change: z.int().check(
      z.gte(-100_000),
      z.lte(100_000),
      z.refine((change) => change !== 0),
    ),
    reason: oneLine(200),
  }),
  bodyKind: 'json',
  answer: 'json',
  response: z.object({ positionId: rowId, onHand: z.int(), reserved: z.int() }),
  successStatus: 201,
  idempotent: true,
  problems: ['not-enough-stock'],
});
export const listStockMoves = defineRoute({
  id: 'listStockMoves',
  method: 'GET',
  path: '/api/stock/:positionId/moves',
  tag: 'stock',
  access: crew,
  summary: 'Everything that happened to one position, newest first',
  params: z.strictObject({ positionId: rowId }),
  answer: 'json',
  response: z.object({ moves: z.array(stockMoveSchema) }),
  successStatus: 200,
});
export const createHardware = defineRoute({
  id: 'createHardware',
  method: 'POST',
  path: '/api/hardware',
  tag: 'stock',
  access: makers,
  summary: 'Add a hardware item',
  body: hardwareInput,
  bodyKind: 'json',
  answer: 'json',
  response: hardwareItemSchema,
  successStatus: 201,
  idempotent: true,
  problems: ['already-exists'],
});
export const changeHardware = defineRoute({
  id: 'changeHardware',
  method: 'PUT',
  path: '/api/hardware/:hardwareId',
  tag: 'stock',
  access: makers,
  summary: 'Change a hardware item',
  params: z.strictObject({ hardwareId: rowId }),
  body: hardwareInput,
  bodyKind: 'json',
  answer: 'json',
  response: hardwareItemSchema,
  successStatus: 200,
  ifMatch: true,
  problems: ['already-exists', 'stale-row'],
});
/** Released revisions of the workshop, to choose from for stock, kits and listings. */
export const listReleasedBrackets = defineRoute({
  id: 'listReleasedBrackets',
  method: 'GET',
  path: '/api/brackets',
  tag: 'stock',
  access: crew,
  summary: 'Every released revision, newest of each part first',
  answer: 'json',
  response: z.object({ brackets: z.array(bracketRefSchema) }),
  successStatus: 200,
});
export const setPartHand = defineRoute({
  id: 'setPartHand',
  method: 'PUT',
  path: '/api/parts/:partId/hand',
  tag: 'stock',
  access: makers,
  summary: 'Say which hand a part is, and so its mirror image; counts for revisions released from now on',
  params: z.strictObject({ partId: rowId }),
  body: z.strictObject({ hand: handSchema }),
  bodyKind: 'json',
  answer: 'json',
  response: z.object({ partId: rowId, hand: handSchema, otherHandPartId: z.nullable(rowId) }),
  successStatus: 200,
  problems: ['wrong-state'],
});
export const makeOtherHand = defineRoute({
  id: 'makeOtherHand',
  method: 'POST',
  path: '/api/parts/:partId/other-hand',
  tag: 'stock',
  access: makers,
  summary: 'Make the mirror image of a part’s latest state as a part with a number of its own',
  params: z.strictObject({ partId: rowId }),
  body: z.strictObject({ name: oneLine(80) }),
  bodyKind: 'json',
  answer: 'json',
  response: z.object({ partId: rowId, draftId: rowId, number: z.string(), hand: handSchema }),
  successStatus: 201,
  idempotent: true,
  problems: ['already-exists', 'wrong-state'],
});
