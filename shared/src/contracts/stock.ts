import * as z from 'zod/mini';
import { defineRoute } from './route';
import { moneySchema, oneLine, rowId, timestamp } from './scalars';

/** Which machine side a bracket is for; `either` when it is its own mirror image or only one exists. */
export const handSchema = z.enum(['either', 'left', 'right']);
export type Hand = z.output<typeof handSchema>;

/** Id of a finish of `shared/stock/finishes`. */
export const finishId = z.string().check(z.regex(/^[a-z][a-z0-9-]{1,30}$/));
const count = z.int().check(z.gte(0), z.lte(1_000_000));
const pieces = z.int().check(z.gte(1), z.lte(100_000));
const words = z.string().check(z.trim(), z.maxLength(500));

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

/** What a price of ours rests on. */
export const costSchema = z.object({
  each: z.nullable(moneySchema),
  /** Where the figure comes from, in words; or why there is none. */
  source: z.string(),
});

export const kitLineSchema = z.discriminatedUnion('kind', [
  z.object({
    kind: z.literal('bracket'),
    bracket: bracketRefSchema,
    /** Null when the customer chooses the finish of the kit. */
    finishId: z.nullable(finishId),
    quantity: z.int(),
  }),
  z.object({ kind: z.literal('hardware'), hardware: hardwareItemSchema, quantity: z.int() }),
]);
export type KitLine = z.output<typeof kitLineSchema>;

export const kitSchema = z.object({
  id: rowId,
  number: z.string(),
  name: z.string(),
  note: z.string(),
  lines: z.array(kitLineSchema),
  cost: costSchema,
  /** For each finish somebody could choose (`bare` when nothing is left to choose): how many can be built now. */
  buildable: z.array(
    z.object({
      finishId,
      kits: z.int(),
      /** What keeps it from one kit more. */
      shortest: z.array(z.object({ what: z.string(), missing: z.int() })),
    }),
  ),
  revision: z.int(),
});
export type Kit = z.output<typeof kitSchema>;

const kitLineInput = z.discriminatedUnion('kind', [
  z.strictObject({
    kind: z.literal('bracket'),
    revisionId: rowId,
    finishId: z.nullable(finishId),
    quantity: pieces,
  }),
  z.strictObject({ kind: z.literal('hardware'), hardwareId: rowId, quantity: pieces }),
]);
const kitInput = z.strictObject({
  name: oneLine(80),
  note: words,
  lines: z.array(kitLineInput).check(z.minLength(1), z.maxLength(60)),
});
export type KitInput = z.output<typeof kitInput>;

const hardwareInput = z.strictObject({
  name: oneLine(80),
  specification: z.string().check(z.trim(), z.maxLength(120)),
  cost: z.strictObject({ amountMinor: count, currency: moneySchema.shape.currency }),
  isInUse: z.boolean(),
});
export type HardwareInput = z.output<typeof hardwareInput>;

/** What one part costs and earns, money without tax. */
export const earningSchema = z.object({
  partId: rowId,
  partName: z.string(),
  partNumber: z.string(),
  hand: handSchema,
  cost: costSchema,
  hardware: z.array(z.object({ hardware: hardwareItemSchema, quantity: z.int() })),
  hardwareCost: moneySchema,
  /** Price of the published listing of this part alone; null without one. */
  price: z.nullable(moneySchema),
  /** Price less cost and hardware; null while one of them is unknown. */
  margin: z.nullable(moneySchema),
  sold: z.int(),
  /** What customers paid for it alone (kits are told apart), less what went back. */
  earned: moneySchema,
});
export type Earning = z.output<typeof earningSchema>;

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
  response: z.object({ brackets: z.array(bracketStockSchema), hardware: z.array(hardwareStockSchema) }),
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
      z.strictObject({ kind: z.literal('bracket'), revisionId: rowId, finishId }),
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
export const listKits = defineRoute({
  id: 'listKits',
  method: 'GET',
  path: '/api/kits',
  tag: 'stock',
  access: crew,
  summary: 'Kits with their bills of materials, what can be built and what is short',
  answer: 'json',
  response: z.object({ kits: z.array(kitSchema) }),
  successStatus: 200,
});
export const createKit = defineRoute({
  id: 'createKit',
  method: 'POST',
  path: '/api/kits',
  tag: 'stock',
  access: makers,
  summary: 'Make a kit',
  body: kitInput,
  bodyKind: 'json',
  answer: 'json',
  response: kitSchema,
  successStatus: 201,
  idempotent: true,
});
export const changeKit = defineRoute({
  id: 'changeKit',
  method: 'PUT',
  path: '/api/kits/:kitId',
  tag: 'stock',
  access: makers,
  summary: 'Change a kit and its bill of materials; what was sold before stays as it was',
  params: z.strictObject({ kitId: rowId }),
  body: kitInput,
  bodyKind: 'json',
  answer: 'json',
  response: kitSchema,
  successStatus: 200,
  ifMatch: true,
  problems: ['stale-row'],
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
export const listEarnings = defineRoute({
  id: 'listEarnings',
  method: 'GET',
  path: '/api/earnings',
  tag: 'stock',
  access: ['owner'],
  summary: 'What each part costs (quote and hardware) and what it earns',
  answer: 'json',
  response: z.object({ earnings: z.array(earningSchema) }),
  successStatus: 200,
});
export const setPartHardware = defineRoute({
  id: 'setPartHardware',
  method: 'PUT',
  path: '/api/parts/:partId/hardware',
  tag: 'stock',
  access: makers,
  summary: 'Hardware that goes with one bracket of this part when it is sold alone',
  params: z.strictObject({ partId: rowId }),
  body: z.strictObject({
    hardware: z.array(z.strictObject({ hardwareId: rowId, quantity: pieces })).check(z.maxLength(40)),
  }),
  bodyKind: 'json',
  answer: 'json',
  response: z.object({ hardware: earningSchema.shape.hardware }),
  successStatus: 200,
});
export const setPartHand = defineRoute({
  id: 'setPartHand',
  method: 'PUT',
  path: '/api/parts/:partId/hand',
  tag: 'stock',
  access: makers,
  summary: 'Say which hand a part is; counts for revisions released from now on',
  params: z.strictObject({ partId: rowId }),
  body: z.strictObject({ hand: handSchema }),
  bodyKind: 'json',
  answer: 'json',
  response: z.object({ partId: rowId, hand: handSchema, otherHandPartId: z.nullable(rowId) }),
  successStatus: 200,
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
