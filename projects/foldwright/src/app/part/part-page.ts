import { ChangeDetectionStrategy, Component, DestroyRef, computed, inject, signal } from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { MatButtonModule } from '@angular/material/button';
import { NavigationEnd, Router, RouterLink, RouterOutlet } from '@angular/router';
import { Pictogram } from '@foldwright/ui/pictogram/pictogram';
import { RouteStrip } from '@foldwright/ui/route-strip/route-strip';
import { filter, map, startWith } from 'rxjs';
import { OrdersApi } from '../api/orders-api';
import { Notices } from '../api/notices';
import { ComputedParts } from './computed-parts';
import { knownPrices } from './known-prices';
import { startDraftWords } from './next-letter';
import { PartCard } from './part-card/part-card';
import { PartRoad } from './part-road';
import { type PartStep, isPartStep } from './part-steps';
import { PartStore } from './part-store';

/** The page of one part: its name and how it is saved, the route strip, the one call to act, the step, the part card. */
@Component({
  selector: 'fw-part-page',
  imports: [MatButtonModule, PartCard, Pictogram, RouteStrip, RouterLink, RouterOutlet],
  templateUrl: './part-page.html',
  styleUrl: './part-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { '(document:keydown)': 'pressKey($event)' },
})
export class PartPage {
  private readonly router = inject(Router);
  private readonly notices = inject(Notices);
  protected readonly store = inject(PartStore);
  protected readonly road = inject(PartRoad);
  protected readonly parts = inject(ComputedParts);
  private readonly quotes = inject(OrdersApi).quotes(() => this.latestRevision()?.id);

  protected readonly isCardOpen = signal(false);
  protected readonly isStarting = signal(false);
  protected readonly latestRevision = computed(() => this.store.detail()?.revisions[0] ?? null);
  protected readonly startWords = computed(() => startDraftWords(this.latestRevision()?.letter ?? ''));
  protected readonly prices = computed(() => knownPrices(this.quotes.value()?.quotes ?? []));
  protected readonly state = computed(() => `draft of ${this.store.letter() ?? ''}`);
  protected readonly foot = computed(() => {
    const revision = this.latestRevision();
    return revision === null ? null : `Revision ${revision.letter} released by ${revision.releasedBy}`;
  });
  /** Steps that draw the document need one; the first and the last also serve without. */
  protected readonly isStepOpen = computed(
    () => this.store.hasOutline() || this.road.step() === 'mock-up' || this.road.step() === 'release',
  );

  /** What the card tells of: nothing before there is an outline. */
  protected readonly cardDocument = computed(() => (this.store.hasOutline() ? this.store.document() : null));

  private readonly address = toSignal(
    this.router.events.pipe(
      filter((event) => event instanceof NavigationEnd),
      map(() => this.router.url),
      startWith(this.router.url),
    ),
    { requireSync: true },
  );

  constructor() {
    // The address is the one truth about the step; the road is told whenever it changes.
    this.road.enter(stepOfUrl(this.address()));
    const watching = this.router.events
      .pipe(filter((event) => event instanceof NavigationEnd))
      .subscribe((event) => this.road.enter(stepOfUrl(event.urlAfterRedirects)));
    inject(DestroyRef).onDestroy(() => {
      watching.unsubscribe();
      this.store.close();
    });
  }

  protected toggleCard(): void {
    this.isCardOpen.update((isOpen) => !isOpen);
  }

  protected async startDraft(): Promise<void> {
    if (this.isStarting()) return;
    this.isStarting.set(true);
    try {
      await this.store.startDraft();
    } catch (error) {
      this.notices.showProblem(error);
    } finally {
      this.isStarting.set(false);
    }
  }

  /** Undo and redo work wherever the hand is, except in a field, where they belong to what is typed. */
  protected pressKey(event: KeyboardEvent): void {
    if (!(event.ctrlKey || event.metaKey) || event.altKey || isTyping(event.target)) return;
    const key = event.key.toLowerCase();
    const isRedo = (key === 'z' && event.shiftKey) || key === 'y';
    if (!isRedo && key !== 'z') return;
    event.preventDefault();
    if (isRedo) this.store.redo();
    else this.store.undo();
  }
}

function stepOfUrl(url: string): PartStep {
  const last = url.split(/[?#]/)[0]?.split('/').at(-1) ?? '';
  return isPartStep(last) ? last : 'mock-up';
}

function isTyping(target: EventTarget | null): boolean {
  return target instanceof HTMLElement && target.matches('input, textarea, select, [contenteditable="true"]');
}
