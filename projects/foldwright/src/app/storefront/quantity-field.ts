import { ChangeDetectionStrategy, Component, input, model } from '@angular/core';
import { Pictogram } from '@foldwright/ui/pictogram/pictogram';

const MOST = 500;

/** A whole number of pieces, by buttons or typed. */
@Component({
  selector: 'fw-quantity-field',
  imports: [Pictogram],
  template: `
    <button type="button" [disabled]="quantity() <= 1" [attr.aria-label]="'One less, ' + label()" (click)="step(-1)">
      <fw-pictogram name="remove" />
    </button>
    <input
      type="number"
      inputmode="numeric"
      min="1"
      [max]="most"
      [attr.aria-label]="label()"
      [value]="quantity()"
      (change)="take($event)"
    />
    <button type="button" [disabled]="quantity() >= most" [attr.aria-label]="'One more, ' + label()" (click)="step(1)">
      <fw-pictogram name="add" />
    </button>
  `,
  styles: `
    :host {
      display: inline-flex;
      height: 46px;
      border: 1.5px solid var(--fw-ink);
      border-radius: var(--fw-r-deburr);
    }

    button {
      display: grid;
      place-items: center;
      width: 44px;
      border: 0;
      background: none;
      cursor: pointer;
    }

    button:disabled {
      opacity: 0.4;
      cursor: default;
    }

    input {
      width: 44px;
      border: 0;
      background: none;
      font: var(--fw-figure);
      font-size: 16px;
      text-align: center;
      appearance: textfield;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class QuantityField {
  readonly label = input.required<string>();
  readonly quantity = model.required<number>();

  protected readonly most = MOST;

  protected step(by: number): void {
    this.quantity.update((quantity) => Math.max(1, Math.min(MOST, quantity + by)));
  }

  protected take(event: Event): void {
    if (!(event.target instanceof HTMLInputElement)) return;
    const typed = Math.round(event.target.valueAsNumber);
    const quantity = Number.isFinite(typed) ? Math.max(1, Math.min(MOST, typed)) : this.quantity();
    this.quantity.set(quantity);
    // What was typed and is not taken must not stay in the field.
    event.target.value = String(quantity);
  }
}
