import { ChangeDetectionStrategy, Component, computed, effect, inject, input, output, untracked } from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import {
  FormArray,
  type FormControl,
  type FormGroup,
  NonNullableFormBuilder,
  ReactiveFormsModule,
  Validators,
} from '@angular/forms';
import { MatButtonModule } from '@angular/material/button';
import type { Sale } from '@foldwright/shared/contracts/sales';
import { MoneyText } from '@foldwright/ui/money-text/money-text';
import { ShopDeskApi } from '../api/shop-desk-api';
import { OnceCall } from '../api/once-call';

type Row = FormGroup<{ lineId: FormControl<string>; quantity: FormControl<number> }>;

/** Cancel what has not been sent, of some lines or all; the sum that goes back is said before. */
@Component({
  selector: 'fw-cancel-form',
  imports: [MatButtonModule, MoneyText, ReactiveFormsModule],
  template: `
    <form class="fw-paper" [formGroup]="form" (ngSubmit)="send()">
      <h3>What is cancelled</h3>
      @for (row of rows.controls; track row; let at = $index) {
        <label class="line" [formGroup]="row">
          <span>{{ lines()[at]?.title }}, up to {{ lines()[at]?.left }}</span>
          <input type="number" min="0" [max]="lines()[at]?.left ?? 0" step="1" formControlName="quantity" />
        </label>
      }
      <label class="fw-field">
        <span>Reason, told to the customer</span>
        <input maxlength="200" formControlName="reason" />
        @if (form.controls.reason.touched && form.controls.reason.invalid) {
          <small class="fw-wrong">Say why.</small>
        }
      </label>
      @if (isPaid()) {
        <p>
          Goes back for these lines: <fw-money-text [amount]="back()" />, and the postage when nothing is left to send.
        </p>
      }
      <div class="fw-acts">
        <button matButton="filled" type="submit" [disabled]="call.isBusy()">Cancel it and tell the customer</button>
      </div>
    </form>
  `,
  styleUrl: './desk-form.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class CancelForm {
  private readonly api = inject(ShopDeskApi);
  private readonly builder = inject(NonNullableFormBuilder);
  protected readonly call = new OnceCall();

  readonly sale = input.required<Sale>();
  readonly done = output<Sale>();

  protected readonly lines = computed(() =>
    this.sale().lines.map((line) => ({ ...line, left: line.quantity - line.cancelled })),
  );
  protected readonly isPaid = computed(() => this.sale().state !== 'placed');
  protected readonly rows = new FormArray<Row>([]);
  protected readonly form = this.builder.group({ reason: ['', [Validators.required, Validators.maxLength(200)]] });
  private readonly typed = toSignal(this.rows.valueChanges);
  protected readonly back = computed(() => {
    this.typed();
    const amountMinor = this.rows
      .getRawValue()
      .reduce((sum, { quantity }, at) => sum + quantity * (this.lines()[at]?.each.amountMinor ?? 0), 0);
    return { amountMinor: Math.round(amountMinor), currency: this.sale().totals.total.currency };
  });

  constructor() {
    effect(() => {
      const lines = this.lines();
      const isPaid = this.isPaid();
      untracked(() => {
        this.rows.clear();
        for (const { id, left } of lines) {
          const limits = [Validators.min(0), Validators.max(left)];
          // What is not paid is cancelled as a whole.
          this.rows.push(this.builder.group({ lineId: [id], quantity: [isPaid ? 0 : left, limits] }));
        }
      });
    });
  }

  protected async send(): Promise<void> {
    this.form.markAllAsTouched();
    const lines = this.rows.getRawValue().filter(({ quantity }) => quantity > 0);
    if (this.form.invalid || this.rows.invalid || lines.length === 0) return;
    const body = { lines, reason: this.form.getRawValue().reason };
    const sale = await this.call.run((key) => this.api.cancel(this.sale(), body, key));
    if (sale !== undefined) this.done.emit(sale);
  }
}
