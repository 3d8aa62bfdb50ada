import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { RouterLink } from '@angular/router';
import type { Ledger } from '@foldwright/shared/contracts/ledger';
import { momentWords } from '@foldwright/ui/date-text/date-words';
import { FindingSign } from '@foldwright/ui/finding-note/finding-sign';
import { MoneyText } from '@foldwright/ui/money-text/money-text';
import { rereadOn } from '../api/reread';
import { ShopDeskApi } from '../api/shop-desk-api';

const ACCOUNTS: Readonly<Record<Ledger['money']['accounts'][number]['account'], string>> = {
  'payment-host': 'At the payment host',
  sales: 'Sold, without tax',
  postage: 'Postage, without tax',
  tax: 'Tax owed',
  refunds: 'Sent back, without tax',
  cutting: 'Paid for cutting',
  'paid-out': 'Paid out',
};

/** The books: money to the cent and brackets to the piece, with the proof that both balance. */
@Component({
  selector: 'fw-books-page',
  imports: [FindingSign, MoneyText, RouterLink],
  templateUrl: './books-page.html',
  styleUrl: './books-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class BooksPage {
  protected readonly read = inject(ShopDeskApi).books();
  protected readonly books = this.read.value;
  private readonly now = new Date();
  protected readonly accounts = computed(() =>
    (this.books()?.money.accounts ?? []).map((row) => ({ ...row, words: ACCOUNTS[row.account] })),
  );
  protected readonly entries = computed(() =>
    (this.books()?.money.entries ?? []).map((entry) => ({
      ...entry,
      when: momentWords(entry.at, this.now),
      postings: entry.postings.map((posting) => ({ ...posting, words: ACCOUNTS[posting.account] })),
    })),
  );
  protected readonly isMoneyRight = computed(() => {
    const money = this.books()?.money;
    return (
      money !== undefined &&
      money.difference.amountMinor === 0 &&
      money.proof.books.amountMinor === money.proof.sales.amountMinor
    );
  });
  protected readonly areUnitsRight = computed(() => this.books()?.units.difference === 0);

  constructor() {
    rereadOn(['sale-changed', 'order-changed', 'stock-changed'], () => this.read.reload());
  }
}
