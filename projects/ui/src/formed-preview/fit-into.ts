import type { PartDocument } from '@foldwright/shared/part/part-document';
import { type MadeOf, drawPart } from './draw-part';

/** A part to be drawn by a formed preview at a scale of its own. */
export interface FittedPart {
  readonly document: PartDocument;
  readonly madeOf: MadeOf;
  readonly pxPerMm: number;
}

/** A part at the largest scale at which it goes into a room on the screen. */
export function fitInto(
  document: PartDocument,
  madeOf: MadeOf,
  room: { readonly width: number; readonly height: number },
): FittedPart {
  const { widthPx, heightPx } = drawPart(document, madeOf);
  return { document, madeOf, pxPerMm: Math.min(room.width / widthPx, room.height / heightPx) };
}
