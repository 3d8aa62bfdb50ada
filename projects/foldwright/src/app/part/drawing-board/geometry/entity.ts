/** Things of a layout that a person can point at. A vertex carries the id of the edge that starts in it. */
export type EntityKind = 'vertex' | 'edge' | 'hole' | 'slot' | 'bend';

/** One of them, by kind and id. */
export interface EntityRef {
  readonly kind: EntityKind;
  readonly id: string;
}

/** Whether two references name the same thing; nothing equals nothing. */
export function isSameEntity(a: EntityRef | null, b: EntityRef | null): boolean {
  return a === b || (a !== null && b !== null && a.kind === b.kind && a.id === b.id);
}
