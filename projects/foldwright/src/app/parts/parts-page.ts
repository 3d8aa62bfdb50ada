import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { takeUntilDestroyed, toObservable, toSignal } from '@angular/core/rxjs-interop';
import { MatButtonModule } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { Pictogram } from '@foldwright/ui/pictogram/pictogram';
import { ScaleBar } from '@foldwright/ui/scale-bar/scale-bar';
import { auditTime, delay, filter, map, merge } from 'rxjs';
import { LiveEvents } from '../api/live-events';
import { PartsApi } from '../api/parts-api';
import { SessionApi } from '../api/session-api';
import { ClearBench } from './clear-bench';
import { commonScale } from './common-scale';
import { PART_FILTERS, type PartFilter, fallsUnder, filterWords, matchesSearch } from './part-facts';
import { PartTile } from './part-tile';

/** Changes of the workshop come in bursts; the list is read again once for each. */
const REREAD_AFTER_MS = 400;

/** The parts of the workshop, all at one scale. */
@Component({
  selector: 'fw-parts-page',
  imports: [ClearBench, MatButtonModule, PartTile, Pictogram, RouterLink, ScaleBar],
  templateUrl: './parts-page.html',
  styleUrl: './parts-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { class: 'fw-page' },
})
export class PartsPage {
  private readonly live = inject(LiveEvents);
  protected readonly list = inject(PartsApi).list();
  protected readonly canMake = inject(SessionApi).canMake;

  protected readonly now = new Date();
  protected readonly filter = signal<PartFilter>('all');
  protected readonly typed = signal('');

  protected readonly parts = computed(() => this.list.value()?.parts ?? []);
  protected readonly isEmpty = computed(() => this.list.value() !== undefined && this.parts().length === 0);
  protected readonly filters = computed(() =>
    PART_FILTERS.map((id) => ({
      id,
      label: filterWords(id),
      count: this.parts().filter((part) => fallsUnder(part, id)).length,
    })),
  );
  protected readonly shown = computed(() =>
    this.parts().filter((part) => fallsUnder(part, this.filter()) && matchesSearch(part, this.typed())),
  );
  /**
   * One scale for the workshop, not for what is sifted out: sizes stay comparable while sifting. It takes drawing every
   * part, so the words come first: null until then.
   */
  protected readonly pxPerMm = toSignal(toObservable(this.parts).pipe(delay(0), map(commonScale)), {
    initialValue: null,
  });

  constructor() {
    const changes = this.live.events.pipe(filter(({ kind }) => kind === 'part-changed' || kind === 'draft-changed'));
    merge(changes, this.live.resumed)
      .pipe(auditTime(REREAD_AFTER_MS), takeUntilDestroyed())
      .subscribe(() => this.list.reload());
  }

  protected showAll(): void {
    this.filter.set('all');
    this.typed.set('');
  }
}
