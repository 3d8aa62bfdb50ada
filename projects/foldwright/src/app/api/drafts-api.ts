import { Injectable, inject } from '@angular/core';
import type { ComputedPart } from '@foldwright/shared/contracts/development-schema';
import {
  type Draft,
  type commandLogEntrySchema,
  computeDraft,
  draftMovedOnExtraSchema,
  printDraft,
  readDraft,
  readDraftHistory,
  releaseDraft,
  sendCommands,
} from '@foldwright/shared/contracts/parts';
import type { RevisionSummary } from '@foldwright/shared/contracts/revisions';
import type { RouteBody } from '@foldwright/shared/contracts/route';
import type { StockRole } from '@foldwright/shared/part/part-document';
import type * as z from 'zod/mini';
import { ApiClient, type ApiRead, newIdempotencyKey } from './api-client';
import type { ApiProblem } from './api-problem';

export type CommandLogEntry = z.output<typeof commandLogEntrySchema>;
export type CommandBatch = RouteBody<typeof sendCommands>;

/** A connection that broke without a word hangs; edits are sent again after so long, and count once. */
const EDIT_WITHIN_MS = 15_000;

/** The draft of a part: its document, its commands and what the server computes of it. */
@Injectable({ providedIn: 'root' })
export class DraftsApi {
  private readonly client = inject(ApiClient);

  draft(draftId: () => string | undefined): ApiRead<Draft> {
    return this.client.read(readDraft, () => {
      const id = draftId();
      return id === undefined ? undefined : { params: { draftId: id } };
    });
  }

  readDraft(draftId: string): Promise<Draft> {
    return this.client.call(readDraft, { params: { draftId } }, EDIT_WITHIN_MS);
  }

  /** Sends a batch of commands; a batch that arrives twice counts once. */
  sendCommands(draftId: string, batch: CommandBatch): Promise<Draft> {
    return this.client.call(sendCommands, { params: { draftId }, body: batch }, EDIT_WITHIN_MS);
  }

  /** What came in between, of a `draft-moved-on` problem; null for any other. */
  movedOn(problem: ApiProblem): { readonly draft: Draft; readonly since: readonly CommandLogEntry[] } | null {
    return problem.slug === 'draft-moved-on' ? problem.extra(draftMovedOnExtraSchema) : null;
  }

  async history(draftId: string, sinceRevision?: number): Promise<readonly CommandLogEntry[]> {
    const query = sinceRevision === undefined ? {} : { sinceRevision };
    return (await this.client.call(readDraftHistory, { params: { draftId }, query })).entries;
  }

  compute(draftId: string, stock: StockRole): Promise<{ revision: number; computed: ComputedPart }> {
    return this.client.call(computeDraft, { params: { draftId }, query: { stock } });
  }

  release(
    draftId: string,
    body: RouteBody<typeof releaseDraft>,
    idempotencyKey = newIdempotencyKey(),
  ): Promise<RevisionSummary> {
    return this.client.call(releaseDraft, { params: { draftId }, body, idempotencyKey });
  }

  /** Address of the draft's full-size print (PDF). */
  printUrl(draftId: string, paper: 'A4' | 'Letter', stock: StockRole): string {
    return this.client.url(printDraft, { params: { draftId }, query: { paper, stock } });
  }
}
