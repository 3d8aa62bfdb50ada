import { ChangeDetectionStrategy, Component, computed, effect, inject, input, output } from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButtonModule } from '@angular/material/button';
import type { Arrival } from '@foldwright/shared/contracts/stock';
import { FINISHES } from '@foldwright/shared/stock/finishes';
import { finishWords } from '@foldwright/ui/formed-preview/finish-look';
import { OnceCall } from '../api/once-call';
import { StockApi } from '../api/stock-api';

/** Put brackets or hardware on the shelf: what an order made, or anything, with what it came from in words. */
@Component({
  selector: 'fw-receive-form',
  imports: [MatButtonModule, ReactiveFormsModule],
  template: `
    <form class="fw-paper" [formGroup]="form" (ngSubmit)="send()">
      @if (arrival(); as made) {
        <p class="wide">
          <b>{{ made.bracket.partNumber }} {{ made.bracket.partName }}, revision {{ made.bracket.letter }}</b>
          <span class="fw-soft"
            >from order {{ made.orderNumber }}; brackets arrive bare, choose the finish they have now</span
          >
        </p>
      } @else {
        <label class="fw-field wide">
          <span>What</span>
          <select formControlName="what">
            <option value="">Choose a bracket or hardware</option>
            <optgroup label="Brackets">
              @for (bracket of brackets(); track bracket.revisionId) {
                <option [value]="'b:' + bracket.revisionId">
                  {{ bracket.partNumber }} {{ bracket.partName }}, revision {{ bracket.letter }}
                </option>
              }
            </optgroup>
            <optgroup label="Hardware">
              @for (row of hardware(); track row.hardware.id) {
                <option [value]="'h:' + row.hardware.id">
                  {{ row.hardware.name }}, {{ row.hardware.specification }}
                </option>
              }
            </optgroup>
          </select>
          @if (form.controls.what.touched && form.controls.what.invalid) {
            <small class="fw-wrong">Choose what came in.</small>
          }
        </label>
      }
      @if (isBracket()) {
        <label class="fw-field">
          <span>Finish</span>
          <select formControlName="finishId">
            @for (finish of finishes; track finish.id) {
              <option [value]="finish.id">{{ finish.words }}</option>
            }
          </select>
        </label>
      }
      <label class="fw-field">
        <span>How many</span>
        <input type="number" min="1" step="1" formControlName="quantity" />
      </label>
      <label class="fw-field wide">
        <span>Where from</span>
        <input maxlength="200" placeholder="counted, bought, back from the coat shop" formControlName="reason" />
      </label>
      <div class="fw-acts">
        <button matButton="filled" type="submit" [disabled]="once.isBusy()">Put it on the shelf</button>
        <button matButton="outlined" type="button" (click)="cancelled.emit()">Leave it</button>
      </div>
    </form>
  `,
  styles: `
    form {
      display: flex;
      flex-wrap: wrap;
      gap: 12px 16px;
      align-items: flex-end;
    }

    .wide {
      flex: 1 1 260px;
    }

    p > * {
      display: block;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ReceiveForm {
  private readonly api = inject(StockApi);

  /** What an order made; null for anything else. */
  readonly arrival = input<Arrival | null>(null);
  readonly done = output<void>();
  readonly cancelled = output<void>();

  private readonly released = this.api.brackets();
  private readonly stock = this.api.stock();
  protected readonly brackets = computed(() => this.released.value()?.brackets ?? []);
  protected readonly hardware = computed(() => this.stock.value()?.hardware ?? []);
  protected readonly finishes = FINISHES.map(({ id }) => ({ id, words: finishWords(id) }));
  protected readonly once = new OnceCall();
  protected readonly form = inject(NonNullableFormBuilder).group({
    what: ['', Validators.required],
    finishId: ['bare', Validators.required],
    quantity: [1, [Validators.required, Validators.min(1), Validators.pattern(/^\d+$/)]],
    reason: ['', Validators.maxLength(200)],
  });
  private readonly what = toSignal(this.form.controls.what.valueChanges, { initialValue: '' });
  protected readonly isBracket = computed(() => this.what().startsWith('b:'));

  constructor() {
    effect(() => {
      const arrival = this.arrival();
      if (arrival === null) return;
      const { bracket, quantity } = arrival;
      this.form.patchValue({ what: `b:${bracket.revisionId}`, quantity });
    });
  }

  protected async send(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid) return;
    const { what, finishId, quantity, reason } = this.form.getRawValue();
    const id = what.slice(2);
    const target = what.startsWith('b:')
      ? ({ kind: 'bracket', revisionId: id, finishId } as const)
      : ({ kind: 'hardware', hardwareId: id } as const);
    const receipt = { what: target, quantity, orderId: this.arrival()?.orderId ?? null, reason };
    if ((await this.once.run((key) => this.api.receive(receipt, key))) !== undefined) this.done.emit();
  }
}
