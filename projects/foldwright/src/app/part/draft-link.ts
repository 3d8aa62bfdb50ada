import { computed, signal } from '@angular/core';
import type { Draft } from '@foldwright/shared/contracts/parts';
import { type ApiProblem, problemFromError } from '../api/api-problem';
import type { DraftsApi } from '../api/drafts-api';
import { commandBatch } from './command-batch';
import {
  type DraftJournal,
  type EditBatch,
  type RebasedJournal,
  type SetAside,
  acceptAnswer,
  consign,
  isSettled,
  moveOn,
  openJournal,
  recordBatch,
  refuse,
} from './draft-journal';
import { changeWords } from './journal-words';
import { type PartStep, hasReached } from './part-steps';
import type { PendingShelf } from './pending-shelf';
import type { SaveState } from './save-state';

/** What the link tells its owner. `changed`: one line about what somebody else changed, or null. */
export interface LinkListener {
  movedOn(changed: string | null, setAside: readonly SetAside[]): void;
  closed(): void;
}

const FIRST_WAIT_MS = 1000;
const LONGEST_WAIT_MS = 15000;
/** Edits that are answered sooner never show as being saved; the line would only flicker. */
const SHOW_SAVING_AFTER_MS = 400;
const TOO_LARGE = 'A size is larger than a draft can hold.';

/**
 * A draft on the server with one's own edits on top. Edits apply at once and are sent one consignment after the other;
 * without an answer they are kept and sent again; what somebody else changed is taken in and own edits are laid on it.
 */
export class DraftLink {
  private readonly draftState = signal<Draft | null>(null);
  private readonly journalState = signal<DraftJournal | null>(null);
  private readonly save = signal<SaveState>({ kind: 'saved', at: '' });
  /** What is under way; whoever asks meanwhile waits for the same. */
  private sending: Promise<void> | null = null;
  private retryTimer: ReturnType<typeof setTimeout> | null = null;
  private waitMs = FIRST_WAIT_MS;
  /** The furthest step, to be told with the next edits. */
  private reachedStep: PartStep | null = null;

  readonly draft = this.draftState.asReadonly();
  readonly journal = this.journalState.asReadonly();
  readonly saveState = this.save.asReadonly();
  readonly revision = computed(() => this.journalState()?.server.revision ?? 0);
  readonly isSettled = computed(() => {
    const journal = this.journalState();
    return journal === null || isSettled(journal);
  });
  readonly unsentEdits = computed(() => {
    const journal = this.journalState();
    return journal === null ? 0 : journal.waiting.length + (journal.sending?.batches.length ?? 0);
  });

  constructor(
    private readonly api: DraftsApi,
    private readonly shelf: PendingShelf,
    private readonly clientId: string,
    private readonly listener: LinkListener,
  ) {}

  /** Starts from a draft; edits that an earlier tab could not send are laid on it as if they were made now. */
  open(draft: Draft, canEdit: boolean): void {
    this.draftState.set(draft);
    this.save.set({ kind: 'saved', at: draft.updatedAt });
    const kept = canEdit ? this.shelf.take(draft.id) : [];
    const { journal, setAside } = moveOn({ ...openJournal(draft), waiting: kept }, draft);
    this.setJournal(journal);
    if (setAside.length > 0) this.listener.movedOn(null, setAside);
    if (kept.length > 0) void this.send();
  }

  /** Lets go of the draft. What is on its way still arrives; the rest waits on the shelf. */
  close(): void {
    this.stopRetrying();
    this.draftState.set(null);
    this.journalState.set(null);
    this.reachedStep = null;
  }

  /** @throws CommandRefusal when the drawing can't take it */
  record(batch: EditBatch): void {
    const journal = this.journalState();
    if (journal === null) return;
    this.setJournal(recordBatch(journal, batch));
    void this.send();
  }

  reach(step: PartStep): void {
    const furthest = this.draftState()?.furthestStep;
    if (furthest !== undefined && !hasReached(furthest, step)) this.reachedStep = step;
  }

  /** Sends what waits, one consignment at a time, until nothing does or there is no answer. */
  send(): Promise<void> {
    this.sending ??= this.sendAll();
    return this.sending;
  }

  private async sendAll(): Promise<void> {
    this.stopRetrying();
    const showSaving = setTimeout(() => {
      const state = this.save();
      if (state.kind === 'saved') this.save.set({ kind: 'saving', at: state.at });
    }, SHOW_SAVING_AFTER_MS);
    try {
      let hasMore = true;
      while (hasMore) hasMore = await this.sendOnce();
    } finally {
      clearTimeout(showSaving);
      this.sending = null;
    }
  }

  /** Takes in what somebody else changed. While an edit is on its way, its answer brings the same. */
  async takeIn(): Promise<void> {
    const draftId = this.draftState()?.id;
    if (this.sending !== null || draftId === undefined) return;
    const known = this.revision();
    try {
      const draft = await this.api.readDraft(draftId);
      if (draft.revision <= known) return;
      const since = await this.api.history(draftId, known);
      if (this.draftState()?.id !== draftId || draft.revision <= this.revision() || this.sending !== null) return;
      const news = since.filter((entry) => entry.revision > known);
      this.settleOn(draft, (current) => moveOn(current, draft), changeWords(news, this.clientId));
      void this.send();
    } catch (error) {
      // The stream tells of the next change and sending tells of no connection; here only faults go on.
      problemFromError(error);
    }
  }

  /** @returns whether there may be more to send */
  private async sendOnce(): Promise<boolean> {
    const draftId = this.draftState()?.id;
    const journal = this.journalState();
    if (draftId === undefined || journal === null || isSettled(journal) || this.save().kind === 'closed') return false;
    const consigned = consign(journal, () => crypto.randomUUID());
    this.setJournal(consigned);
    if (consigned.sending === null) return false;
    const body = commandBatch(consigned.sending, this.clientId, this.reachedStep);
    if (body === null) {
      this.settle((current) => refuse(current, current.server, TOO_LARGE), null);
      return true;
    }
    try {
      const draft = await this.api.sendCommands(draftId, body);
      if (this.draftState()?.id !== draftId) return false;
      this.reachedStep = null;
      this.settleOn(draft, (current) => acceptAnswer(current, draft), null);
      return true;
    } catch (error) {
      const problem = problemFromError(error);
      return this.draftState()?.id === draftId && this.answerFailure(draftId, problem);
    }
  }

  private async answerFailure(draftId: string, problem: ApiProblem): Promise<boolean> {
    const moved = this.api.movedOn(problem);
    if (moved !== null) {
      const { draft, since } = moved;
      this.settleOn(draft, (current) => moveOn(current, draft), changeWords(since, this.clientId));
      return true;
    }
    switch (problem.slug) {
      case 'command-refused':
      case 'invalid-input':
        return this.takeRefusal(draftId, problem.details.detail);
      case 'wrong-state':
      case 'not-allowed':
      case 'not-found':
        this.save.set({ kind: 'closed', reason: problem.details.detail });
        this.listener.closed();
        return false;
      default:
        this.retryLater();
        return false;
    }
  }

  private async takeRefusal(draftId: string, reason: string): Promise<boolean> {
    try {
      const draft = await this.api.readDraft(draftId);
      this.settleOn(draft, (current) => refuse(current, draft, reason), null);
      return true;
    } catch (error) {
      problemFromError(error);
      this.retryLater();
      return false;
    }
  }

  private retryLater(): void {
    this.save.set({ kind: 'unreachable' });
    this.retryTimer = setTimeout(() => void this.send(), this.waitMs);
    this.waitMs = Math.min(this.waitMs * 2, LONGEST_WAIT_MS);
  }

  private stopRetrying(): void {
    if (this.retryTimer !== null) clearTimeout(this.retryTimer);
    this.retryTimer = null;
  }

  private settleOn(draft: Draft, step: (journal: DraftJournal) => RebasedJournal, changed: string | null): void {
    this.draftState.set(draft);
    this.save.set({ kind: 'saved', at: draft.updatedAt });
    this.waitMs = FIRST_WAIT_MS;
    this.settle(step, changed);
  }

  private settle(step: (journal: DraftJournal) => RebasedJournal, changed: string | null): void {
    const journal = this.journalState();
    if (journal === null) return;
    const { journal: rebased, setAside } = step(journal);
    this.setJournal(rebased);
    if (changed !== null || setAside.length > 0) this.listener.movedOn(changed, setAside);
  }

  private setJournal(journal: DraftJournal): void {
    this.journalState.set(journal);
    const draftId = this.draftState()?.id;
    if (draftId === undefined) return;
    this.shelf.keep(draftId, [...(journal.sending?.batches ?? []), ...journal.waiting]);
  }
}
