import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { MatButtonModule } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { EmptyBench } from '@foldwright/ui/empty-bench/empty-bench';
import { MoneyText } from '@foldwright/ui/money-text/money-text';
import { SessionApi } from '../api/session-api';
import { ShopDeskApi } from '../api/shop-desk-api';

const STATES = { draft: 'not published', published: 'published', withdrawn: 'withdrawn' } as const;

/** What the shop offers, with what each costs and what is left of its price. */
@Component({
  selector: 'fw-listings-page',
  imports: [EmptyBench, MatButtonModule, MoneyText, RouterLink],
  template: `
    @if (isOwner()) {
      <div class="fw-acts">
        <a matButton="filled" routerLink="/shop-desk/listings/new">Write a listing</a>
      </div>
    }
    @if (rows().length > 0) {
      <div class="fw-scroll" tabindex="0" role="region" aria-label="Listings">
        <table class="fw-table">
          <thead>
            <tr>
              <th scope="col">Listing</th>
              <th scope="col">Sells</th>
              <th scope="col">State</th>
              <th scope="col">Price with tax</th>
              <th scope="col">Cost</th>
              <th scope="col">Left without tax</th>
            </tr>
          </thead>
          <tbody>
            @for (row of rows(); track row.id) {
              <tr>
                <th scope="row">
                  <a [routerLink]="['/shop-desk/listings', row.id]">{{ row.title }}</a>
                </th>
                <td>
                  {{ row.sells }}
                  @if (row.isBehind) {
                    <small class="behind">a newer revision is released</small>
                  }
                </td>
                <td>{{ row.stateWords }}</td>
                <td><fw-money-text [amount]="row.price" /></td>
                <td>
                  @if (row.cost.each; as each) {
                    <fw-money-text [amount]="each" />
                  }
                  <small>{{ row.cost.source }}</small>
                </td>
                <td>
                  @if (row.margin; as margin) {
                    <fw-money-text [amount]="margin" />
                  } @else {
                    unknown
                  }
                </td>
              </tr>
            }
          </tbody>
        </table>
      </div>
    } @else if (list.value() !== undefined) {
      <fw-empty-bench
        heading="Nothing is offered yet."
        lead="Write a listing for a released revision or a kit: its words, what it fits, its finishes and its price."
      />
    }
  `,
  styles: `
    .fw-acts {
      margin-bottom: 14px;
    }

    small {
      display: block;
      font: var(--fw-note);
      color: var(--fw-ink-soft);
    }

    .behind {
      color: var(--fw-check);
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ListingsPage {
  private readonly session = inject(SessionApi);
  protected readonly isOwner = computed(() => this.session.role() === 'owner');
  protected readonly list = inject(ShopDeskApi).listings();
  protected readonly rows = computed(() =>
    (this.list.value()?.listings ?? []).map((listing) => ({
      ...listing,
      stateWords: STATES[listing.state],
      sells:
        listing.what.kind === 'kit'
          ? listing.what.kitName
          : `${listing.what.bracket.partNumber} ${listing.what.bracket.partName}, revision ${listing.what.bracket.letter}`,
    })),
  );
}
