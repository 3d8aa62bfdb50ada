import { ChangeDetectionStrategy, Component, computed, effect, inject, input, output, untracked } from '@angular/core';
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
import { ShopDeskApi } from '../api/shop-desk-api';
import { OnceCall } from '../api/once-call';
import { itemWords } from './item-words';

type Row = FormGroup<{ itemId: FormControl<string>; quantity: FormControl<number> }>;

/** Send a parcel: what goes into it of what is on the shelf for the sale, with whom, under which tracking code. */
@Component({
  selector: 'fw-parcel-form',
  imports: [MatButtonModule, ReactiveFormsModule],
  template: `
    <form class="fw-paper" [formGroup]="form" (ngSubmit)="send()">
      <h3>What goes into the parcel</h3>
      @for (row of rows.controls; track row; let at = $index) {
        <label class="line" [formGroup]="row">
          <span>{{ ready()[at]?.words }}, up to {{ ready()[at]?.item?.reserved }}</span>
          <input type="number" min="0" [max]="ready()[at]?.item?.reserved ?? 0" step="1" formControlName="quantity" />
        </label>
      }
      <div class="pair">
        <label class="fw-field">
          <span>Carrier</span>
          <input maxlength="60" formControlName="carrier" />
          @if (form.controls.carrier.touched && form.controls.carrier.invalid) {
            <small class="fw-wrong">Say with whom it goes.</small>
          }
        </label>
        <label class="fw-field">
          <span>Tracking code, if there is one</span>
          <input maxlength="60" formControlName="trackingCode" />
        </label>
      </div>
      <div class="fw-acts">
        <button matButton="filled" type="submit" [disabled]="call.isBusy()">Send it and tell the customer</button>
      </div>
    </form>
  `,
  styleUrl: './desk-form.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ParcelForm {
  private readonly api = inject(ShopDeskApi);
  private readonly builder = inject(NonNullableFormBuilder);
  protected readonly call = new OnceCall();

  readonly sale = input.required<Sale>();
  readonly done = output<Sale>();

  protected readonly ready = computed(() =>
    this.sale().items.flatMap((item) => (item.reserved > 0 ? [{ item, words: itemWords(item) }] : [])),
  );
  protected readonly rows = new FormArray<Row>([]);
  protected readonly form = this.builder.group({
    carrier: ['', [Validators.required, Validators.maxLength(60)]],
    trackingCode: ['', Validators.maxLength(60)],
  });

  constructor() {
    effect(() => {
      const ready = this.ready();
      untracked(() => {
        this.rows.clear();
        for (const { item } of ready) {
          const limits = [Validators.min(0), Validators.max(item.reserved), Validators.pattern(/^\d+$/)];
          this.rows.push(this.builder.group({ itemId: [item.id], quantity: [item.reserved, limits] }));
        }
      });
    });
  }

  protected async send(): Promise<void> {
    this.form.markAllAsTouched();
    const items = this.rows.getRawValue().filter(({ quantity }) => quantity > 0);
    if (this.form.invalid || this.rows.invalid || items.length === 0) return;
    const { carrier, trackingCode } = this.form.getRawValue();
    const body = { items, carrier, trackingCode: trackingCode.trim() === '' ? null : trackingCode };
    const sale = await this.call.run((key) => this.api.ship(this.sale(), body, key));
    if (sale !== undefined) this.done.emit(sale);
  }
}
