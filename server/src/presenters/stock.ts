import type { BracketRef, HardwareItem as HardwareContract } from '@foldwright/shared/contracts/stock';
import type { HardwareItem } from '../models/hardware-item';
import type { Part } from '../models/part';
import type { Revision } from '../models/revision';

/** Columns of a revision that a reference to a bracket needs. */
export const BRACKET_HEAD = ['id', 'partId', 'letter', 'position', 'hash', 'hand'] as const;
export type BracketHead = Pick<Revision, (typeof BRACKET_HEAD)[number]>;

export function presentBracket(revision: BracketHead, part: Pick<Part, 'name' | 'number'>): BracketRef {
  return {
    revisionId: revision.id,
    partId: revision.partId,
    partName: part.name,
    partNumber: part.number,
    letter: revision.letter,
    hash: revision.hash,
    hand: revision.hand,
  };
}

export function presentHardware(item: HardwareItem): HardwareContract {
  return {
    id: item.id,
    name: item.name,
    specification: item.specification,
    cost: { amountMinor: item.costMinor, currency: item.currency },
    isInUse: item.isInUse,
    revision: item.revision,
  };
}
