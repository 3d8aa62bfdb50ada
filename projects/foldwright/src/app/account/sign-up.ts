import { ChangeDetectionStrategy, Component, inject, signal } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButtonModule } from '@angular/material/button';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInputModule } from '@angular/material/input';
import { Router, RouterLink } from '@angular/router';
import { LEAST_PASSWORD } from '@foldwright/shared/contracts/members';
import { BrandMark } from '@foldwright/ui/brand-mark/brand-mark';
import { FindingSign } from '@foldwright/ui/finding-note/finding-sign';
import { ApiProblem } from '../api/api-problem';
import { SessionApi } from '../api/session-api';
import { prefixOf, workshopForm } from './workshop-fields';

/** Start a workshop: an account, and the workshop it owns. */
@Component({
  selector: 'fw-sign-up',
  imports: [
    BrandMark,
    FindingSign,
    MatButtonModule,
    MatFormFieldModule,
    MatInputModule,
    ReactiveFormsModule,
    RouterLink,
  ],
  templateUrl: './sign-up.html',
  styleUrl: './plain-card.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SignUp {
  private readonly session = inject(SessionApi);
  private readonly router = inject(Router);
  private readonly builder = inject(NonNullableFormBuilder);

  protected readonly least = LEAST_PASSWORD;
  /** Address of who was signed in when the page was opened. */
  protected readonly signedInAs = signal<string | null>(null);
  protected readonly person = this.builder.group({
    name: ['', [Validators.required, Validators.maxLength(80)]],
    email: ['', [Validators.required, Validators.email]],
    password: ['', [Validators.required, Validators.minLength(LEAST_PASSWORD), Validators.maxLength(200)]],
  });
  protected readonly workshop = workshopForm(this.builder);
  protected readonly problem = signal<ApiProblem | null>(null);
  protected readonly isBusy = signal(false);

  constructor() {
    void this.run(async () => {
      this.signedInAs.set((await this.session.ensure()).user?.email ?? null);
    });
    const { workshopName, numberPrefix } = this.workshop.controls;
    workshopName.valueChanges.pipe(takeUntilDestroyed()).subscribe((name) => {
      // Only a proposal: what somebody typed stays.
      if (!numberPrefix.dirty) numberPrefix.setValue(prefixOf(name));
    });
  }

  protected async start(): Promise<void> {
    this.person.markAllAsTouched();
    this.workshop.markAllAsTouched();
    if (this.person.invalid || this.workshop.invalid) return;
    await this.run(async () => {
      await this.session.signUp({ ...this.person.getRawValue(), ...this.workshop.getRawValue() });
      await this.router.navigateByUrl('/parts');
    });
  }

  private async run(work: () => Promise<void>): Promise<void> {
    if (this.isBusy()) return;
    this.isBusy.set(true);
    this.problem.set(null);
    try {
      await work();
    } catch (error) {
      if (!(error instanceof ApiProblem)) throw error;
      this.problem.set(error);
    } finally {
      this.isBusy.set(false);
    }
  }
}
