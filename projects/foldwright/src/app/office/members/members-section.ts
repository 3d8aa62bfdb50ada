import {
  ChangeDetectionStrategy,
  Component,
  type ElementRef,
  afterRenderEffect,
  computed,
  inject,
  signal,
  viewChild,
} from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButtonModule } from '@angular/material/button';
import { Router } from '@angular/router';
import { type CrewRole, crewRole } from '@foldwright/shared/contracts/members';
import { dayWords } from '@foldwright/ui/date-text/date-words';
import { newIdempotencyKey } from '../../api/api-client';
import { type ApiProblem, problemFromError } from '../../api/api-problem';
import { MembersApi } from '../../api/members-api';
import { Notices } from '../../api/notices';
import { type Member, OfficeApi } from '../../api/office-api';
import { rereadOn } from '../../api/reread';
import { ROLE_WORDS } from '../../api/role-words';
import { SessionApi } from '../../api/session-api';

/** Something that can't be undone by the person who does it, so that it is asked first. */
interface Asked {
  readonly member: Member;
  /** Null when the member is to be removed. */
  readonly role: CrewRole | null;
  /** What was pressed: where the keyboard goes back to. */
  readonly from: HTMLElement | null;
}

type Outcome = 'done' | 'busy' | ApiProblem;

/** Who belongs to the workshop and as what; owners invite, change and remove. */
@Component({
  selector: 'fw-members-section',
  imports: [MatButtonModule, ReactiveFormsModule],
  templateUrl: './members-section.html',
  styleUrl: './members-section.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class MembersSection {
  private readonly api = inject(MembersApi);
  private readonly notices = inject(Notices);
  private readonly session = inject(SessionApi);
  private readonly router = inject(Router);

  protected readonly isOwner = computed(() => this.session.role() === 'owner');
  protected readonly members = inject(OfficeApi).members();
  protected readonly invitations = this.api.invitations(this.isOwner);
  protected readonly roles = crewRole.options.map((role) => ({ role, words: `${role}: ${ROLE_WORDS[role]}` }));
  protected readonly crew = computed(() =>
    (this.members.value()?.members ?? []).map((member) => ({
      ...member,
      isMe: member.userId === this.session.user()?.id,
    })),
  );
  protected readonly waiting = computed(() => {
    const now = new Date();
    return (this.invitations.value()?.invitations ?? []).map((invitation) => ({
      ...invitation,
      isOver: new Date(invitation.expiresAt) <= now,
      day: dayWords(invitation.expiresAt, now),
    }));
  });
  protected readonly asked = signal<Asked | null>(null);
  protected readonly isBusy = signal(false);
  protected readonly form = inject(NonNullableFormBuilder).group({
    email: ['', [Validators.required, Validators.email]],
    role: ['viewer' as CrewRole, Validators.required],
  });
  /** The invitation whose answer never came, with its key: tried again it is the same one, and one mail goes out. */
  private unanswered: { readonly wish: string; readonly key: string } | null = null;

  private readonly askBox = viewChild<ElementRef<HTMLElement>>('askBox');

  constructor() {
    afterRenderEffect(() => this.askBox()?.nativeElement.focus());
    rereadOn(['members-changed'], () => this.reload());
  }

  protected async invite(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid) return;
    const { email, role } = this.form.getRawValue();
    if ((await this.send(email.trim(), role)) === 'done') this.form.reset();
  }

  protected async send(email: string, role: CrewRole): Promise<Outcome> {
    const wish = `${role} ${email}`;
    const key = this.unanswered?.wish === wish ? this.unanswered.key : newIdempotencyKey();
    this.unanswered = { wish, key };
    const outcome = await this.run(() => this.api.invite(email, role, key));
    if (outcome === 'done') {
      this.unanswered = null;
      this.notices.showNews('The invitation is on its way', `To ${email}; its link works for seven days.`);
    } else if (outcome !== 'busy' && outcome.status >= 400 && outcome.status < 500) {
      this.unanswered = null;
    }
    return outcome;
  }

  protected async withdraw(invitationId: string): Promise<void> {
    await this.run(() => this.api.withdraw(invitationId));
  }

  protected async changeRole(member: Member & { readonly isMe: boolean }, select: HTMLSelectElement): Promise<void> {
    const role = crewRole.options.find((option) => option === select.value);
    if (role === undefined || role === member.role) return;
    // The list says what is stored, whatever was chosen, until the server has taken it.
    select.value = member.role;
    if (member.isMe) this.asked.set({ member, role, from: select });
    else await this.run(() => this.api.changeRole(member.userId, role, member.revision));
  }

  protected askToRemove(member: Member, { currentTarget }: Event): void {
    this.asked.set({ member, role: null, from: currentTarget instanceof HTMLElement ? currentTarget : null });
  }

  protected leaveAsItIs({ from }: Asked): void {
    this.asked.set(null);
    from?.focus();
  }

  protected async doAsked({ member, role }: Asked): Promise<void> {
    this.asked.set(null);
    const { userId, revision } = member;
    const outcome = await this.run(() =>
      role === null ? this.api.remove(userId, revision) : this.api.changeRole(userId, role, revision),
    );
    if (outcome !== 'done' || userId !== this.session.user()?.id) return;
    const before = this.session.current()?.workshopId;
    const { current } = await this.session.refresh();
    if (current?.workshopId !== before) await this.router.navigateByUrl('/');
  }

  /** Does one thing at a time; what was wrong is told here. */
  private async run(call: () => Promise<unknown>): Promise<Outcome> {
    if (this.isBusy()) return 'busy';
    this.isBusy.set(true);
    try {
      await call();
      return 'done';
    } catch (error) {
      this.notices.showProblem(error);
      return problemFromError(error);
    } finally {
      this.isBusy.set(false);
      this.reload();
    }
  }

  private reload(): void {
    this.members.reload();
    this.invitations.reload();
  }
}
