import { ChangeDetectionStrategy, Component, computed, inject, input, output } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButtonModule } from '@angular/material/button';
import type { Sale } from '@foldwright/shared/contracts/sales';
import { parseMoneyMinor } from '@foldwright/shared/units/money';
import { ShopDeskApi } from '../api/shop-desk-api';
import { OnceCall } from '../api/once-call';
import { itemWords } from './item-words';

/** Take a shipped piece back, on the shelf or to scrap, with the money that goes back for it. */
@Component({
  selector: 'fw-return-form',
  imports: [MatButtonModule, ReactiveFormsModule],
  template: `
    <form class="fw-paper" [formGroup]="form" (ngSubmit)="send()">
      <h3>What came back</h3>
      <div class="pair">
        <label class="fw-field">
          <span>Piece</span>
          <select formControlName="itemId">
            <option value="">Choose</option>
            @for (row of sent(); track row.id) {
              <option [value]="row.id">{{ row.words }}</option>
            }
          </select>
          @if (form.controls.itemId.touched && form.controls.itemId.invalid) {
            <small class="fw-wrong">Choose what came back.</small>
          }
        </label>
        <label class="fw-field">
          <span>How many</span>
          <input type="number" min="1" step="1" formControlName="quantity" />
        </label>
        <label class="fw-field">
          <span>Money back for it</span>
          <input inputmode="decimal" formControlName="refund" />
          @if (form.controls.refund.touched && refundMinor() === null) {
            <small class="fw-wrong">Type an amount up to what is left, or 0.</small>
          }
        </label>
      </div>
      <label class="check"><input type="checkbox" formControlName="isBackOnShelf" />It goes back on the shelf</label>
      <label class="fw-field">
        <span>Reason</span>
        <input maxlength="200" formControlName="reason" />
        @if (form.controls.reason.touched && form.controls.reason.invalid) {
          <small class="fw-wrong">Say why.</small>
        }
      </label>
      <div class="fw-acts">
        <button matButton="filled" type="submit" [disabled]="call.isBusy()">Take it back</button>
      </div>
    </form>
  `,
  styleUrl: './desk-form.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ReturnForm {
  private readonly api = inject(ShopDeskApi);
  protected readonly call = new OnceCall();

  readonly sale = input.required<Sale>();
  readonly done = output<Sale>();

  protected readonly sent = computed(() =>
    this.sale().items.flatMap((item) =>
      item.shipped > item.returned ? [{ id: item.id, words: itemWords(item) }] : [],
    ),
  );
  protected readonly form = inject(NonNullableFormBuilder).group({
    itemId: ['', Validators.required],
    quantity: [1, [Validators.required, Validators.min(1)]],
    refund: ['0.00', Validators.required],
    isBackOnShelf: [true],
    reason: ['', [Validators.required, Validators.maxLength(200)]],
  });

  protected refundMinor(): number | null {
    const sale = this.sale();
    const typed = parseMoneyMinor(this.form.getRawValue().refund, sale.totals.total.currency);
    return typed === null || typed > sale.can.refundMinor ? null : typed;
  }

  protected async send(): Promise<void> {
    this.form.markAllAsTouched();
    const refundMinor = this.refundMinor();
    if (this.form.invalid || refundMinor === null) return;
    const { itemId, quantity, isBackOnShelf, reason } = this.form.getRawValue();
    const body = { itemId, quantity, isBackOnShelf, refundMinor, reason };
    const sale = await this.call.run((key) => this.api.takeBack(this.sale(), body, key));
    if (sale !== undefined) this.done.emit(sale);
  }
}
