import type { Hand } from '@foldwright/shared/contracts/stock';
import { findFinish } from '@foldwright/shared/stock/finishes';
import type { SaleItem } from '../../models/sale-item';

const HAND_WORDS = { either: '', left: ', left hand', right: ', right hand' } as const;

/** A finish in the words of a letter: its name, or its id when it is no longer offered. */
export const finishWords = (finishId: string): string => findFinish(finishId)?.name.toLowerCase() ?? finishId;

type NamedPiece = Pick<
  SaleItem,
  'hardwareName' | 'hardwareSpecification' | 'partName' | 'letter' | 'hand' | 'finishId'
>;

/** A piece of a sale as people call it: "Pump tray, revision D, left hand, powder coat, moss". */
export function pieceName(item: NamedPiece): string {
  if (item.hardwareName !== null) {
    const { hardwareName, hardwareSpecification } = item;
    return hardwareSpecification ? `${hardwareName}, ${hardwareSpecification}` : hardwareName;
  }
  const hand: Hand = item.hand ?? 'either';
  return `${item.partName}, revision ${item.letter}${HAND_WORDS[hand]}, ${finishWords(item.finishId ?? '')}`;
}
