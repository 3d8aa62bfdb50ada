import { randomUUID } from 'node:crypto';
import { ADDRESS, HARDWARE, KIT, LISTING, SETTINGS } from './shop-inputs';

export const ID_NAMES = [
  ...['partId', 'draftId', 'photoId', 'jobId', 'revisionId', 'orderId', 'quoteId', 'hardwareId', 'kitId', 'positionId'],
  ...[
    'listingId',
    'listingPhotoId',
    'saleId',
    'shipmentId',
    'refundId',
    'questionId',
    'memberId',
    'invitationId',
    'workId',
    'messageId',
    'mailId',
    'commentId',
    'reviewLinkId',
  ],
] as const;
export type Ids = Readonly<Record<(typeof ID_NAMES)[number], string>> & {
  /** Addresses of the shop and of what is public in it. */
  readonly shop?: string;
  readonly listing?: string;
  readonly link?: string;
};

export const PLATE = { shape: 'flat-plate', widthMm: 80, heightMm: 60 } as const;
/** Sound input for each route that takes any, so that a refusal is about who asks and never about what. */
export const BODIES: Readonly<Record<string, (ids: Ids, workshopId: string) => object>> = {
  signIn: () => ({ email: 'nobody@example.test', password: 'x' }),
  switchWorkshop: (_ids, workshopId) => ({ workshopId }),
  changeOwnName: () => ({ name: 'Somebody' }),
  createPart: () => ({ name: 'New', starter: PLATE }),
  renamePart: () => ({ name: 'Renamed', number: `R-${randomUUID().slice(0, 8)}` }),
  sendCommands: () => ({
    baseRevision: 0,
    batchId: randomUUID(),
    clientId: 'matrix',
    commands: [{ kind: 'setBaseAnchor', to: { x: 10, y: 10 } }],
  }),
  releaseDraft: () => ({ baseRevision: 0, note: '', acceptedCautionIds: [] }),
  rereadPhoto: () => ({ templateKind: 'card', templateThicknessMm: 0.5 }),
  askForQuote: () => ({ stock: 'production', quantities: [1] }),
  placeOrder: ({ quoteId }) => ({ quoteId, quantity: 1 }),
  receiveStock: ({ hardwareId }) => ({
    what: { kind: 'hardware', hardwareId },
    quantity: 1,
    orderId: null,
    reason: '',
  }),
  adjustStock: () => ({ change: 1, reason: 'counted' }),
  createHardware: () => HARDWARE(randomUUID()),
  changeHardware: () => HARDWARE(randomUUID()),
  createKit: ({ hardwareId }) => KIT(hardwareId),
  changeKit: ({ hardwareId }) => KIT(hardwareId),
  setPartHardware: ({ hardwareId }) => ({ hardware: [{ hardwareId, quantity: 1 }] }),
  setPartHand: () => ({ hand: 'left' }),
  makeOtherHand: () => ({ name: 'Other hand' }),
  changeShopSettings: () => SETTINGS,
  createListing: ({ revisionId }) => LISTING(revisionId, `l-${randomUUID().slice(0, 8)}`),
  changeListing: ({ revisionId }) => LISTING(revisionId, `l-${randomUUID().slice(0, 8)}`),
  setListingState: () => ({ state: 'withdrawn' }),
  answerQuestion: () => ({ text: 'It does.' }),
  shipSale: () => ({ items: [{ itemId: randomUUID(), quantity: 1 }], carrier: 'Post', trackingCode: null }),
  cancelSale: () => ({ lines: [{ lineId: randomUUID(), quantity: 1 }], reason: 'r' }),
  refundSale: () => ({ amountMinor: 100, reason: 'r' }),
  recordReturn: () => ({ itemId: randomUUID(), quantity: 1, isBackOnShelf: true, refundMinor: 0, reason: 'r' }),
  priceCart: ({ listingId }) => ({ lines: [{ listingId, finishId: 'bare', quantity: 1 }] }),
  placeSale: ({ listingId }) => ({
    lines: [{ listingId, finishId: 'bare', quantity: 1 }],
    offerHash: '0'.repeat(64),
    email: 'buyer@example.test',
    address: ADDRESS,
  }),
  askShop: () => ({ name: 'Ravi', email: 'ravi@example.test', listingSlug: null, text: 'Does it fit?' }),
  askMoreByLink: () => ({ text: 'And this?' }),
  signUp: () => ({
    name: 'Noor Vale',
    email: `${randomUUID()}@example.test`,
    password: 'a long enough secret',
    workshopName: 'Vale',
    numberPrefix: 'V',
  }),
  inviteMember: () => ({ email: `${randomUUID()}@example.test`, role: 'viewer' }),
  changeMemberRole: () => ({ role: 'fabricator' }),
  acceptInvitation: () => ({ account: null }),
  addComment: () => ({ revisionId: null, place: { x: 1, y: 2 }, text: 'Closer to the edge.' }),
  resolveComment: () => ({ isResolved: true }),
  giveOpinion: () => ({ verdict: 'agreed', note: '' }),
  makeReviewLink: () => ({ guestName: 'Noor Vale', guestEmail: null, days: 14 }),
  commentByLink: () => ({ place: null, text: 'Fine.' }),
  opinionByLink: () => ({ verdict: 'agreed', note: '' }),
  askByLink: () => ({ text: 'And this?' }),
};
export const FIELDS: Readonly<Record<string, Readonly<Record<string, string>>>> = {
  uploadPhoto: { templateKind: 'card', templateThicknessMm: '0.5', rulerXMm: '100', rulerYMm: '100' },
  addListingPhoto: { description: 'On the cart' },
};
export const QUERIES: Readonly<Record<string, string>> = {
  computeDraft: '?stock=trial',
  printDraft: '?stock=trial&paper=A4',
  readPhotoImage: '?view=as-taken',
  readScaleSheet: '?paper=A4&variant=light',
  readRevisionFile: '?stock=trial',
};
