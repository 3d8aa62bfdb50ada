import * as z from 'zod/mini';
import { partDocumentSchema } from './part-document-schema';
import { defineRoute } from './route';
import { currency, moneySchema, oneLine, rowId, timestamp } from './scalars';
import { bracketRefSchema, costSchema, finishId } from './stock';

const slug = z.string().check(z.regex(/^[a-z0-9]+(-[a-z0-9]+)*$/), z.minLength(2), z.maxLength(60));
const shopSlug = z.strictObject({ shop: slug });
const paragraph = (maximum: number) => z.string().check(z.trim(), z.maxLength(maximum));
const minor = z.int().check(z.gte(0), z.lte(100_000_000));

// --- what the workshop decides ---------------------------------------------------------------------------------------

export const shopSettingsSchema = z.object({
  slug,
  isOpen: z.boolean(),
  headline: z.string(),
  about: z.string(),
  currency,
  /** Name of the tax on invoices, and its rate in hundredths of a percent; prices in the shop include it. */
  taxName: z.string(),
  taxBasisPoints: z.int(),
  /** Tax number as it stands on invoices; empty when there is none. */
  taxNumber: z.string(),
  /** Postage for one order, tax included. */
  postageMinor: z.int(),
  /** Days to put a parcel together when all is on the shelf. */
  packingDays: z.int(),
  senderAddress: z.string(),
  /** Where questions about fit are mailed. */
  questionsTo: z.string(),
  revision: z.int(),
});
export type ShopSettings = z.output<typeof shopSettingsSchema>;
const shopSettingsInput = z.strictObject({
  slug,
  isOpen: z.boolean(),
  headline: oneLine(120),
  about: paragraph(2000),
  currency,
  taxName: oneLine(20),
  taxBasisPoints: z.int().check(z.gte(0), z.lte(3000)),
  taxNumber: paragraph(40),
  postageMinor: minor,
  packingDays: z.int().check(z.gte(0), z.lte(60)),
  senderAddress: paragraph(400),
  questionsTo: z.email(),
});
export type ShopSettingsInput = z.output<typeof shopSettingsInput>;

export const LISTING_STATES = ['draft', 'published', 'withdrawn'] as const;
/** A finish that can be bought, and what it costs on top. */
const finishOffer = z.strictObject({ finishId, surchargeMinor: minor });
const listingInput = z.strictObject({
  what: z.discriminatedUnion('kind', [
    z.strictObject({ kind: z.literal('bracket'), revisionId: rowId }),
    z.strictObject({ kind: z.literal('kit'), kitId: rowId }),
  ]),
  slug,
  title: oneLine(80),
  summary: paragraph(600),
  /** Sizes a tape can check, one a line. */
  fits: paragraph(800),
  doesNotFit: paragraph(800),
  /** Steps of fitting, one a line: they stand on the fitting sheet. */
  fittingSteps: paragraph(3000),
  /** Price with tax, in the shop's currency. */
  priceMinor: minor,
  finishes: z.array(finishOffer).check(z.minLength(1), z.maxLength(10)),
  /** Days when brackets have to be cut first. */
  leadTimeDays: z.int().check(z.gte(1), z.lte(365)),
});
export type ListingInput = z.output<typeof listingInput>;

export const listingSchema = z.object({
  id: rowId,
  state: z.enum(LISTING_STATES),
  what: z.discriminatedUnion('kind', [
    z.object({ kind: z.literal('bracket'), bracket: bracketRefSchema }),
    z.object({ kind: z.literal('kit'), kitId: rowId, kitName: z.string() }),
  ]),
  slug,
  title: z.string(),
  summary: z.string(),
  fits: z.string(),
  doesNotFit: z.string(),
  fittingSteps: z.string(),
  price: moneySchema,
  finishes: z.array(z.object({ finishId, surchargeMinor: z.int() })),
  leadTimeDays: z.int(),
  cost: costSchema,
  /** Price without tax less cost; null while the cost is unknown. */
  margin: z.nullable(moneySchema),
  photos: z.array(z.object({ id: rowId, description: z.string() })),
  /** A newer revision of the bracket (or of one in the kit) is released than the one that is sold. */
  isBehind: z.boolean(),
  revision: z.int(),
});
export type Listing = z.output<typeof listingSchema>;

// --- what customers see ----------------------------------------------------------------------------------------------

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

// --- a question about fit --------------------------------------------------------------------------------------------

export const questionSchema = z.object({
  id: rowId,
  about: z.string(),
  saleId: z.nullable(rowId),
  saleNumber: z.nullable(z.int()),
  listingSlug: z.nullable(slug),
  askedBy: z.string(),
  messages: z.array(
    z.object({ id: rowId, at: timestamp, by: z.string(), side: z.enum(['customer', 'workshop']), text: z.string() }),
  ),
  isAnswered: z.boolean(),
});
export type Question = z.output<typeof questionSchema>;
const messageText = z.string().check(z.trim(), z.minLength(1), z.maxLength(3000));

const owners = ['owner'] as const;
const sellers = ['owner', 'fabricator'] as const;
const crew = ['owner', 'fabricator', 'viewer'] as const;
const listingIdParams = z.strictObject({ listingId: rowId });

export const readShopSettings = defineRoute({
  id: 'readShopSettings',
  method: 'GET',
  path: '/api/shop/settings',
  tag: 'shop',
  access: crew,
  summary: 'Address, tax, postage and words of the shop',
  answer: 'json',
  response: shopSettingsSchema,
  successStatus: 200,
});
export const changeShopSettings = defineRoute({
  id: 'changeShopSettings',
  method: 'PUT',
  path: '/api/shop/settings',
  tag: 'shop',
  access: owners,
  summary: 'Change the shop’s settings',
  body: shopSettingsInput,
  bodyKind: 'json',
  answer: 'json',
  response: shopSettingsSchema,
  successStatus: 200,
  ifMatch: true,
  problems: ['already-exists', 'stale-row'],
});
export const listListings = defineRoute({
  id: 'listListings',
  method: 'GET',
  path: '/api/shop/listings',
  tag: 'shop',
  access: crew,
  summary: 'Listings in every state',
  answer: 'json',
  response: z.object({ listings: z.array(listingSchema) }),
  successStatus: 200,
});
export const createListing = defineRoute({
  id: 'createListing',
  method: 'POST',
  path: '/api/shop/listings',
  tag: 'shop',
  access: owners,
  summary: 'Write a listing for a released revision or a kit; nobody sees it before it is published',
  body: listingInput,
  bodyKind: 'json',
  answer: 'json',
  response: listingSchema,
  successStatus: 201,
  idempotent: true,
  problems: ['already-exists'],
});
export const readListing = defineRoute({
  id: 'readListing',
  method: 'GET',
  path: '/api/shop/listings/:listingId',
  tag: 'shop',
  access: crew,
  summary: 'One listing',
  params: listingIdParams,
  answer: 'json',
  response: listingSchema,
  successStatus: 200,
});
export const changeListing = defineRoute({
  id: 'changeListing',
  method: 'PUT',
  path: '/api/shop/listings/:listingId',
  tag: 'shop',
  access: owners,
  summary: 'Change a listing; what was sold before stays as it was',
  params: listingIdParams,
  body: listingInput,
  bodyKind: 'json',
  answer: 'json',
  response: listingSchema,
  successStatus: 200,
  ifMatch: true,
  problems: ['already-exists', 'stale-row'],
});
export const setListingState = defineRoute({
  id: 'setListingState',
  method: 'PUT',
  path: '/api/shop/listings/:listingId/state',
  tag: 'shop',
  access: owners,
  summary: 'Publish or withdraw a listing',
  params: listingIdParams,
  body: z.strictObject({ state: z.enum(['published', 'withdrawn']) }),
  bodyKind: 'json',
  answer: 'json',
  response: listingSchema,
  successStatus: 200,
  ifMatch: true,
  problems: ['stale-row', 'wrong-state'],
});
export const addListingPhoto = defineRoute({
  id: 'addListingPhoto',
  method: 'POST',
  path: '/api/shop/listings/:listingId/photos',
  tag: 'shop',
  access: owners,
  summary: 'Add a photo: JPEG, PNG or WebP, re-encoded, without its location',
  params: listingIdParams,
  body: z.strictObject({ description: oneLine(120) }),
  bodyKind: 'upload',
  answer: 'json',
  response: listingSchema,
  successStatus: 201,
  problems: ['file-too-large', 'file-type-not-taken', 'photo-refused', 'wrong-state'],
});
export const removeListingPhoto = defineRoute({
  id: 'removeListingPhoto',
  method: 'DELETE',
  path: '/api/shop/listings/:listingId/photos/:photoId',
  tag: 'shop',
  access: owners,
  summary: 'Take a photo off a listing',
  params: z.strictObject({ listingId: rowId, photoId: rowId }),
  answer: 'json',
  response: listingSchema,
  successStatus: 200,
});

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
/** Ordering. Answers the private link; the page behind it opens the payment page. */
export const placeSale = defineRoute({
  id: 'placeSale',
  method: 'POST',
  path: '/api/shops/:shop/sales',
  tag: 'storefront',
  access: 'public',
  summary: 'Order what was offered; what is on the shelf is kept for the buyer until the payment page closes',
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
  problems: ['offer-changed', 'wrong-state', 'too-many-requests'],
});
export const askShop = defineRoute({
  id: 'askShop',
  method: 'POST',
  path: '/api/shops/:shop/questions',
  tag: 'storefront',
  access: 'public',
  summary: 'Ask the workshop about fit before buying; the answer comes by mail, with a link to the thread',
  params: shopSlug,
  body: z.strictObject({ name: oneLine(80), email: z.email(), listingSlug: z.nullable(slug), text: messageText }),
  bodyKind: 'json',
  answer: 'json',
  response: z.object({ link: z.string() }),
  successStatus: 201,
  idempotent: true,
  problems: ['too-many-requests'],
});

const linkParams = z.strictObject({ link: z.string().check(z.regex(/^[A-Za-z0-9_-]{20,80}$/)) });
export const readQuestionByLink = defineRoute({
  id: 'readQuestionByLink',
  method: 'GET',
  path: '/api/question-links/:link',
  tag: 'storefront',
  access: 'public',
  summary: 'A thread about fit by its private link',
  params: linkParams,
  answer: 'json',
  response: z.object({ shop: shopFrontSchema, question: questionSchema }),
  successStatus: 200,
});
export const askMoreByLink = defineRoute({
  id: 'askMoreByLink',
  method: 'POST',
  path: '/api/question-links/:link/messages',
  tag: 'storefront',
  access: 'public',
  summary: 'Ask something more',
  params: linkParams,
  body: z.strictObject({ text: messageText }),
  bodyKind: 'json',
  answer: 'json',
  response: questionSchema,
  successStatus: 201,
  idempotent: true,
  problems: ['too-many-requests'],
});
export const listQuestions = defineRoute({
  id: 'listQuestions',
  method: 'GET',
  path: '/api/questions',
  tag: 'shop',
  access: crew,
  summary: 'Questions about fit, those without an answer first',
  answer: 'json',
  response: z.object({ questions: z.array(questionSchema) }),
  successStatus: 200,
});
export const answerQuestion = defineRoute({
  id: 'answerQuestion',
  method: 'POST',
  path: '/api/questions/:questionId/messages',
  tag: 'shop',
  access: sellers,
  summary: 'Answer a question about fit; the customer gets it by mail',
  params: z.strictObject({ questionId: rowId }),
  body: z.strictObject({ text: messageText }),
  bodyKind: 'json',
  answer: 'json',
  response: questionSchema,
  successStatus: 201,
  idempotent: true,
});
