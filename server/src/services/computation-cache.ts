import type { PartDocument, StockRole } from '@foldwright/shared/part/part-document';
import type { Computation, PartComputations } from './computed-part';
import { computePart } from './computed-part';

const CAPACITY = 200;

/**
 * The latest computations of this process, by draft, revision and sheet. A draft's revision never changes its content,
 * so an entry never goes stale; the oldest ones make room. Entries are put in only after the revision was committed.
 */
export class ComputationCache {
  private readonly entries = new Map<string, Computation>();

  remember(draftId: string, revision: number, computations: PartComputations): void {
    this.put(keyOf(draftId, revision, 'trial'), computations.trial);
    this.put(keyOf(draftId, revision, 'production'), computations.production);
  }

  /** The computation of a committed revision, from memory or made now. */
  get(draftId: string, revision: number, role: StockRole, document: () => PartDocument): Computation {
    const key = keyOf(draftId, revision, role);
    const known = this.entries.get(key);
    if (known !== undefined) return known;
    const made = computePart(document(), role);
    this.put(key, made);
    return made;
  }

  private put(key: string, computation: Computation): void {
    this.entries.delete(key);
    this.entries.set(key, computation);
    if (this.entries.size <= CAPACITY) return;
    const [oldest] = this.entries.keys();
    if (oldest !== undefined) this.entries.delete(oldest);
  }
}

const keyOf = (draftId: string, revision: number, role: StockRole): string => `${draftId}/${revision}/${role}`;
