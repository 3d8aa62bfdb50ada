import * as z from 'zod/mini';
import { defineRoute } from './route';
import { moneySchema, oneLine, rowId } from './scalars';
import {
  bracketRefSchema,
  drawingSchema,
  finishId,
  handSchema,
  hardwareItemSchema,
  knownFinishId,
  pieces,
  words,
} from './stock';

/** What a price of ours rests on. */
export const costSchema = z.object({
  each: z.nullable(moneySchema),
  /** Where the figure comes from, in words; or why there is none. */
  source: z.string(),
});

/** What something is sold for by itself, without tax. */
const sellingSchema = z.object({
  /** Price of its published listing; null without one. */
  price: z.nullable(moneySchema),
  /** What the price leaves of what it costs; null while one of them is unknown or they are in different currencies. */
  margin: z.nullable(moneySchema),
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
  ...sellingSchema.shape,
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
    finishId: z.nullable(knownFinishId),
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

/** What one part costs and earns, money without tax. */
export const earningSchema = z.object({
  partId: rowId,
  partName: z.string(),
  partNumber: z.string(),
  hand: handSchema,
  cost: costSchema,
  hardware: z.array(z.object({ hardware: hardwareItemSchema, quantity: z.int() })),
  /** Null when it is in several currencies. */
  hardwareCost: z.nullable(moneySchema),
  ...sellingSchema.shape,
  sold: z.int(),
  /** What customers paid for it alone (kits are told apart), less what went back. */
  earned: moneySchema,
});
export type Earning = z.output<typeof earningSchema>;

const makers = ['owner', 'fabricator'] as const;
const crew = ['owner', 'fabricator', 'viewer'] as const;

export const listKits = defineRoute({
  id: 'listKits',
  method: 'GET',
  path: '/api/kits',
  tag: 'stock',
  access: crew,
  summary: 'Kits with their bills of materials, what can be built and what is short',
  answer: 'json',
  response: z.object({ kits: z.array(kitSchema), drawings: z.array(drawingSchema) }),
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
