import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import { MatButtonModule } from '@angular/material/button';
import type { Quote } from '@foldwright/shared/contracts/orders';
import { MoneyText } from '@foldwright/ui/money-text/money-text';

/** What the cutting service answered: a price for each quantity, taken apart as it gave it, or why it won't make it. */
@Component({
  selector: 'fw-quote-card',
  imports: [MatButtonModule, MoneyText],
  templateUrl: './quote-card.html',
  styleUrl: './quote-card.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class QuoteCard {
  readonly quote = input.required<Quote>();
  readonly canOrder = input(false);

  /** The quantity to order. */
  readonly ordered = output<number>();

  /** The quantity whose order is the one call to act: ten, as for a kit's first batch, or the smallest there is. */
  protected readonly advised = computed(() => {
    const quantities = this.quote().breaks.map(({ quantity }) => quantity);
    return quantities.includes(10) ? 10 : Math.min(...quantities);
  });
  protected readonly validity = computed(() => {
    const { validUntil } = this.quote();
    if (validUntil === null) return null;
    return `good until ${new Intl.DateTimeFormat('en-GB', { dateStyle: 'medium' }).format(new Date(validUntil))}`;
  });
}
