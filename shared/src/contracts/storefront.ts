import * as z from 'zod/mini';
import { partDocumentSchema } from './part-document-schema';
import { defineRoute } from './route';
import { currency, moneySchema, oneLine, rowId } from './scalars';
import { paragraph, slug } from './shop';
import { bracketRefSchema, finishId } from './stock';

const shopSlug = z.strictObject({ shop: slug });

/** Whether it can go out from the shelf, or has to be cut first. */
export const availabilitySchema = z.object({
  finishId,
  /** How many could be sent from the shelf now. */
  onShelf: z.int(),
  /** Days until one leaves the workshop, by what is on the shelf. */
  leavesInDays: z.int(),
});

export const shopCardSchema = z.object({
  slug,
  kind: z.enum(['bracket', 'kit']),
  title: z.string(),
  summary: z.string(),
  from: moneySchema,
  /** What to draw: the brackets in it, formed, in the finish named first. */
  pieces: z.array(z.object({ document: partDocumentSchema, finishId })),
  photoId: z.nullable(rowId),
  isOnShelf: z.boolean(),
});
export type ShopCard = z.output<typeof shopCardSchema>;

export const shopFrontSchema = z.object({
  slug,
  name: z.string(),
  headline: z.string(),
  about: z.string(),
  currency,
  taxName: z.string(),
  taxBasisPoints: z.int(),
  postage: moneySchema,
});
export type ShopFront = z.output<typeof shopFrontSchema>;

/** One thing in what is sold: the very revision of a bracket, or hardware. */
export const shopPieceSchema = z.discriminatedUnion('kind', [
  z.object({
    kind: z.literal('bracket'),
    name: z.string(),
    number: z.string(),
    letter: z.string(),
    hash: z.string(),
    hand: bracketRefSchema.shape.hand,
    quantity: z.int(),
    /** Null when the customer chooses. */
    finishId: z.nullable(finishId),
    document: partDocumentSchema,
    materialLabel: z.string(),
    /** Outside size of the formed bracket, mm. */
    sizeMm: z.object({ x: z.number(), y: z.number(), z: z.number() }),
  }),
  z.object({ kind: z.literal('hardware'), name: z.string(), specification: z.string(), quantity: z.int() }),
]);

export const shopListingSchema = z.object({
  id: rowId,
  slug,
  kind: z.enum(['bracket', 'kit']),
  title: z.string(),
  summary: z.string(),
  fits: z.array(z.string()),
  doesNotFit: z.array(z.string()),
  price: moneySchema,
  finishes: z.array(z.object({ finishId, surchargeMinor: z.int() })),
  availability: z.array(availabilitySchema),
  pieces: z.array(shopPieceSchema),
  photos: z.array(z.object({ id: rowId, description: z.string() })),
  cautions: z.array(z.string()),
});
export type ShopListing = z.output<typeof shopListingSchema>;

export const cartLineSchema = z.strictObject({
  listingId: rowId,
  finishId,
  quantity: z.int().check(z.gte(1), z.lte(500)),
});
export type CartLine = z.output<typeof cartLineSchema>;
const cartInput = z.array(cartLineSchema).check(z.minLength(1), z.maxLength(40));

/** A cart as the shop prices it now. Amounts include tax; `tax` says how much of them it is. */
export const offerSchema = z.object({
  lines: z.array(
    z.object({
      listingId: rowId,
      slug,
      title: z.string(),
      finishId,
      quantity: z.int(),
      each: moneySchema,
      total: moneySchema,
      tax: moneySchema,
      /** How many of them come from the shelf; the rest is cut first. */
      fromShelf: z.int(),
      leavesInDays: z.int(),
      /** What is in one of it, a piece a line, with the very revision: "1 × Pump tray, revision D, left hand, moss". */
      contents: z.array(z.string()),
    }),
  ),
  /** Lines that can't be bought any more, in words; left out of the sums. */
  gone: z.array(z.object({ listingId: rowId, finishId, reason: z.string() })),
  items: moneySchema,
  postage: moneySchema,
  taxName: z.string(),
  taxBasisPoints: z.int(),
  tax: moneySchema,
  total: moneySchema,
  /** Names exactly this offer; to be sent back when ordering, so that nobody pays what they did not see. */
  offerHash: z.string(),
});
export type Offer = z.output<typeof offerSchema>;

export const addressSchema = z.strictObject({
  name: oneLine(80),
  street: oneLine(120),
  more: paragraph(120),
  postcode: oneLine(20),
  city: oneLine(80),
  country: z.string().check(z.regex(/^[A-Z]{2}$/)),
});
export type PostalAddress = z.output<typeof addressSchema>;

export const readShop = defineRoute({
  id: 'readShop',
  method: 'GET',
  path: '/api/shops/:shop',
  tag: 'storefront',
  access: 'public',
  summary: 'The public front of a workshop’s shop',
  params: shopSlug,
  answer: 'json',
  response: shopFrontSchema,
  successStatus: 200,
});
export const searchShop = defineRoute({
  id: 'searchShop',
  method: 'GET',
  path: '/api/shops/:shop/listings',
  tag: 'storefront',
  access: 'public',
  summary: 'What a shop sells, all of it or what fits the words',
  params: shopSlug,
  query: z.strictObject({
    words: z.optional(z.string().check(z.trim(), z.maxLength(80))),
    kind: z.optional(z.enum(['bracket', 'kit'])),
  }),
  answer: 'json',
  response: z.object({ cards: z.array(shopCardSchema) }),
  successStatus: 200,
});
export const readShopListing = defineRoute({
  id: 'readShopListing',
  method: 'GET',
  path: '/api/shops/:shop/listings/:listing',
  tag: 'storefront',
  access: 'public',
  summary: 'One listing with the brackets in it, what it fits and what is on the shelf',
  params: z.strictObject({ shop: slug, listing: slug }),
  answer: 'json',
  response: shopListingSchema,
  successStatus: 200,
});
export const readShopPhoto = defineRoute({
  id: 'readShopPhoto',
  method: 'GET',
  path: '/api/shops/:shop/photos/:photoId',
  tag: 'storefront',
  access: 'public',
  summary: 'A photo of a published listing',
  params: z.strictObject({ shop: slug, photoId: rowId }),
  answer: 'file',
  successStatus: 200,
});
export const priceCart = defineRoute({
  id: 'priceCart',
  method: 'POST',
  path: '/api/shops/:shop/offers',
  tag: 'storefront',
  access: 'public',
  summary: 'What a cart costs now, tax and postage included, and when it leaves',
  params: shopSlug,
  body: z.strictObject({ lines: cartInput }),
  bodyKind: 'json',
  answer: 'json',
  response: offerSchema,
  successStatus: 200,
});
export const placeSale = defineRoute({
  id: 'placeSale',
  method: 'POST',
  path: '/api/shops/:shop/sales',
  tag: 'storefront',
  access: 'public',
  summary: 'Order what was offered; what is on the shelf is kept for the buyer for an hour',
  params: shopSlug,
  body: z.strictObject({
    lines: cartInput,
    offerHash: z.string().check(z.regex(/^[0-9a-f]{64}$/)),
    email: z.email(),
    address: addressSchema,
  }),
  bodyKind: 'json',
  answer: 'json',
  response: z.object({ number: z.int(), link: z.string() }),
  successStatus: 201,
  idempotent: true,
  problems: ['offer-changed', 'already-exists', 'wrong-state', 'too-many-requests'],
});
