import type { Development } from '@foldwright/shared/bending/development';
import type { Hand } from '@foldwright/shared/contracts/stock';

/** A bracket or hardware as a document about a sale shows it. */
export type DocumentPiece =
  | {
      readonly kind: 'bracket';
      readonly name: string;
      readonly number: string;
      readonly letter: string;
      readonly hash: string;
      readonly hand: Hand;
      readonly finishName: string;
      /** Colour of the coat, sRGB hex; null for bare metal. */
      readonly finishHex: string | null;
      readonly materialLabel: string;
      readonly development: Development;
      readonly quantity: number;
    }
  | { readonly kind: 'hardware'; readonly name: string; readonly specification: string; readonly quantity: number };

/** What every document about a sale says at its head. */
export interface SaleHead {
  readonly shopName: string;
  readonly senderAddress: string;
  readonly saleNumber: number;
  readonly placedAt: Date;
  readonly customerLines: readonly string[];
}

const HAND_WORDS: Readonly<Record<Hand, string>> = { either: 'one hand', left: 'left hand', right: 'right hand' };
export const handWords = (hand: Hand): string => HAND_WORDS[hand];

/** "14 May 2026", the same everywhere. */
export const dayWords = (at: Date): string =>
  new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'long', year: 'numeric', timeZone: 'UTC' }).format(at);

/** First letters of a fingerprint: enough to compare by eye. */
export const shortHash = (hash: string): string => hash.slice(0, 12);
