import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { RouterLink } from '@angular/router';
import { finishWords } from '@foldwright/ui/formed-preview/finish-look';
import { dayWords } from '@foldwright/ui/date-text/date-words';
import { ShopDeskApi } from '../../api/shop-desk-api';

const HANDS = { either: '', left: ', left hand', right: ', right hand' } as const;

/** Everybody who bought this very revision, alone or in a kit: whom to tell when something is wrong with it. */
@Component({
  selector: 'fw-revision-buyers',
  imports: [RouterLink],
  template: `
    <h3>Who has this revision</h3>
    <ul>
      @for (buyer of buyers(); track $index) {
        <li>
          <a [routerLink]="['/shop-desk/sales', buyer.saleId]">{{ buyer.words }}</a>
          <small>{{ buyer.counts }}</small>
        </li>
      } @empty {
        @if (read.value() !== undefined) {
          <li class="soft">Nobody has bought it.</li>
        }
      }
    </ul>
  `,
  styles: `
    h3 {
      margin: 18px 0 6px;
    }

    li {
      padding: 5px 0;
      font: 400 14px/20px var(--fw-sans);
      overflow-wrap: anywhere;
    }

    small {
      display: block;
      font: var(--fw-note);
      color: var(--fw-ink-soft);
    }

    .soft {
      color: var(--fw-ink-soft);
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class RevisionBuyers {
  readonly revisionId = input.required<string>();

  protected readonly read = inject(ShopDeskApi).buyers(this.revisionId);
  private readonly now = new Date();
  protected readonly buyers = computed(() =>
    (this.read.value()?.buyers ?? []).map((buyer) => ({
      saleId: buyer.saleId,
      words: `${buyer.customerName}, ${buyer.customerEmail}, order ${buyer.saleNumber} of ${dayWords(buyer.placedAt, this.now)}`,
      counts: [
        `${buyer.bought} bought in ${finishWords(buyer.finishId).toLowerCase()}${HANDS[buyer.hand]}`,
        ...(buyer.inKit === null ? [] : [`in ${buyer.inKit}`]),
        `${buyer.shipped} sent`,
        ...(buyer.returned > 0 ? [`${buyer.returned} came back`] : []),
      ].join(', '),
    })),
  );
}
