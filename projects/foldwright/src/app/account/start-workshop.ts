import { ChangeDetectionStrategy, Component, inject, signal } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule } from '@angular/forms';
import { MatButtonModule } from '@angular/material/button';
import { Router } from '@angular/router';
import { newIdempotencyKey } from '../api/api-client';
import { LiveEvents } from '../api/live-events';
import { Notices } from '../api/notices';
import { SessionApi } from '../api/session-api';
import { workshopForm } from './workshop-fields';

/** Start another workshop with the account one has. */
@Component({
  selector: 'fw-start-workshop',
  imports: [MatButtonModule, ReactiveFormsModule],
  template: `
    <form [formGroup]="form" (ngSubmit)="start()">
      <label class="fw-field">
        <span>Start another workshop</span>
        <input maxlength="80" placeholder="its name" formControlName="workshopName" />
        @if (form.controls.workshopName.touched && form.controls.workshopName.invalid) {
          <small class="fw-wrong">Type what it is called.</small>
        }
      </label>
      <label class="fw-field">
        <span>Part numbers begin with</span>
        <input maxlength="4" placeholder="LC" formControlName="numberPrefix" />
        @if (form.controls.numberPrefix.touched && form.controls.numberPrefix.invalid) {
          <small class="fw-wrong">One to four capital letters.</small>
        }
      </label>
      <button matButton="outlined" type="submit" [disabled]="isBusy()">Start it</button>
    </form>
  `,
  styles: `
    form {
      display: flex;
      flex-wrap: wrap;
      gap: 12px;
      align-items: flex-end;
      margin-top: 14px;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class StartWorkshop {
  private readonly session = inject(SessionApi);
  private readonly notices = inject(Notices);
  private readonly router = inject(Router);
  private readonly live = inject(LiveEvents);
  /** The workshop whose answer never came, with its key: tried again it is the same one. */
  private unanswered: { readonly name: string; readonly key: string } | null = null;

  protected readonly form = workshopForm(inject(NonNullableFormBuilder));
  protected readonly isBusy = signal(false);

  protected async start(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid || this.isBusy()) return;
    this.isBusy.set(true);
    try {
      const wish = this.form.getRawValue();
      const name = wish.workshopName;
      const key = this.unanswered?.name === name ? this.unanswered.key : newIdempotencyKey();
      this.unanswered = { name, key };
      await this.session.createWorkshop(wish, key);
      this.live.restart();
      await this.router.navigateByUrl('/parts');
    } catch (error) {
      this.notices.showProblem(error);
    } finally {
      this.isBusy.set(false);
    }
  }
}
