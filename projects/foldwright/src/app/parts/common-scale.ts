import { drawPart } from '@foldwright/ui/formed-preview/draw-part';
import type { PartSummary } from '@foldwright/shared/contracts/parts';

/** Room for a drawing on a card, and the scale beyond which small parts would look larger than they are. */
const ROOM_PX = { width: 262, height: 176 };
const LARGEST_PX_PER_MM = 1.1;

/** The one scale, px per mm, at which every part of a list fits its card. */
export function commonScale(parts: readonly PartSummary[]): number {
  return parts.reduce((scale, part) => {
    if (part.document === null) return scale;
    const { widthPx, heightPx } = drawPart(part.document, part.state);
    if (widthPx === 0 || heightPx === 0) return scale;
    return Math.min(scale, ROOM_PX.width / widthPx, ROOM_PX.height / heightPx);
  }, LARGEST_PX_PER_MM);
}
