import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { MatButtonModule } from '@angular/material/button';
import { Router } from '@angular/router';
import type { StockRole } from '@foldwright/shared/part/part-document';
import { Pictogram } from '@foldwright/ui/pictogram/pictogram';
import { newIdempotencyKey } from '../../api/api-client';
import { Notices } from '../../api/notices';
import { OrdersApi } from '../../api/orders-api';
import { rereadOn } from '../../api/reread';
import { type RevisionFileKind, RevisionsApi } from '../../api/revisions-api';
import { QuoteCard } from './quote-card';
import { RevisionBuyers } from './revision-buyers';
import { RevisionReviews } from './revision-reviews';

const QUANTITIES = [1, 10, 50] as const;
const FILE_WORDS: Readonly<Record<RevisionFileKind, string>> = {
  dxf: 'DXF to cut from',
  drawing: 'Drawing',
  'full-size-print': 'Full-size print',
  step: 'STEP solid',
};

/** A frozen revision: its fingerprint, its files in either sheet, prices from the cutting service, and the order. */
@Component({
  selector: 'fw-released-revision',
  imports: [MatButtonModule, Pictogram, QuoteCard, RevisionBuyers, RevisionReviews],
  templateUrl: './released-revision.html',
  styleUrl: './released-revision.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ReleasedRevision {
  private readonly revisionsApi = inject(RevisionsApi);
  private readonly ordersApi = inject(OrdersApi);
  private readonly notices = inject(Notices);
  private readonly router = inject(Router);
  private readonly orderKeys = new Map<string, string>();

  readonly revisionId = input.required<string>();
  readonly canEdit = input(false);

  protected readonly read = this.revisionsApi.revision(() => this.revisionId());
  protected readonly quotes = this.ordersApi.quotes(() => this.revisionId());
  protected readonly role = signal<StockRole>('production');
  protected readonly isAsking = signal(false);
  protected readonly isOrdering = signal(false);
  protected readonly roles = ['trial', 'production'] as const satisfies readonly StockRole[];

  protected readonly revision = this.read.value;
  protected readonly released = computed(() => {
    const revision = this.revision();
    if (revision === undefined) return '';
    const at = new Intl.DateTimeFormat('en-GB', { dateStyle: 'medium', timeStyle: 'short' }).format(
      new Date(revision.releasedAt),
    );
    return `released by ${revision.releasedBy}, ${at}`;
  });
  protected readonly fingerprint = computed(
    () =>
      this.revision()
        ?.hash.match(/.{1,8}/g)
        ?.join(' ') ?? '',
  );
  protected readonly files = computed(() => {
    const revision = this.revision();
    const role = this.role();
    return (revision?.files ?? []).map(({ kind }) => ({
      kind,
      words: FILE_WORDS[kind],
      url: this.revisionsApi.fileUrl(
        revision?.id ?? '',
        kind,
        role,
        ...(kind === 'full-size-print' ? (['A4'] as const) : []),
      ),
    }));
  });
  /** The newest answer for the sheet that is looked at. */
  protected readonly quote = computed(
    () => this.quotes.value()?.quotes.find((quote) => quote.stock === this.role()) ?? null,
  );

  constructor() {
    // Solids are written a little after the release.
    rereadOn(['part-changed'], () => this.read.reload());
  }

  protected label(role: StockRole): string {
    return this.revision()?.[role].stockLabel ?? role;
  }

  protected async ask(): Promise<void> {
    // A double click arrives before the button is drawn as disabled.
    if (this.isAsking()) return;
    this.isAsking.set(true);
    try {
      await this.ordersApi.askForQuote(this.revisionId(), this.role(), QUANTITIES);
      this.quotes.reload();
    } catch (error) {
      this.notices.showProblem(error);
      this.quotes.reload();
    } finally {
      this.isAsking.set(false);
    }
  }

  protected async order(quoteId: string, quantity: number): Promise<void> {
    if (this.isOrdering()) return;
    this.isOrdering.set(true);
    try {
      const order = await this.ordersApi.place(quoteId, quantity, this.orderKey(quoteId, quantity));
      await this.router.navigate(['/orders', order.id]);
    } catch (error) {
      this.notices.showProblem(error);
    } finally {
      this.isOrdering.set(false);
    }
  }

  /** The same for every try from this page: a try whose answer got lost must not become a second order. */
  private orderKey(quoteId: string, quantity: number): string {
    const place = `${quoteId} ${quantity}`;
    const key = this.orderKeys.get(place) ?? newIdempotencyKey();
    this.orderKeys.set(place, key);
    return key;
  }
}
