import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { RouterLink } from '@angular/router';
import { dayWords } from '@foldwright/ui/date-text/date-words';
import { EmptyBench } from '@foldwright/ui/empty-bench/empty-bench';
import { MoneyText } from '@foldwright/ui/money-text/money-text';
import { rereadOn } from '../api/reread';
import { ShopDeskApi } from '../api/shop-desk-api';
import { nextStep, salePaymentWords, saleStateWords } from './sale-words';

/** Sales to customers, what has to be done first. */
@Component({
  selector: 'fw-sales-page',
  imports: [EmptyBench, MoneyText, RouterLink],
  template: `
    @if (list.problem(); as problem) {
      <p role="alert">
        <b>{{ problem.details.title }}.</b> {{ problem.details.detail }}
      </p>
    }
    @if (rows().length > 0) {
      <ul>
        @for (row of rows(); track row.id) {
          <li>
            <a [routerLink]="['/shop-desk/sales', row.id]">
              <span class="fw-figure">{{ row.number }}</span>
              <span class="what">
                <b>{{ row.what }}</b>
                <span class="fw-soft">{{ row.customerName }}, {{ row.placed }}</span>
              </span>
              <span class="state">
                {{ row.stateWords }}
                <span class="fw-soft">{{ row.payment }}</span>
              </span>
              <span class="next">{{ row.next ?? '' }}</span>
              <fw-money-text [amount]="row.total" />
            </a>
          </li>
        }
      </ul>
    } @else if (list.value() !== undefined) {
      <fw-empty-bench
        heading="Nothing sold yet."
        lead="Publish a listing and open the shop: what customers order stands here, with what to do next."
      />
    } @else {
      <p role="status">Reading the sales</p>
    }
  `,
  styles: `
    li a {
      display: grid;
      grid-template-columns: 64px minmax(0, 1.6fr) minmax(0, 1fr) minmax(0, 0.8fr) auto;
      gap: 6px 18px;
      align-items: center;
      min-height: 62px;
      padding: 8px 0;
      border-bottom: 1px solid var(--fw-line);
      color: inherit;
      font: 400 14px/20px var(--fw-sans);
      text-decoration: none;
    }

    .what > *,
    .state > * {
      display: block;
    }

    .next {
      font-weight: 600;
      color: var(--fw-chalk);
    }

    @media (max-width: 760px) {
      li a {
        grid-template-columns: 56px minmax(0, 1fr) auto;
      }

      .state,
      .next {
        grid-column: 2;
      }

      li a > fw-money-text {
        grid-row: 1;
        grid-column: 3;
      }
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SalesPage {
  protected readonly list = inject(ShopDeskApi).sales();
  private readonly now = new Date();
  protected readonly rows = computed(() =>
    (this.list.value()?.sales ?? []).map((sale) => ({
      ...sale,
      placed: dayWords(sale.placedAt, this.now),
      stateWords: saleStateWords(sale.state),
      payment: salePaymentWords(sale.paymentState),
      next: nextStep(sale),
    })),
  );

  constructor() {
    rereadOn(['sale-changed', 'question-changed', 'stock-changed'], () => this.list.reload());
  }
}
