import { Injectable, computed, inject, signal } from '@angular/core';
import type { LiveEvent } from '@foldwright/shared/contracts/system';
import { isSameJson } from '@foldwright/shared/part/canonical-json';
import { CommandRefusal } from '@foldwright/shared/part/command-refusal';
import type { PartCommand } from '@foldwright/shared/part/commands';
import { describeCommand } from '@foldwright/shared/part/describe-command';
import type { PartDocument } from '@foldwright/shared/part/part-document';
import type { Subscription } from 'rxjs';
import { type ApiProblem, problemFromError } from '../api/api-problem';
import { type CommandLogEntry, DraftsApi } from '../api/drafts-api';
import { LiveEvents } from '../api/live-events';
import { PartsApi } from '../api/parts-api';
import type { SetAside } from './draft-journal';
import { DraftLink } from './draft-link';
import { withBendsKept } from './drawing-board/geometry/keep-bends';
import {
  EMPTY_HISTORY,
  type HistoryStep,
  afterRedo,
  afterUndo,
  dropStep,
  markStuck,
  nextRedo,
  nextUndo,
  recordStep,
  redoFailed,
  redoOf,
  undoFailed,
  undoOf,
} from './edit-history';
import { setAsideWords } from './journal-words';
import type { PartStep } from './part-steps';
import { PendingShelf } from './pending-shelf';
import { saveWords } from './save-state';

/** What the history has to do when an edit is handed back: its step was an edit, an undo or a redo. */
type Purpose = { readonly kind: 'edit' } | { readonly kind: 'undo' | 'redo'; readonly step: HistoryStep };

/** One line for the person, and whether it tells of somebody else's work. */
interface NewsLine {
  readonly words: string;
  readonly isOfOthers: boolean;
}

export interface EditOptions {
  /** Edits with the same fold that follow each other are one step of undo. */
  readonly fold?: string | null;
  /** Words for the history; those of the first command unless given. */
  readonly label?: string;
}

/** The open part: its draft, own edits with undo and redo, and one line of news about what others did to it. */
@Injectable()
export class PartStore {
  private readonly partsApi = inject(PartsApi);
  private readonly draftsApi = inject(DraftsApi);
  private readonly live = inject(LiveEvents);

  private readonly partId = signal<string | undefined>(undefined);
  private readonly part = this.partsApi.part(this.partId);
  private readonly historyState = signal(EMPTY_HISTORY);
  private readonly newsLine = signal<NewsLine | null>(null);
  private readonly openProblem = signal<ApiProblem | null>(null);
  private readonly purposes = new Map<string, Purpose>();
  private listening: Subscription | null = null;
  private readonly whenOnline = (): void => void this.link.send();

  /** Of this tab, so that it knows its own echo on the live stream. */
  readonly clientId = `tab-${crypto.randomUUID()}`;
  private readonly link = new DraftLink(this.draftsApi, inject(PendingShelf), this.clientId, {
    movedOn: (changed, setAside) => this.tellMovedOn(changed, setAside),
    closed: () => this.part.reload(),
  });

  readonly detail = this.part.value;
  readonly problem = computed(() => this.openProblem() ?? (this.detail() === undefined ? this.part.problem() : null));
  /**
   * What is drawn: the server's document with own edits on top. An answer that says the same in other objects is no
   * change, so that nothing is computed twice.
   */
  readonly document = computed<PartDocument | null>(() => this.link.journal()?.document ?? null, { equal: isSameJson });
  readonly draft = this.link.draft;
  /** Whether there is an outline to work on: until a trace is taken, a part from a mock-up only holds its place. */
  readonly hasOutline = computed(
    () => this.document() !== null && (this.link.draft()?.furthestStep !== 'mock-up' || this.link.unsentEdits() > 0),
  );
  readonly draftId = computed(() => this.link.draft()?.id ?? null);
  readonly letter = computed(() => this.link.draft()?.letter ?? this.detail()?.draft?.letter ?? null);
  readonly revision = this.link.revision;
  /** Whether what is drawn is exactly what the server has. */
  readonly isSettled = this.link.isSettled;
  readonly furthestStep = computed<PartStep>(
    () => this.link.draft()?.furthestStep ?? this.detail()?.draft?.furthestStep ?? 'mock-up',
  );
  readonly canEdit = computed(
    () => (this.detail()?.canEdit ?? false) && this.document() !== null && this.link.saveState().kind !== 'closed',
  );
  readonly history = this.historyState.asReadonly();
  readonly undoLabel = computed(() => (this.canEdit() ? (nextUndo(this.historyState())?.label ?? null) : null));
  readonly redoLabel = computed(() => (this.canEdit() ? (nextRedo(this.historyState())?.label ?? null) : null));
  readonly saveState = this.link.saveState;
  readonly savedWords = computed(() => saveWords(this.link.saveState(), this.revision(), this.link.unsentEdits()));
  readonly news = computed(() => this.newsLine()?.words ?? null);

  /** Opens a part; resolves when its draft is there, or when `problem` says why not. */
  async open(partId: string): Promise<void> {
    if (this.partId() === partId && this.document() !== null) return this.refresh();
    this.close();
    this.partId.set(partId);
    this.listening = this.live.events.subscribe((event) => this.hear(event));
    this.listening.add(this.live.resumed.subscribe(() => void this.refresh()));
    addEventListener('online', this.whenOnline);
    await this.load(partId);
  }

  /** Stops listening and lets go of the part. */
  close(): void {
    this.listening?.unsubscribe();
    this.listening = null;
    removeEventListener('online', this.whenOnline);
    this.link.close();
    this.historyState.set(EMPTY_HISTORY);
    this.newsLine.set(null);
    this.openProblem.set(null);
    this.purposes.clear();
    this.partId.set(undefined);
  }

  /** Reads part and draft again, keeping own edits. */
  async refresh(): Promise<void> {
    const partId = this.partId();
    if (partId === undefined) return;
    if (this.draftId() === null) return this.load(partId);
    this.part.reload();
    await this.link.takeIn();
  }

  /**
   * Applies an edit at once and sends it. Bends that the edit would leave short of the outline are taken along.
   * @returns whether the drawing took it; if not, `news` says why
   */
  apply(commands: readonly PartCommand[], options: EditOptions = {}): boolean {
    const before = this.document();
    const first = commands[0];
    if (before === null || first === undefined || !this.canEdit()) return false;
    const label = options.label ?? describeCommand(first);
    try {
      const id = this.record(label, withBendsKept(before, commands), { kind: 'edit' });
      const after = this.document() ?? before;
      const step = { id, label, before, after, fold: options.fold ?? null };
      this.historyState.update((history) => recordStep(history, step));
      this.dropOwnNews();
      return true;
    } catch (error) {
      return this.tellRefusal(error);
    }
  }

  undo(): void {
    const step = nextUndo(this.historyState());
    if (step !== null) this.travel(step, 'undo');
  }

  redo(): void {
    const step = nextRedo(this.historyState());
    if (step !== null) this.travel(step, 'redo');
  }

  /** Undoes or does again, step by step, until that step is the last that stands; null goes back to the beginning. */
  goTo(stepId: string | null): void {
    const { past } = this.historyState();
    if (stepId === null || past.some(({ id }) => id === stepId)) {
      this.travelWhile(nextUndo, 'undo', (step) => step.id !== stepId);
    } else {
      let isReached = false;
      this.travelWhile(nextRedo, 'redo', (step) => {
        const goesOn = !isReached;
        isReached = step.id === stepId;
        return goesOn;
      });
    }
  }

  /** Notes that a person went on to a step; the server is told with the next edit. */
  reach(step: PartStep): void {
    this.link.reach(step);
  }

  /** Starts the next draft from the latest revision. */
  async startDraft(): Promise<void> {
    const partId = this.partId();
    if (partId === undefined) return;
    await this.partsApi.startDraft(partId);
    await this.reopen();
  }

  /** Reads the part anew after its draft was released or another was started; the history begins again. */
  async reopen(): Promise<void> {
    const partId = this.partId();
    if (partId === undefined) return;
    this.link.close();
    this.historyState.set(EMPTY_HISTORY);
    this.newsLine.set(null);
    await this.load(partId);
  }

  dismissNews(): void {
    this.newsLine.set(null);
  }

  /** Everything that was changed and by whom, newest first. */
  async readLog(): Promise<readonly CommandLogEntry[]> {
    const draftId = this.draftId();
    return draftId === null ? [] : this.draftsApi.history(draftId);
  }

  /** Sends what is unsent; answers whether all of it arrived. */
  async settle(): Promise<boolean> {
    await this.link.send();
    return this.link.isSettled();
  }

  private async load(partId: string): Promise<void> {
    try {
      const detail = await this.partsApi.readPart(partId);
      if (this.partId() !== partId) return;
      this.part.set(detail);
      if (detail.draft === null) {
        this.link.close();
        return;
      }
      this.link.open(await this.draftsApi.readDraft(detail.draft.id), detail.canEdit);
    } catch (error) {
      const problem = problemFromError(error);
      // A part that is still a mock-up has no document yet; its first step is open all the same.
      if (problem.slug === 'not-found' && this.detail() !== undefined) return;
      this.openProblem.set(problem);
    }
  }

  private record(label: string, commands: readonly PartCommand[], purpose: Purpose): string {
    const id = crypto.randomUUID();
    this.purposes.set(id, purpose);
    this.link.record({ id, label, commands });
    return id;
  }

  private travelWhile(next: typeof nextUndo, reason: 'undo' | 'redo', goesOn: (step: HistoryStep) => boolean): void {
    for (let step = next(this.historyState()); step !== null && goesOn(step); step = next(this.historyState())) {
      this.travel(step, reason);
    }
  }

  private travel(step: HistoryStep, reason: 'undo' | 'redo'): void {
    if (!this.canEdit()) return;
    const command = reason === 'undo' ? undoOf(step) : redoOf(step);
    try {
      if (command !== null) this.record(describeCommand(command), [command], { kind: reason, step });
      this.historyState.update((history) => (reason === 'undo' ? afterUndo(history, step) : afterRedo(history, step)));
      this.dropOwnNews();
    } catch (error) {
      this.tellRefusal(error, `“${step.label}” can’t be ${reason === 'undo' ? 'undone' : 'done again'}. `);
      this.historyState.update((history) => markStuck(history, step.id));
    }
  }

  private hear(event: LiveEvent): void {
    if (event.kind === 'part-changed' && event.partId === this.partId()) void this.refresh();
    if (event.kind !== 'draft-changed' || event.draftId !== this.draftId()) return;
    if (event.clientId !== this.clientId && event.revision > this.revision()) void this.link.takeIn();
  }

  /** Edits that no longer fit leave the history, and the line says which and why. */
  private tellMovedOn(changed: string | null, setAside: readonly SetAside[]): void {
    for (const { batch } of setAside) {
      const purpose = this.purposes.get(batch.id) ?? { kind: 'edit' };
      this.historyState.update((history) => {
        if (purpose.kind === 'undo') return undoFailed(history, purpose.step);
        if (purpose.kind === 'redo') return redoFailed(history, purpose.step);
        return dropStep(history, batch.id);
      });
    }
    const line = setAsideWords(setAside, changed) ?? changed;
    if (line !== null) this.newsLine.set({ words: line, isOfOthers: true });
  }

  /** An edit that fits makes an earlier refusal stale, but not what others did: that stays until it is put away. */
  private dropOwnNews(): void {
    this.newsLine.update((line) => (line?.isOfOthers === true ? line : null));
  }

  /** @returns false, so that callers can hand it on; @throws what is no refusal, because that is a fault */
  private tellRefusal(error: unknown, lead = ''): false {
    if (!(error instanceof CommandRefusal)) throw error;
    this.newsLine.set({ words: `${lead}${error.message}`, isOfOthers: false });
    return false;
  }
}
