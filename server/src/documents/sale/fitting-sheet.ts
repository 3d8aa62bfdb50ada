import type { DocumentPiece, SaleHead } from './sale-document';
import { dayWords } from './sale-document';
import { SalePage } from './sale-page';

export interface FittingSheetInput {
  readonly head: SaleHead;
  /** Everything that was bought, in the order of the lines. */
  readonly parts: readonly {
    readonly title: string;
    readonly quantity: number;
    readonly pieces: readonly DocumentPiece[];
    readonly steps: readonly string[];
  }[];
  readonly cautions: readonly string[];
}

/** Fitting sheet: what it is, with pictures and hardware, the steps, and the cautions first. */
export function makeFittingSheet({ head, parts, cautions }: FittingSheetInput): Promise<Buffer> {
  const page = new SalePage(head, 'Fitting sheet', head.placedAt);
  page.facts([
    ['Order', String(head.saleNumber)],
    ['Ordered', dayWords(head.placedAt)],
  ]);
  page.heading('Before you begin');
  page.list(cautions, () => '!');
  for (const { title, quantity, pieces, steps } of parts) {
    page.heading(quantity === 1 ? title : `${title}, ${quantity} off; counted for one`);
    page.pieces(pieces, 'for one');
    if (steps.length > 0) page.list(steps, (at) => `${at + 1}.`);
    else page.paragraph('The workshop wrote no steps for this. Ask before you fit it if anything is unclear.');
  }
  return page.finish();
}
