import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { RouterLink } from '@angular/router';
import { dayWords } from '@foldwright/ui/date-text/date-words';
import { EmptyBench } from '@foldwright/ui/empty-bench/empty-bench';
import { MoneyText } from '@foldwright/ui/money-text/money-text';
import { StorefrontApi } from '../api/storefront-api';

const STATES = {
  placed: 'to be paid',
  paid: 'paid, being put together',
  'partly-shipped': 'partly on its way',
  shipped: 'on its way',
  delivered: 'with you',
  cancelled: 'cancelled',
} as const;

/** What somebody has bought, in every shop. */
@Component({
  selector: 'fw-purchases-page',
  imports: [EmptyBench, MoneyText, RouterLink],
  template: `
    <h1>Your orders</h1>
    @if (list.problem(); as problem) {
      <p role="alert">
        <b>{{ problem.details.title }}.</b> {{ problem.details.detail }}
      </p>
    }
    @if (rows().length > 0) {
      <ul>
        @for (row of rows(); track row.link) {
          <li>
            <a [routerLink]="['/shop/order', row.link]">
              <span class="fw-figure">{{ row.number }}</span>
              <span>
                <b>{{ row.what }}</b>
                <span class="fw-soft">{{ row.shopName }}, {{ row.placed }}</span>
              </span>
              <span class="fw-soft">{{ row.words }}</span>
              <fw-money-text [amount]="row.total" />
            </a>
          </li>
        }
      </ul>
    } @else if (list.value() !== undefined) {
      <fw-empty-bench
        heading="Nothing bought yet."
        lead="Orders that you place while you are signed in stand here. An order placed as a guest is behind the link in its mail."
      />
    } @else {
      <p role="status">Reading your orders</p>
    }
  `,
  styles: `
    ul {
      margin-top: 18px;
    }

    li a {
      display: grid;
      grid-template-columns: 64px minmax(0, 1fr) auto auto;
      gap: 6px 18px;
      align-items: center;
      min-height: 60px;
      padding: 8px 0;
      border-bottom: 1px solid var(--fw-line);
      color: inherit;
      text-decoration: none;
    }

    b,
    b + span {
      display: block;
    }

    @media (max-width: 620px) {
      li a {
        grid-template-columns: 56px minmax(0, 1fr) auto;
      }

      li a > :nth-child(3) {
        grid-row: 2;
        grid-column: 2 / 4;
      }
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { class: 'fw-page' },
})
export class PurchasesPage {
  protected readonly list = inject(StorefrontApi).purchases();
  private readonly now = new Date();
  protected readonly rows = computed(() =>
    (this.list.value()?.purchases ?? []).map((purchase) => ({
      ...purchase,
      placed: dayWords(purchase.placedAt, this.now),
      words: STATES[purchase.state],
    })),
  );
}
