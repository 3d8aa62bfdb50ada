import type { DocumentPiece, SaleHead } from './sale-document';
import { dayWords } from './sale-document';
import { SalePage } from './sale-page';

export interface PackingSlipInput {
  readonly head: SaleHead;
  readonly parcel: number;
  readonly carrier: string;
  readonly trackingCode: string | null;
  readonly shippedAt: Date;
  readonly inside: readonly DocumentPiece[];
  /** What comes in another parcel. */
  readonly toCome: readonly DocumentPiece[];
}

const lineOf = (piece: DocumentPiece): string =>
  piece.kind === 'hardware'
    ? `${piece.quantity} × ${piece.name}`
    : `${piece.quantity} × ${piece.name}, revision ${piece.letter}`;

/** Packing slip of one parcel: what is in it with revision, hand, finish and picture, and what is still to come. */
export function makePackingSlip(input: PackingSlipInput): Promise<Buffer> {
  const { head, parcel, carrier, trackingCode, shippedAt, inside, toCome } = input;
  const page = new SalePage(head, 'Packing slip', shippedAt);
  page.facts([
    ['Order', String(head.saleNumber)],
    ['Ordered', dayWords(head.placedAt)],
    ['Parcel', String(parcel)],
    ['Sent', dayWords(shippedAt)],
    ['With', trackingCode === null ? carrier : `${carrier}, ${trackingCode}`],
  ]);
  page.heading('In this parcel');
  page.pieces(inside, 'pieces');
  if (toCome.length > 0) {
    page.heading('Still to come');
    page.list(toCome.map(lineOf), () => '–');
  }
  page.heading('Check it before you fit it');
  page.paragraph(
    'Revision, hand and fingerprint of each bracket stand above and in your order. If one differs from what came, don’t fit it; write to us.',
  );
  return page.finish();
}
