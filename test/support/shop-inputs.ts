/** Sound input for routes of stock, shop and sales. */
export const ADDRESS = {
  name: 'Ravi Sandle',
  street: 'Quay Row 8',
  more: '',
  postcode: '1',
  city: 'Westmere',
  country: 'IE',
};
export const HARDWARE = (name: string) => ({
  name,
  specification: 'ISO 4762',
  cost: { amountMinor: 10, currency: 'EUR' },
  isInUse: true,
});
export const KIT = (hardwareId: string) => ({
  name: 'Kit',
  note: '',
  lines: [{ kind: 'hardware', hardwareId, quantity: 2 }],
});
export const LISTING = (revisionId: string, slug: string) => ({
  what: { kind: 'bracket', revisionId },
  slug,
  title: 'Bracket',
  summary: '',
  fits: '',
  doesNotFit: '',
  fittingSteps: '',
  priceMinor: 1200,
  finishes: [{ finishId: 'bare', surchargeMinor: 0 }],
  leadTimeDays: 5,
});
export const SETTINGS = {
  slug: 'matrix',
  isOpen: true,
  headline: 'Brackets',
  about: '',
  currency: 'EUR',
  taxName: 'VAT',
  taxBasisPoints: 1900,
  taxNumber: '',
  postageMinor: 500,
  packingDays: 1,
  senderAddress: '',
  questionsTo: 'owner@example.test',
} as const;
