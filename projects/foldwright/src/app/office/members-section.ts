import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButtonModule } from '@angular/material/button';
import { type CrewRole, crewRole } from '@foldwright/shared/contracts/members';
import { dayWords } from '@foldwright/ui/date-text/date-words';
import { newIdempotencyKey } from '../api/api-client';
import { MembersApi } from '../api/members-api';
import { Notices } from '../api/notices';
import { type Member, OfficeApi } from '../api/office-api';
import { SessionApi } from '../api/session-api';

const ROLE_WORDS: Readonly<Record<CrewRole, string>> = {
  owner: 'owner: everything, money and members too',
  fabricator: 'fabricator: parts, stock and parcels',
  viewer: 'viewer: looks, comments, changes nothing',
};

/** Who belongs to the workshop and as what; owners invite, change and remove. */
@Component({
  selector: 'fw-members-section',
  imports: [MatButtonModule, ReactiveFormsModule],
  templateUrl: './members-section.html',
  styles: `
    form {
      display: flex;
      flex-wrap: wrap;
      gap: 12px 16px;
      align-items: flex-end;
      margin: 14px 0;
    }

    .wide {
      flex: 1 1 240px;
      max-width: 420px;
    }

    select.role {
      min-height: var(--fw-target);
      padding: 4px 8px;
      border: 1.5px solid var(--fw-steel);
      border-radius: var(--fw-r-deburr);
      background: var(--fw-paper);
    }

    h3 {
      margin: 18px 0 6px;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class MembersSection {
  private readonly api = inject(MembersApi);
  private readonly notices = inject(Notices);
  private readonly session = inject(SessionApi);

  protected readonly isOwner = computed(() => this.session.role() === 'owner');
  protected readonly me = this.session.user;
  protected readonly members = inject(OfficeApi).members();
  protected readonly invitations = this.api.invitations(this.isOwner);
  protected readonly roles = crewRole.options.map((role) => ({ role, words: ROLE_WORDS[role] }));
  /** Customers come through the shop; they are no crew. */
  protected readonly crew = computed(() =>
    (this.members.value()?.members ?? []).filter(({ role }) => role !== 'customer'),
  );
  private readonly now = new Date();
  protected readonly waiting = computed(() =>
    (this.invitations.value()?.invitations ?? []).map((invitation) => ({
      ...invitation,
      until: dayWords(invitation.expiresAt, this.now),
    })),
  );
  protected readonly isBusy = signal(false);
  protected readonly form = inject(NonNullableFormBuilder).group({
    email: ['', [Validators.required, Validators.email]],
    role: ['viewer' as CrewRole, Validators.required],
  });
  private key = newIdempotencyKey();

  protected async invite(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid) return;
    const { email, role } = this.form.getRawValue();
    const isDone = await this.run(() => this.api.invite(email, role, this.key));
    this.key = newIdempotencyKey();
    if (isDone) this.form.reset();
  }

  protected inviteAgain(email: string, role: CrewRole): Promise<boolean> {
    return this.run(() => this.api.invite(email, role, newIdempotencyKey()));
  }

  protected withdraw(invitationId: string): Promise<boolean> {
    return this.run(() => this.api.withdraw(invitationId));
  }

  protected changeRole(member: Member, event: Event): void {
    if (!(event.target instanceof HTMLSelectElement)) return;
    const role = crewRole.options.find((option) => option === (event.target as HTMLSelectElement).value);
    if (role !== undefined) void this.run(() => this.api.changeRole(member.userId, role, member.revision));
  }

  protected remove(member: Member): Promise<boolean> {
    return this.run(() => this.api.remove(member.userId, member.revision));
  }

  private async run(call: () => Promise<unknown>): Promise<boolean> {
    if (this.isBusy()) return false;
    this.isBusy.set(true);
    try {
      await call();
      return true;
    } catch (error) {
      this.notices.showProblem(error);
      return false;
    } finally {
      this.isBusy.set(false);
      this.members.reload();
      this.invitations.reload();
    }
  }
}
