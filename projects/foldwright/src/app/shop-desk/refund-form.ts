import { ChangeDetectionStrategy, Component, computed, inject, input, output } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButtonModule } from '@angular/material/button';
import type { Sale } from '@foldwright/shared/contracts/sales';
import { parseMoneyMinor } from '@foldwright/shared/units/money';
import { MoneyText } from '@foldwright/ui/money-text/money-text';
import { ShopDeskApi } from '../api/shop-desk-api';
import { OnceCall } from '../api/once-call';

/** Send part of the money back, up to what is left of the payment. */
@Component({
  selector: 'fw-refund-form',
  imports: [MatButtonModule, MoneyText, ReactiveFormsModule],
  template: `
    <form class="fw-paper" [formGroup]="form" (ngSubmit)="send()">
      <h3>Money back to the customer</h3>
      <p>Up to <fw-money-text [amount]="most()" />.</p>
      <div class="pair">
        <label class="fw-field">
          <span>How much</span>
          <input inputmode="decimal" formControlName="amount" />
          @if (form.controls.amount.touched && amountMinor() === null) {
            <small class="fw-wrong">Type an amount up to what is left, for example 5.00.</small>
          }
        </label>
        <label class="fw-field">
          <span>Reason, told to the customer</span>
          <input maxlength="200" formControlName="reason" />
          @if (form.controls.reason.touched && form.controls.reason.invalid) {
            <small class="fw-wrong">Say why.</small>
          }
        </label>
      </div>
      <div class="fw-acts">
        <button matButton="filled" type="submit" [disabled]="call.isBusy()">Send it back</button>
      </div>
    </form>
  `,
  styleUrl: './desk-form.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class RefundForm {
  private readonly api = inject(ShopDeskApi);
  protected readonly call = new OnceCall();

  readonly sale = input.required<Sale>();
  readonly done = output<Sale>();

  protected readonly most = computed(() => ({
    amountMinor: this.sale().can.refundMinor,
    currency: this.sale().totals.total.currency,
  }));
  protected readonly form = inject(NonNullableFormBuilder).group({
    amount: ['', Validators.required],
    reason: ['', [Validators.required, Validators.maxLength(200)]],
  });

  protected amountMinor(): number | null {
    const { amountMinor, currency } = this.most();
    const typed = parseMoneyMinor(this.form.getRawValue().amount, currency);
    return typed === null || typed < 1 || typed > amountMinor ? null : typed;
  }

  protected async send(): Promise<void> {
    this.form.markAllAsTouched();
    const amountMinor = this.amountMinor();
    if (this.form.invalid || amountMinor === null) return;
    const body = { amountMinor, reason: this.form.getRawValue().reason };
    const sale = await this.call.run((key) => this.api.refund(this.sale().id, body, key));
    if (sale !== undefined) this.done.emit(sale);
  }
}
