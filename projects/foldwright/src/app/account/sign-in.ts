import { ChangeDetectionStrategy, Component, type ElementRef, inject, input, signal, viewChild } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButtonModule } from '@angular/material/button';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInputModule } from '@angular/material/input';
import { Router, RouterLink } from '@angular/router';
import { BrandMark } from '@foldwright/ui/brand-mark/brand-mark';
import { FindingSign } from '@foldwright/ui/finding-note/finding-sign';
import { ApiProblem } from '../api/api-problem';
import { localAddress } from '../api/local-address';
import { SessionApi } from '../api/session-api';

/** Sign-in with e-mail and password; says in place what is wrong and keeps what was typed. */
@Component({
  selector: 'fw-sign-in',
  imports: [
    BrandMark,
    FindingSign,
    MatButtonModule,
    MatFormFieldModule,
    MatInputModule,
    ReactiveFormsModule,
    RouterLink,
  ],
  templateUrl: './sign-in.html',
  styleUrl: './sign-in.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SignIn {
  private readonly session = inject(SessionApi);
  private readonly router = inject(Router);
  private readonly form = inject(NonNullableFormBuilder);

  /** Where the person wanted to go. */
  readonly to = input<string>();

  private readonly passwordField = viewChild.required<ElementRef<HTMLInputElement>>('passwordField');

  protected readonly controls = this.form.group({
    email: ['', [Validators.required, Validators.email]],
    password: ['', [Validators.required, Validators.maxLength(200)]],
  });
  protected readonly problem = signal<ApiProblem | null>(null);
  protected readonly isSending = signal(false);

  protected async signIn(): Promise<void> {
    this.controls.markAllAsTouched();
    if (this.controls.invalid || this.isSending()) return;
    this.isSending.set(true);
    this.problem.set(null);
    try {
      const { email, password } = this.controls.getRawValue();
      await this.session.signIn(email.trim(), password);
      await this.router.navigateByUrl(localAddress(this.to()));
    } catch (error) {
      if (!(error instanceof ApiProblem)) throw error;
      this.problem.set(error);
      this.passwordField().nativeElement.select();
    } finally {
      this.isSending.set(false);
    }
  }
}
