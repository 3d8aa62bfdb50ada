import { ChangeDetectionStrategy, Component, inject, input, output } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButtonModule } from '@angular/material/button';
import { OnceCall } from '../api/once-call';
import { StockApi } from '../api/stock-api';

/** Correct what lies on the shelf, with a reason. */
@Component({
  selector: 'fw-adjust-form',
  imports: [MatButtonModule, ReactiveFormsModule],
  template: `
    <form [formGroup]="form" (ngSubmit)="send()">
      <label class="fw-field">
        <span>Correct by</span>
        <input type="number" step="1" formControlName="change" />
        <small>−1 when one is missing, 2 when two more lie there</small>
      </label>
      <label class="fw-field reason">
        <span>Reason</span>
        <input maxlength="200" formControlName="reason" />
        @if (form.controls.reason.touched && form.controls.reason.invalid) {
          <small class="fw-wrong">Say why; it stands in the books.</small>
        }
      </label>
      <button matButton="outlined" type="submit" [disabled]="once.isBusy()">Correct the shelf</button>
    </form>
  `,
  styles: `
    form {
      display: flex;
      flex-wrap: wrap;
      gap: 12px;
      align-items: flex-start;
      margin: 10px 0 16px;
    }

    .reason {
      flex: 1;
      min-width: 220px;
    }

    button {
      margin-top: 20px;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class AdjustForm {
  private readonly api = inject(StockApi);

  readonly positionId = input.required<string>();
  readonly done = output<void>();

  protected readonly once = new OnceCall();
  protected readonly form = inject(NonNullableFormBuilder).group({
    change: [-1, [Validators.required, Validators.pattern(/^-?[1-9]\d*$/)]],
    reason: ['', [Validators.required, Validators.maxLength(200)]],
  });

  protected async send(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid) return;
    const { change, reason } = this.form.getRawValue();
    const done = await this.once.run((key) => this.api.adjust(this.positionId(), change, reason, key));
    if (done === undefined) return;
    this.form.reset();
    this.done.emit();
  }
}
