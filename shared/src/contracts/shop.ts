import * as z from 'zod/mini';
import { defineRoute } from './route';
import { currency, moneySchema, oneLine, rowId } from './scalars';
import { costSchema } from './kits';
import { bracketRefSchema, finishId, knownFinishId } from './stock';

/** The last part of a public address: lower-case letters, digits and single hyphens. */
export const slug = z.string().check(z.regex(/^[a-z0-9]+(-[a-z0-9]+)*$/), z.minLength(2), z.maxLength(60));
export const paragraph = (maximum: number) => z.string().check(z.trim(), z.maxLength(maximum));
/** Up to 100 000 in whole units: sums of a full cart stay exact. */
const LARGEST_PRICE_MINOR = 10_000_000;
const minor = z.int().check(z.gte(0), z.lte(LARGEST_PRICE_MINOR));

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
const finishOffer = z.strictObject({ finishId: knownFinishId, surchargeMinor: minor });
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
  /** Price with tax, in the shop's currency. Nothing is given away: a payment page can't be opened for nothing. */
  priceMinor: z.int().check(z.gte(1), z.lte(LARGEST_PRICE_MINOR)),
  finishes: z.array(finishOffer).check(
    z.minLength(1),
    z.maxLength(10),
    // Each finish once.
    z.refine((offers) => new Set(offers.map((offer) => offer.finishId)).size === offers.length),
  ),
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

const owners = ['owner'] as const;
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
  problems: ['stale-row'],
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
  path: '/api/shop/listings/:listingId/photos/:listingPhotoId',
  tag: 'shop',
  access: owners,
  summary: 'Take a photo off a listing',
  params: z.strictObject({ listingId: rowId, listingPhotoId: rowId }),
  answer: 'json',
  response: listingSchema,
  successStatus: 200,
});
