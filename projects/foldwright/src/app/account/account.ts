import { ChangeDetectionStrategy, Component, inject, signal } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButtonModule } from '@angular/material/button';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInputModule } from '@angular/material/input';
import { ApiProblem } from '../api/api-problem';
import { Notices } from '../api/notices';
import { SessionApi } from '../api/session-api';
import { StartWorkshop } from './start-workshop';

/** The person's own page: the name others see, and the workshops they belong to. */
@Component({
  selector: 'fw-account',
  imports: [MatButtonModule, MatFormFieldModule, MatInputModule, ReactiveFormsModule, StartWorkshop],
  templateUrl: './account.html',
  styleUrl: './account.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { class: 'fw-page' },
})
export class Account {
  private readonly session = inject(SessionApi);
  private readonly notices = inject(Notices);
  private readonly form = inject(NonNullableFormBuilder);

  protected readonly user = this.session.user;
  protected readonly memberships = this.session.memberships;
  protected readonly current = this.session.current;
  protected readonly name = this.form.control(this.user()?.name ?? '', [
    Validators.required,
    Validators.pattern(/\S/),
    Validators.maxLength(80),
  ]);
  protected readonly nameProblem = signal<string | null>(null);
  protected readonly isSaving = signal(false);

  protected async keepName(): Promise<void> {
    this.name.markAsTouched();
    if (this.name.invalid || this.isSaving()) return;
    this.isSaving.set(true);
    this.nameProblem.set(null);
    try {
      await this.session.changeOwnName(this.name.value.trim());
      this.notices.showNews('Your name is changed', 'Others see it from now on.');
    } catch (error) {
      if (!(error instanceof ApiProblem)) throw error;
      this.nameProblem.set(error.fieldError('/name') ?? error.details.detail);
    } finally {
      this.isSaving.set(false);
    }
  }
}
