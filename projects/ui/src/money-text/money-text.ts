import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { type Money, formatMoney } from '@foldwright/shared/units/money';

/** An amount of money in upright figures: "€16.20". */
@Component({
  selector: 'fw-money-text',
  template: '{{ text() }}',
  styles: `
    :host {
      font: var(--fw-figure);
      font-size: inherit;
      font-variant-numeric: tabular-nums;
      white-space: nowrap;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class MoneyText {
  readonly amount = input.required<Money>();

  protected readonly text = computed(() => formatMoney(this.amount()));
}
