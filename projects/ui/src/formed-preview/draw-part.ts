import { layOutMesh, poseFormed } from '@foldwright/shared/bending/formed-mesh';
import { developPart } from '@foldwright/shared/part/develop-part';
import type { PartDocument, StockRole } from '@foldwright/shared/part/part-document';
import { drawSolid } from './draw-solid';
import { drawTemplate } from './draw-template';
import { bestFacing, turned } from './facing';
import type { PartDrawing } from './part-drawing';

/** What a part is made of today: decides its colour and whether it lies flat as card or stands formed. */
export type MadeOf = 'card' | 'blued' | 'trial-steel' | 'alloy' | 'moss' | 'cream' | 'ember';

/** Thickness to draw a card template with when nobody said what it is cut from. */
const USUAL_CARD_MM = 3;
/** Chord error of the drawn mesh: a third of a pixel at the scale of lists. */
const CHORD_MM = 0.3;

const drawn = new WeakMap<PartDocument, Map<MadeOf, PartDrawing>>();

/**
 * Draws a part in what it is made of: card lies flat with its creases, metal stands formed. Metal that can't be developed
 * yet lies flat too. A document is drawn once.
 */
export function drawPart(document: PartDocument, madeOf: MadeOf): PartDrawing {
  const known = drawn.get(document) ?? new Map<MadeOf, PartDrawing>();
  drawn.set(document, known);
  const drawing = known.get(madeOf) ?? drawAnew(document, madeOf);
  known.set(madeOf, drawing);
  return drawing;
}

/** Which of the part's two sheets stands for what it is made of. */
export function sheetOf(madeOf: MadeOf): StockRole {
  return madeOf === 'trial-steel' ? 'trial' : 'production';
}

function drawAnew(document: PartDocument, madeOf: MadeOf): PartDrawing {
  if (madeOf === 'card') return drawTemplate(document.layout, document.template?.thicknessMm ?? USUAL_CARD_MM);
  const role = sheetOf(madeOf);
  const result = developPart(document, role);
  if (!result.ok) return drawTemplate(document.layout, document.stocks[role].thicknessMm);
  const mesh = poseFormed(layOutMesh(result.development, CHORD_MM), 1);
  return drawSolid(turned(mesh, bestFacing(mesh)));
}
