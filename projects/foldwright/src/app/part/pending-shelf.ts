import { Injectable, InjectionToken, inject } from '@angular/core';
import { sendCommands } from '@foldwright/shared/contracts/parts';
import type { EditBatch } from './draft-journal';

/** Where unsent edits are kept over a closed tab; a test puts its own in. */
export const SHELF_STORAGE = new InjectionToken<Storage>('SHELF_STORAGE', {
  providedIn: 'root',
  factory: () => localStorage,
});

/** Edits that the server has not answered yet, kept in the browser until it has. */
@Injectable({ providedIn: 'root' })
export class PendingShelf {
  private readonly storage = inject(SHELF_STORAGE);

  keep(draftId: string, batches: readonly EditBatch[]): void {
    if (batches.length === 0) {
      this.storage.removeItem(keyOf(draftId));
      return;
    }
    try {
      this.storage.setItem(keyOf(draftId), JSON.stringify(batches));
    } catch {
      // The browser's store is full or switched off: the edits still wait in this tab, as the page says.
    }
  }

  /** What was kept; whatever is not an edit of today's vocabulary is left out. */
  take(draftId: string): readonly EditBatch[] {
    const text = this.storage.getItem(keyOf(draftId));
    if (text === null) return [];
    return readBatches(text);
  }
}

function keyOf(draftId: string): string {
  return `foldwright.unsent.${draftId}`;
}

function readBatches(text: string): readonly EditBatch[] {
  let kept: unknown;
  try {
    kept = JSON.parse(text);
  } catch {
    // Cut off while it was written; nothing of it can be trusted.
    return [];
  }
  if (!Array.isArray(kept)) return [];
  return kept.flatMap((item: unknown): readonly EditBatch[] => {
    if (typeof item !== 'object' || item === null || !('id' in item) || !('label' in item) || !('commands' in item))
      return [];
    const { id, label, commands } = item;
    if (typeof id !== 'string' || typeof label !== 'string') return [];
    // The commands pass the schema that the server holds them to.
    const parsed = sendCommands.body.safeParse({ baseRevision: 0, batchId: id, clientId: 'shelf', commands });
    return parsed.success ? [{ id, label, commands: parsed.data.commands }] : [];
  });
}
