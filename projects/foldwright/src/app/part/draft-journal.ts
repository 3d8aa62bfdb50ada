import { applyCommands } from '@foldwright/shared/part/apply-command';
import { CommandRefusal } from '@foldwright/shared/part/command-refusal';
import type { PartCommand } from '@foldwright/shared/part/commands';
import type { PartDocument } from '@foldwright/shared/part/part-document';

/** Commands that belong together: they are kept, sent and set aside as one. */
export interface EditBatch {
  readonly id: string;
  readonly label: string;
  readonly commands: readonly PartCommand[];
}

/** A document as the server last gave it. */
export interface ServerDraft {
  readonly revision: number;
  readonly document: PartDocument;
}

/** What is on its way to the server: sent again unchanged until it is answered, so that it counts once. */
export interface Consignment {
  readonly batchId: string;
  readonly baseRevision: number;
  readonly batches: readonly EditBatch[];
}

/** The server's draft with one's own edits on top, answered or not. */
export interface DraftJournal {
  readonly server: ServerDraft;
  readonly sending: Consignment | null;
  readonly waiting: readonly EditBatch[];
  /** The server's document with everything of one's own applied: what is drawn. */
  readonly document: PartDocument;
}

/** An own edit that no longer fits what somebody else made of the draft. */
export interface SetAside {
  readonly batch: EditBatch;
  readonly reason: string;
}

/** A journal after the server's draft moved under it. */
export interface RebasedJournal {
  readonly journal: DraftJournal;
  readonly setAside: readonly SetAside[];
}

/** Most commands that the server takes in one request. */
const MOST_COMMANDS = 200;

/** A journal without edits. */
export function openJournal(server: ServerDraft): DraftJournal {
  return { server, sending: null, waiting: [], document: server.document };
}

/** Adds an edit. @throws CommandRefusal when the document can't take it; the journal stays as it was */
export function recordBatch(journal: DraftJournal, batch: EditBatch): DraftJournal {
  const document = applyCommands(journal.document, batch.commands);
  return { ...journal, waiting: [...journal.waiting, batch], document };
}

/** Whether everything of one's own has been answered. */
export function isSettled(journal: DraftJournal): boolean {
  return journal.sending === null && journal.waiting.length === 0;
}

/**
 * Takes what waits into one consignment, unless one is on its way already: that one stays, to be sent again.
 * @param newId id of the consignment when a new one is made
 */
export function consign(journal: DraftJournal, newId: () => string): DraftJournal {
  if (journal.sending !== null || journal.waiting.length === 0) return journal;
  let count = 0;
  const batches: EditBatch[] = [];
  for (const batch of journal.waiting) {
    if (batches.length > 0 && count + batch.commands.length > MOST_COMMANDS) break;
    batches.push(batch);
    count += batch.commands.length;
  }
  return {
    ...journal,
    sending: { batchId: newId(), baseRevision: journal.server.revision, batches },
    waiting: journal.waiting.slice(batches.length),
  };
}

/** The server took the consignment; its document is the ground now. */
export function acceptAnswer(journal: DraftJournal, server: ServerDraft): RebasedJournal {
  return rebase({ ...journal, sending: null }, server, journal.waiting);
}

/**
 * Somebody else changed the draft: the server's document is the ground, and one's own edits are laid on it again, one
 * batch after the other; those that no longer fit are handed back, never applied half and never forced.
 */
export function moveOn(journal: DraftJournal, server: ServerDraft): RebasedJournal {
  const own = [...(journal.sending?.batches ?? []), ...journal.waiting];
  return rebase({ ...journal, sending: null }, server, own);
}

/** The server refused the consignment's commands: they are handed back, the rest is tried on the server's document. */
export function refuse(journal: DraftJournal, server: ServerDraft, reason: string): RebasedJournal {
  const refused = (journal.sending?.batches ?? []).map((batch): SetAside => ({ batch, reason }));
  const { journal: rest, setAside } = rebase({ ...journal, sending: null }, server, journal.waiting);
  return { journal: rest, setAside: [...refused, ...setAside] };
}

function rebase(journal: DraftJournal, server: ServerDraft, own: readonly EditBatch[]): RebasedJournal {
  let document = server.document;
  const waiting: EditBatch[] = [];
  const setAside: SetAside[] = [];
  for (const batch of own) {
    try {
      document = applyCommands(document, batch.commands);
      waiting.push(batch);
    } catch (error) {
      // Only a refusal means that the edit no longer fits; anything else is a fault and goes on.
      if (!(error instanceof CommandRefusal)) throw error;
      setAside.push({ batch, reason: error.message });
    }
  }
  return { journal: { ...journal, server, waiting, document }, setAside };
}
