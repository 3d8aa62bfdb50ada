import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButtonModule } from '@angular/material/button';
import type { Layout } from '@foldwright/shared/bending/layout';
import { dayWords } from '@foldwright/ui/date-text/date-words';
import { type NewTalk, ReviewTalk, type TalkOpinion } from '@foldwright/ui/review-talk/review-talk';
import { newIdempotencyKey } from '../../api/api-client';
import { Notices } from '../../api/notices';
import { rereadOn } from '../../api/reread';
import { ReviewsApi } from '../../api/reviews-api';

/** What the workshop and its guests say of a released revision, and the private links that guests come by. */
@Component({
  selector: 'fw-revision-reviews',
  imports: [MatButtonModule, ReactiveFormsModule, ReviewTalk],
  templateUrl: './revision-reviews.html',
  styles: `
    h3 {
      margin: 18px 0 8px;
    }

    form {
      display: flex;
      flex-wrap: wrap;
      gap: 10px 14px;
      align-items: flex-end;
    }

    .made {
      margin-top: 10px;
      padding: 10px 12px;
      border-radius: 4px;
      background: var(--fw-know-tint);
      font: 400 14px/20px var(--fw-sans);
      overflow-wrap: anywhere;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class RevisionReviews {
  private readonly api = inject(ReviewsApi);
  private readonly notices = inject(Notices);

  readonly partId = input.required<string>();
  readonly revisionId = input.required<string>();
  readonly layout = input.required<Layout>();
  readonly canEdit = input.required<boolean>();

  protected readonly read = this.api.ofPart(this.partId);
  protected readonly isBusy = signal(false);
  /** Shown once, when it was made. */
  protected readonly made = signal<string | null>(null);
  private readonly now = new Date();
  protected readonly comments = computed(() =>
    (this.read.value()?.comments ?? []).filter(({ revisionId }) => revisionId === this.revisionId()),
  );
  protected readonly opinions = computed(() =>
    (this.read.value()?.opinions ?? []).filter(({ revisionId }) => revisionId === this.revisionId()),
  );
  protected readonly links = computed(() =>
    (this.read.value()?.links ?? [])
      .filter(({ revisionId }) => revisionId === this.revisionId())
      .map((link) => ({ ...link, until: dayWords(link.expiresAt, this.now) })),
  );
  protected readonly form = inject(NonNullableFormBuilder).group({
    guestName: ['', [Validators.required, Validators.maxLength(80)]],
    guestEmail: ['', Validators.email],
    days: [14, [Validators.required, Validators.min(1), Validators.max(90)]],
  });

  constructor() {
    rereadOn(['part-changed'], () => this.read.reload());
  }

  protected comment({ place, text }: NewTalk): Promise<void> {
    return this.run(() => this.api.comment(this.partId(), this.revisionId(), place, text, newIdempotencyKey()));
  }

  protected judge({
    verdict,
    note,
  }: {
    readonly verdict: TalkOpinion['verdict'];
    readonly note: string;
  }): Promise<void> {
    return this.run(() => this.api.giveOpinion(this.revisionId(), verdict, note, newIdempotencyKey()));
  }

  protected resolve({ id, isResolved }: { readonly id: string; readonly isResolved: boolean }): Promise<void> {
    return this.run(() => this.api.resolve(id, isResolved));
  }

  protected withdraw(reviewLinkId: string): Promise<void> {
    return this.run(() => this.api.withdrawLink(reviewLinkId));
  }

  protected async makeLink(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid) return;
    const { guestName, guestEmail, days } = this.form.getRawValue();
    const body = { guestName, guestEmail: guestEmail.trim() === '' ? null : guestEmail.trim(), days };
    await this.run(async () => {
      this.made.set((await this.api.makeLink(this.revisionId(), body, newIdempotencyKey())).link);
      this.form.reset();
    });
  }

  private async run(call: () => Promise<unknown>): Promise<void> {
    if (this.isBusy()) return;
    this.isBusy.set(true);
    try {
      await call();
    } catch (error) {
      this.notices.showProblem(error);
    } finally {
      this.isBusy.set(false);
      this.read.reload();
    }
  }
}
