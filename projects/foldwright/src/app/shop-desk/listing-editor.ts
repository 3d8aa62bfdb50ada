import { ChangeDetectionStrategy, Component, computed, effect, inject, input, signal, untracked } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButtonModule } from '@angular/material/button';
import { Router, RouterLink } from '@angular/router';
import type { Listing, ListingInput } from '@foldwright/shared/contracts/shop';
import { FINISHES } from '@foldwright/shared/stock/finishes';
import { parseMoneyMinor, typedMoney } from '@foldwright/shared/units/money';
import { finishWords } from '@foldwright/ui/formed-preview/finish-look';
import { MoneyText } from '@foldwright/ui/money-text/money-text';
import { problemFromError } from '../api/api-problem';
import { Notices } from '../api/notices';
import { SessionApi } from '../api/session-api';
import { ShopDeskApi } from '../api/shop-desk-api';
import { StockApi } from '../api/stock-api';
import { OnceCall } from '../api/once-call';
import { slugOf } from './slug-of';

/** One listing: what it sells, its words, its finishes and price; publish it, withdraw it, add photos. */
@Component({
  selector: 'fw-listing-editor',
  imports: [MatButtonModule, MoneyText, ReactiveFormsModule, RouterLink],
  templateUrl: './listing-editor.html',
  styleUrl: './desk-form.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ListingEditor {
  private readonly api = inject(ShopDeskApi);
  private readonly stockApi = inject(StockApi);
  private readonly notices = inject(Notices);
  private readonly router = inject(Router);
  private readonly session = inject(SessionApi);
  protected readonly call = new OnceCall();

  /** Id of the listing, or “new”. */
  readonly listingId = input.required<string>();

  protected readonly isOwner = computed(() => this.session.role() === 'owner');
  private readonly released = this.stockApi.brackets();
  private readonly kitList = this.stockApi.kits();
  protected readonly settings = this.api.settings();
  protected readonly read = this.api.listing(() => (this.listingId() === 'new' ? undefined : this.listingId()));
  protected readonly listing = this.read.value;
  protected readonly brackets = computed(() => this.released.value()?.brackets ?? []);
  protected readonly kits = computed(() => this.kitList.value()?.kits ?? []);
  protected readonly finishes = FINISHES.map(({ id }) => ({ id, words: finishWords(id) }));
  protected readonly chosen = signal<ReadonlyMap<string, number>>(new Map([['bare', 0]]));
  protected readonly form = inject(NonNullableFormBuilder).group({
    what: ['', Validators.required],
    title: ['', [Validators.required, Validators.maxLength(80)]],
    slug: ['', [Validators.pattern(/^[a-z0-9]+(-[a-z0-9]+)*$/), Validators.maxLength(60)]],
    summary: ['', Validators.maxLength(600)],
    fits: ['', Validators.maxLength(800)],
    doesNotFit: ['', Validators.maxLength(800)],
    fittingSteps: ['', Validators.maxLength(3000)],
    price: ['', [Validators.required, Validators.pattern(/^\d[\d '\u00a0]*([.,]\d{1,2})?$/)]],
    leadTimeDays: [9, [Validators.required, Validators.min(1), Validators.max(365)]],
  });
  private filledWith: string | null = null;

  constructor() {
    effect(() => {
      const listing = this.listing();
      untracked(() => {
        if (listing !== undefined && this.filledWith !== `${listing.id} ${listing.revision}`) this.fill(listing);
      });
    });
  }

  protected toggleFinish(finishId: string): void {
    this.chosen.update((chosen) => {
      const next = new Map(chosen);
      if (!next.delete(finishId)) next.set(finishId, 0);
      return next;
    });
  }

  protected async save(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid || this.chosen().size === 0) return;
    const body = this.body();
    const listing = this.listing();
    const kept = await this.call.run((key) =>
      listing === undefined
        ? this.api.addListing(body, key)
        : this.api.changeListing(listing.id, body, listing.revision),
    );
    if (kept === undefined) return;
    if (listing === undefined) await this.router.navigate(['/shop-desk/listings', kept.id]);
    else this.read.set(kept);
    this.notices.showNews(
      'Kept',
      kept.state === 'published' ? 'Customers see it as it is now.' : 'Customers don’t see it yet.',
    );
  }

  protected async setState(state: 'published' | 'withdrawn'): Promise<void> {
    const listing = this.listing();
    if (listing === undefined) return;
    const changed = await this.call.run(() => this.api.setListingState(listing, state));
    if (changed !== undefined) this.read.set(changed);
  }

  protected addPhoto(event: Event, description: string): void {
    const listing = this.listing();
    if (!(event.target instanceof HTMLInputElement) || listing === undefined) return;
    const [file] = event.target.files ?? [];
    event.target.value = '';
    if (file === undefined) return;
    this.api.addPhoto(listing.id, description.trim() === '' ? listing.title : description, file).subscribe({
      next: (progress) => {
        if (progress.kind === 'done') this.read.set(progress.value);
      },
      error: (error: unknown) => this.notices.showProblem(problemFromError(error)),
    });
  }

  protected async removePhoto(photoId: string): Promise<void> {
    const changed = await this.call.run(() => this.api.removePhoto(this.listingId(), photoId));
    if (changed !== undefined) this.read.set(changed);
  }

  private body(): ListingInput {
    const { what, title, slug, price, ...words } = this.form.getRawValue();
    const id = what.slice(2);
    const currency = this.settings.value()?.currency ?? 'EUR';
    return {
      ...words,
      title,
      slug: slug === '' ? slugOf(title) : slug,
      what: what.startsWith('k:') ? { kind: 'kit', kitId: id } : { kind: 'bracket', revisionId: id },
      priceMinor: parseMoneyMinor(price, currency) ?? 0,
      finishes: [...this.chosen()].map(([finishId, surchargeMinor]) => ({ finishId, surchargeMinor })),
    };
  }

  private fill(listing: Listing): void {
    this.filledWith = `${listing.id} ${listing.revision}`;
    const { title, slug, summary, fits, doesNotFit, fittingSteps, leadTimeDays, what, price } = listing;
    this.form.setValue({
      ...{ title, slug, summary, fits, doesNotFit, fittingSteps, leadTimeDays },
      what: what.kind === 'kit' ? `k:${what.kitId}` : `b:${what.bracket.revisionId}`,
      price: typedMoney(price),
    });
    this.chosen.set(new Map(listing.finishes.map(({ finishId, surchargeMinor }) => [finishId, surchargeMinor])));
  }
}
