import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButtonModule } from '@angular/material/button';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInputModule } from '@angular/material/input';
import { Router, RouterLink } from '@angular/router';
import { LEAST_PASSWORD, endedInvitation } from '@foldwright/shared/contracts/members';
import { BrandMark } from '@foldwright/ui/brand-mark/brand-mark';
import { FindingSign } from '@foldwright/ui/finding-note/finding-sign';
import { ApiProblem } from '../api/api-problem';
import { MembersApi } from '../api/members-api';
import { ROLE_WORDS } from '../api/role-words';
import { SessionApi } from '../api/session-api';

/** An invitation behind its link: join with the account of the address, or make one. */
@Component({
  selector: 'fw-invitation-page',
  imports: [
    BrandMark,
    FindingSign,
    MatButtonModule,
    MatFormFieldModule,
    MatInputModule,
    ReactiveFormsModule,
    RouterLink,
  ],
  templateUrl: './invitation-page.html',
  styleUrl: './plain-card.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class InvitationPage {
  private readonly session = inject(SessionApi);
  private readonly router = inject(Router);

  readonly link = input.required<string>();

  protected readonly read = inject(MembersApi).invitation(this.link);
  protected readonly user = this.session.user;
  /** Until the session is known nobody is asked for a name they may have. */
  protected readonly isKnown = computed(() => this.session.session() !== null);
  protected readonly may = ROLE_WORDS;
  protected readonly isUsed = computed(() => this.read.problem()?.extra(endedInvitation)?.reason === 'used');
  protected readonly least = LEAST_PASSWORD;
  protected readonly here = computed(() => `/invitation/${this.link()}`);
  protected readonly isMine = computed(() => this.user()?.email === this.read.value()?.email);
  protected readonly form = inject(NonNullableFormBuilder).group({
    name: ['', [Validators.required, Validators.maxLength(80)]],
    password: ['', [Validators.required, Validators.minLength(LEAST_PASSWORD), Validators.maxLength(200)]],
  });
  protected readonly problem = signal<ApiProblem | null>(null);
  protected readonly isBusy = signal(false);

  constructor() {
    void this.run(async () => {
      await this.session.ensure();
    });
  }

  protected async joinAsNew(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.valid) await this.join(this.form.getRawValue());
  }

  protected async join(account: { readonly name: string; readonly password: string } | null): Promise<void> {
    await this.run(async () => {
      try {
        await this.session.join(this.link(), account);
      } catch (error) {
        // Withdrawn or replaced meanwhile: the page says so in place of the form.
        if (error instanceof ApiProblem && error.slug === 'invitation-ended') return this.read.reload();
        throw error;
      }
      await this.router.navigateByUrl('/');
    });
  }

  protected async signOut(): Promise<void> {
    await this.run(async () => {
      await this.session.signOut();
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
