import { computed, signal } from '@angular/core';
import { type Draft, type PartDetail, computeDraft, readDraft, sendCommands } from '@foldwright/shared/contracts/parts';
import type { ComputedPart } from '@foldwright/shared/contracts/development-schema';
import { PROBLEMS, type ProblemSlug } from '@foldwright/shared/contracts/problems';
import type { LiveEvent } from '@foldwright/shared/contracts/system';
import { applyCommands } from '@foldwright/shared/part/apply-command';
import { CommandRefusal } from '@foldwright/shared/part/command-refusal';
import type { PartCommand } from '@foldwright/shared/part/commands';
import { developPart } from '@foldwright/shared/part/develop-part';
import type { PartDocument, StockRole } from '@foldwright/shared/part/part-document';
import { checkDevelopedPart } from '@foldwright/shared/rules/check-part';
import { Subject } from 'rxjs';
import type { ApiRead } from '../../api/api-client';
import { ApiProblem } from '../../api/api-problem';
import type { CommandBatch, CommandLogEntry } from '../../api/drafts-api';

export const PART_ID = '11111111-1111-4111-8111-111111111111';
export const DRAFT_ID = '22222222-2222-4222-8222-222222222222';

/** A server with one part and one draft, in memory: it applies commands with the kernel and refuses a stale revision. */
export class DraftServer {
  readonly log: (CommandLogEntry & { readonly batchId: string })[] = [];
  readonly events = new Subject<LiveEvent>();
  readonly resumed = new Subject<void>();
  isReachable = true;
  /** Loses the answer of the next change after it was made. */
  losesNextAnswer = false;
  canEdit = true;
  refusesWith: ProblemSlug | null = null;
  revision = 1;

  constructor(public document: PartDocument) {}

  get draft(): Draft {
    const draft = {
      id: DRAFT_ID,
      partId: PART_ID,
      letter: 'A',
      revision: this.revision,
      document: this.document,
      furthestStep: 'outline',
      updatedAt: '2026-05-03T14:02:00.000Z',
      updatedBy: 'Tomasz Wren',
    };
    // As it would come over the wire, held to the contract.
    return readDraft.response.parse(JSON.parse(JSON.stringify(draft)));
  }

  get detail(): PartDetail {
    const { id, letter, revision, furthestStep, updatedAt, updatedBy } = this.draft;
    return {
      id: PART_ID,
      number: 'LC-07',
      name: 'Grinder cradle',
      revision: 1,
      draft: { id, letter, revision, furthestStep, updatedAt, updatedBy, blockers: 0, cautions: 0, hints: 0 },
      revisions: [],
      photos: [],
      hand: 'either',
      otherHandPartId: null,
      canEdit: this.canEdit,
    };
  }

  /** In place of `PartsApi`. */
  readonly partsApi = {
    part: (): ApiRead<PartDetail> => {
      const value = signal<PartDetail | undefined>(undefined);
      return {
        value: value.asReadonly(),
        problem: computed(() => null),
        isLoading: computed(() => false),
        reload: () => value.set(this.detail),
        set: (detail) => value.set(detail),
      };
    },
    readPart: async (): Promise<PartDetail> => this.answer(this.detail),
    startDraft: async (): Promise<Draft> => this.answer(this.draft),
  };

  /** In place of `DraftsApi`. */
  readonly draftsApi = {
    readDraft: async (): Promise<Draft> => this.answer(this.draft),
    history: async (_draftId: string, since = 0): Promise<readonly CommandLogEntry[]> =>
      this.answer(this.log.filter((entry) => entry.revision > since)),
    compute: async (_draftId: string, stock: StockRole): Promise<{ revision: number; computed: ComputedPart }> =>
      this.answer(this.computed(stock)),
    sendCommands: async (_draftId: string, batch: CommandBatch): Promise<Draft> => this.take(batch),
    movedOn: (problem: ApiProblem) =>
      problem.slug === 'draft-moved-on' ? (problem.details.extra as { draft: Draft; since: CommandLogEntry[] }) : null,
  };

  /** In place of `LiveEvents`. */
  get liveEvents() {
    return { events: this.events, resumed: this.resumed };
  }

  private computed(stock: StockRole): { revision: number; computed: ComputedPart } {
    const result = developPart(this.document, stock);
    const computed = {
      role: stock,
      stockLabel: 'as the server says it',
      development: result.ok ? result.development : null,
      findings: checkDevelopedPart(this.document, stock, result),
    };
    return computeDraft.response.parse(JSON.parse(JSON.stringify({ revision: this.revision, computed })));
  }

  /** Somebody else's change, told on the live stream. */
  change(commands: readonly PartCommand[], by = 'Imogen Harrow', clientId = 'another-tab'): void {
    const batch = { baseRevision: this.revision, batchId: crypto.randomUUID(), clientId, commands };
    this.keep(sendCommands.body.parse(batch).commands, clientId, by, batch.batchId);
  }

  private async take(batch: CommandBatch): Promise<Draft> {
    await this.answer(null);
    if (this.refusesWith !== null) throw this.problem(this.refusesWith, 'Revision A was released in the meantime.');
    if (this.log.some((entry) => entry.batchId === batch.batchId)) return this.draft;
    if (batch.baseRevision !== this.revision) {
      const since = this.log.filter((entry) => entry.revision > batch.baseRevision);
      throw this.problem('draft-moved-on', 'Somebody else was quicker.', { draft: this.draft, since });
    }
    try {
      this.keep(batch.commands, batch.clientId, 'Tomasz Wren', batch.batchId);
    } catch (error) {
      if (error instanceof CommandRefusal) throw this.problem('command-refused', error.message);
      throw error;
    }
    if (this.losesNextAnswer) {
      this.losesNextAnswer = false;
      throw this.problem('offline', 'No connection.');
    }
    return this.draft;
  }

  private keep(commands: CommandBatch['commands'], clientId: string, by: string, batchId: string): void {
    this.document = applyCommands(this.document, commands);
    this.revision += 1;
    this.log.push({ revision: this.revision, commands, by, clientId, at: '2026-05-03T14:03:00.000Z', batchId });
    this.events.next({
      kind: 'draft-changed',
      seq: this.revision,
      draftId: DRAFT_ID,
      partId: PART_ID,
      revision: this.revision,
      clientId,
      by,
    });
  }

  private async answer<T>(value: T): Promise<T> {
    // An answer never arrives in the same turn as its question.
    await Promise.resolve();
    if (!this.isReachable) throw this.problem('offline', 'No connection.');
    return value;
  }

  private problem(slug: ProblemSlug | 'offline', detail: string, extra?: unknown): ApiProblem {
    const known = slug === 'offline' ? { status: 0, title: 'No connection' } : PROBLEMS[slug];
    return new ApiProblem(slug, { type: `/problems/${slug}`, ...known, detail, instance: '', extra });
  }
}
