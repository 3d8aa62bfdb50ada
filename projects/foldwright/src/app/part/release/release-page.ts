import {
  ChangeDetectionStrategy,
  Component,
  DestroyRef,
  computed,
  effect,
  inject,
  linkedSignal,
  signal,
} from '@angular/core';
import { FormControl, ReactiveFormsModule } from '@angular/forms';
import { MatButtonModule } from '@angular/material/button';
import type { Finding } from '@foldwright/shared/rules/finding';
import { FindingNote } from '@foldwright/ui/finding-note/finding-note';
import { DraftsApi } from '../../api/drafts-api';
import { Notices } from '../../api/notices';
import { newIdempotencyKey } from '../../api/api-client';
import { ComputedParts } from '../computed-parts';
import { startDraftWords } from '../next-letter';
import { PartRoad } from '../part-road';
import { PartStore } from '../part-store';
import { PartHand } from './part-hand';
import { ReleasedRevision } from './released-revision';

/** The release step: what will be frozen and what has to be accepted first; afterwards the revision with its files and orders. */
@Component({
  selector: 'fw-release-page',
  imports: [FindingNote, MatButtonModule, PartHand, ReactiveFormsModule, ReleasedRevision],
  templateUrl: './release-page.html',
  styleUrl: './release-page.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ReleasePage {
  private readonly draftsApi = inject(DraftsApi);
  private readonly notices = inject(Notices);
  private readonly road = inject(PartRoad);
  protected readonly store = inject(PartStore);
  protected readonly parts = inject(ComputedParts);

  protected readonly note = new FormControl('', { nonNullable: true });
  protected readonly isReleasing = signal(false);
  protected readonly isStarting = signal(false);
  private idempotencyKey = newIdempotencyKey();

  private readonly findings = computed<readonly Finding[]>(() => {
    const all = [...(this.parts.production()?.findings ?? []), ...(this.parts.trial()?.findings ?? [])];
    return [...new Map(all.map((finding) => [finding.id, finding])).values()];
  });
  protected readonly blockers = computed(() => this.findings().filter(({ severity }) => severity === 'blocker'));
  protected readonly cautions = computed(() => this.findings().filter(({ severity }) => severity === 'caution'));
  /** Cautions that were ticked; those that are no longer found fall away. */
  protected readonly accepted = linkedSignal<readonly Finding[], ReadonlySet<string>>({
    source: this.cautions,
    computation: (cautions, previous) =>
      new Set(cautions.map(({ id }) => id).filter((id) => previous?.value.has(id) === true)),
  });
  protected readonly missing = computed(() => this.cautions().length - this.accepted().size);
  protected readonly canRelease = computed(
    () =>
      this.store.canEdit() &&
      this.store.isSettled() &&
      !this.isReleasing() &&
      this.blockers().length === 0 &&
      this.missing() === 0 &&
      this.parts.production()?.figures != null &&
      this.parts.trial()?.figures != null,
  );
  protected readonly letter = computed(() => this.store.letter() ?? '');
  protected readonly sheets = computed(() =>
    [this.parts.trial(), this.parts.production()].flatMap((part) => (part === null ? [] : [part])),
  );
  protected readonly latest = computed(() => this.store.detail()?.revisions[0] ?? null);
  protected readonly startWords = computed(() => startDraftWords(this.latest()?.letter ?? ''));
  /** Why the call to act can't be used yet, in words; null when it can. */
  protected readonly waitingFor = computed(() => {
    if (this.blockers().length > 0) return 'Mend what can’t be made first.';
    if (this.missing() > 0)
      return this.missing() === 1
        ? 'One caution is still to be accepted.'
        : `${this.missing()} cautions are still to be accepted.`;
    if (!this.store.isSettled()) return 'Your last edits are on their way to the server.';
    return null;
  });

  constructor() {
    // The page's call to act stands in the frame, where every step has its own.
    effect(() => {
      const isDraft = this.store.document() !== null && this.store.canEdit();
      this.road.offer(
        isDraft
          ? {
              label: `Release ${this.letter()}`,
              link: null,
              act: () => void this.release(),
              isDisabled: !this.canRelease(),
            }
          : null,
      );
    });
    inject(DestroyRef).onDestroy(() => this.road.offer(null));
  }

  protected toggle(id: string): void {
    this.accepted.update((accepted) => {
      const next = new Set(accepted);
      if (!next.delete(id)) next.add(id);
      return next;
    });
  }

  protected figure(valueMm: number): string {
    return valueMm.toFixed(1);
  }

  protected async startDraft(): Promise<void> {
    if (this.isStarting()) return;
    this.isStarting.set(true);
    try {
      await this.store.startDraft();
      this.idempotencyKey = newIdempotencyKey();
    } catch (error) {
      this.notices.showProblem(error);
    } finally {
      this.isStarting.set(false);
    }
  }

  private async release(): Promise<void> {
    const draftId = this.store.draftId();
    if (draftId === null || !this.canRelease()) return;
    this.isReleasing.set(true);
    try {
      const body = {
        baseRevision: this.store.revision(),
        note: this.note.value.trim(),
        acceptedCautionIds: [...this.accepted()],
      };
      await this.draftsApi.release(draftId, body, this.idempotencyKey);
      await this.store.reopen();
    } catch (error) {
      this.notices.showProblem(error);
      await this.store.refresh();
    } finally {
      this.isReleasing.set(false);
    }
  }
}
