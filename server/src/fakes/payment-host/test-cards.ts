/** What the host makes of a card that somebody typed. */
export type CardReading =
  | { readonly kind: 'pays' }
  | { readonly kind: 'declined'; readonly code: string; readonly message: string }
  | { readonly kind: 'mistyped'; readonly message: string };

/** Numbers that are declined, and why. Every other number that starts with 4242 pays. */
export const DECLINED_CARDS: readonly { readonly number: string; readonly code: string; readonly message: string }[] = [
  {
    number: '4000000000000002',
    code: 'card_declined',
    message: 'The card was declined. Nothing was taken. Try another card.',
  },
  {
    number: '4000000000009995',
    code: 'insufficient_funds',
    message: 'There is not enough money on this card. Nothing was taken. Try another card.',
  },
];

/** Read a card: digits grouped in any way, expiry as MM / YY, three or four digits of code. */
export function readTestCard(card: { number: string; expiry: string; code: string }, now: Date): CardReading {
  const digits = card.number.replace(/[\s-]/g, '');
  if (!/^\d{16}$/.test(digits)) return { kind: 'mistyped', message: 'The card number has 16 digits.' };
  const expiry = /^\s*(\d{1,2})\s*\/\s*(\d{2})\s*$/.exec(card.expiry);
  const month = Number(expiry?.[1]);
  if (expiry === null || month < 1 || month > 12) {
    return { kind: 'mistyped', message: 'The expiry date is written as month / year, for example 04 / 30.' };
  }
  // A card is good to the end of the month it names.
  if (Date.UTC(2000 + Number(expiry[2]), month, 1) <= now.getTime()) {
    return { kind: 'mistyped', message: 'This card has expired.' };
  }
  if (!/^\d{3,4}$/.test(card.code.trim())) return { kind: 'mistyped', message: 'The security code has 3 or 4 digits.' };
  const declined = DECLINED_CARDS.find((known) => known.number === digits);
  if (declined !== undefined) return { kind: 'declined', code: declined.code, message: declined.message };
  if (digits.startsWith('4242')) return { kind: 'pays' };
  return {
    kind: 'declined',
    code: 'card_not_supported',
    message: 'This desk only knows its own test cards. Nothing was taken. A number that starts with 4242 pays.',
  };
}
