import { partCommandSchema } from '@foldwright/shared/contracts/part-document-schema';
import type {
  Draft as DraftAnswer,
  commandLogEntrySchema,
  draftSummarySchema,
} from '@foldwright/shared/contracts/parts';
import { PART_STEPS } from '@foldwright/shared/contracts/parts';
import * as z from 'zod/mini';
import type { CommandBatch } from '../models/command-batch';
import type { Draft } from '../models/draft';
import type { NameOf } from '../services/names-of-people';
import { readStoredDocument } from '../services/stored-document';

const stepSchema = z.enum(PART_STEPS);
const commandsSchema = z.array(partCommandSchema);

/** The step of a stored draft. */
export const readStep = (stored: string): (typeof PART_STEPS)[number] => stepSchema.parse(stored);

export function presentDraft(draft: Draft, nameOf: NameOf): DraftAnswer {
  return {
    id: draft.id,
    partId: draft.partId,
    letter: draft.letter,
    revision: draft.revision,
    document: readStoredDocument(draft.document),
    furthestStep: readStep(draft.furthestStep),
    updatedAt: draft.updatedAt.toISOString(),
    updatedBy: nameOf(draft.updatedBy),
  };
}

export function presentDraftSummary(draft: Draft, nameOf: NameOf): z.output<typeof draftSummarySchema> {
  return {
    id: draft.id,
    letter: draft.letter,
    revision: draft.revision,
    furthestStep: readStep(draft.furthestStep),
    updatedAt: draft.updatedAt.toISOString(),
    updatedBy: nameOf(draft.updatedBy),
    blockers: draft.blockers,
    cautions: draft.cautions,
    hints: draft.hints,
  };
}

export function presentCommandBatch(batch: CommandBatch, nameOf: NameOf): z.output<typeof commandLogEntrySchema> {
  return {
    revision: batch.revision,
    commands: commandsSchema.parse(batch.commands),
    by: nameOf(batch.userId),
    clientId: batch.clientId,
    at: batch.createdAt.toISOString(),
  };
}
