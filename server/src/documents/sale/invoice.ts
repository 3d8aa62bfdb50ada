import { includedTaxMinor } from '@foldwright/shared/pricing/included-tax';
import { formatMoney } from '@foldwright/shared/units/money';
import type { SaleHead } from './sale-document';
import { dayWords } from './sale-document';
import { SalePage } from './sale-page';

export interface InvoiceInput {
  readonly head: SaleHead;
  readonly paidAt: Date;
  readonly currency: string;
  readonly lines: readonly {
    readonly words: string;
    readonly quantity: number;
    readonly eachMinor: number;
    readonly totalMinor: number;
    readonly taxMinor: number;
  }[];
  readonly postageMinor: number;
  readonly taxName: string;
  readonly taxBasisPoints: number;
  readonly taxNumber: string;
  readonly taxMinor: number;
  readonly totalMinor: number;
  readonly refundedMinor: number;
}

/** Right edges of the columns: pieces, each, tax in it, together. */
const COLUMNS = [112, 138, 163, 190] as const;

/** Percent of a rate in hundredths of a percent: "19 %", "7.7 %". */
const percent = (basisPoints: number): string => `${basisPoints / 100} %`;

/** Invoice of a paid sale: lines with the tax in them, postage, totals, and what has gone back since. */
export function makeInvoice(input: InvoiceInput): Promise<Buffer> {
  const { head, paidAt, currency, lines, taxName, taxBasisPoints, taxNumber } = input;
  const money = (amountMinor: number): string => formatMoney({ amountMinor, currency });
  const page = new SalePage(head, 'Invoice', paidAt);
  page.facts([
    ['Invoice of order', String(head.saleNumber)],
    ['Ordered', dayWords(head.placedAt)],
    ['Paid', dayWords(paidAt)],
    ...(taxNumber === '' ? [] : ([[`${taxName} number`, taxNumber]] as const)),
  ]);
  page.heading('What was bought');
  page.sums(
    ['Pieces', 'Each', `${taxName} in it`, 'Together'],
    [
      ...lines.map(({ words, quantity, eachMinor, totalMinor, taxMinor }) => ({
        words,
        figures: [String(quantity), money(eachMinor), money(taxMinor), money(totalMinor)],
      })),
      {
        words: 'Postage',
        figures: ['', '', money(includedTaxMinor(input.postageMinor, taxBasisPoints)), money(input.postageMinor)],
      },
      { words: 'Total', figures: ['', '', '', money(input.totalMinor)], isTotal: true },
      { words: `without ${taxName}`, figures: ['', '', '', money(input.totalMinor - input.taxMinor)] },
      { words: `${taxName} ${percent(taxBasisPoints)}, in the total`, figures: ['', '', '', money(input.taxMinor)] },
    ],
    COLUMNS,
  );
  if (input.refundedMinor > 0) {
    page.sums(
      [],
      [
        { words: 'Sent back since', figures: ['', '', '', money(-input.refundedMinor)] },
        { words: 'Left', figures: ['', '', '', money(input.totalMinor - input.refundedMinor)], isTotal: true },
      ],
      COLUMNS,
    );
  }
  page.paragraph('Paid by card through the payment host. Thank you.');
  return page.finish();
}
