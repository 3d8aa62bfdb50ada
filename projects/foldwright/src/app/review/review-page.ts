import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { layOutMesh } from '@foldwright/shared/bending/formed-mesh';
import { developPart } from '@foldwright/shared/part/develop-part';
import { BrandMark } from '@foldwright/ui/brand-mark/brand-mark';
import { dayWords } from '@foldwright/ui/date-text/date-words';
import { FormedPreview } from '@foldwright/ui/formed-preview/formed-preview';
import { NoticeCard } from '@foldwright/ui/notice-card/notice-card';
import { FoldArc, type FoldChange } from '@foldwright/ui/part-viewer/fold-arc';
import { PartViewer } from '@foldwright/ui/part-viewer/part-viewer';
import { type NewTalk, ReviewTalk, type TalkOpinion } from '@foldwright/ui/review-talk/review-talk';
import { newIdempotencyKey } from '../api/api-client';
import { Notices } from '../api/notices';
import { ReviewsApi } from '../api/reviews-api';
import { SessionApi } from '../api/session-api';

const CHORD_MM = 0.25;
const HANDS = { either: '', left: ', left hand', right: ', right hand' } as const;

/** One revision of one part for somebody without an account: look, turn, fold, comment, agree or ask for changes. */
@Component({
  selector: 'fw-review-page',
  imports: [BrandMark, FoldArc, FormedPreview, NoticeCard, PartViewer, ReviewTalk],
  templateUrl: './review-page.html',
  styleUrl: './review-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ReviewPage {
  private readonly api = inject(ReviewsApi);
  protected readonly notices = inject(Notices);

  readonly link = input.required<string>();

  protected readonly read = this.api.review(this.link);
  protected readonly review = this.read.value;
  protected readonly isBusy = signal(false);
  protected readonly fold = signal(1);
  protected readonly isHeld = signal(false);
  private readonly now = new Date();
  protected readonly mesh = computed(() => {
    const document = this.review()?.document;
    const developed = document === undefined ? null : developPart(document, 'production');
    return developed?.ok === true ? layOutMesh(developed.development, CHORD_MM) : null;
  });
  protected readonly what = computed(() => {
    const review = this.review();
    if (review === undefined) return '';
    return `${review.partNumber} ${review.partName}, revision ${review.letter}${HANDS[review.hand]}`;
  });
  protected readonly until = computed(() => dayWords(this.review()?.expiresAt ?? '', this.now));

  constructor() {
    // Nobody signs in here; the session's token goes with what the guest says.
    inject(SessionApi)
      .ensure()
      .catch((error: unknown) => this.notices.showProblem(error));
  }

  protected take({ fold, isHeld }: FoldChange): void {
    this.isHeld.set(isHeld);
    this.fold.set(fold);
  }

  protected comment({ place, text }: NewTalk): Promise<void> {
    return this.run(() => this.api.commentByLink(this.link(), place, text, newIdempotencyKey()));
  }

  protected judge({
    verdict,
    note,
  }: {
    readonly verdict: TalkOpinion['verdict'];
    readonly note: string;
  }): Promise<void> {
    return this.run(() => this.api.opinionByLink(this.link(), verdict, note, newIdempotencyKey()));
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
