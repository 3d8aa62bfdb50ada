import { halfTangent, setbackMm } from './allowance';
import type { BendGeometry } from './allowance';
import type { BendDirection, CardReading } from './layout';

/** Above this a card's faces meet so far from the crease that lengths read on it no longer say where metal should be, degrees. */
export const LARGEST_CARD_ANGLE_DEG = 165;

/** A template as far as bends depend on it. */
export interface CardTemplate {
  readonly thicknessMm: number;
  readonly reading: CardReading;
}

/** Which face of the metal is held where the card had it. */
export type HeldFace = 'inside' | 'outside';

/** Face A is inside the bend when the sheet turns towards the viewer of face A, outside when it turns away. */
export function faceInBend(face: 'A' | 'B', direction: BendDirection): HeldFace {
  return (face === 'A') === (direction === 'towards') ? 'inside' : 'outside';
}

/** Depth in the card, measured from the inside of the bend, at which the lengths were read, mm. */
export function readDepthMm(template: CardTemplate, direction: BendDirection): number {
  const { thicknessMm, reading } = template;
  const fromFaceA = depthFromFaceA(thicknessMm, reading);
  return direction === 'towards' ? fromFaceA : thicknessMm - fromFaceA;
}

function depthFromFaceA(thicknessMm: number, reading: CardReading): number {
  if (reading.readOn === 'faceA') return 0;
  if (reading.readOn === 'faceB') return thicknessMm;
  const { hinge } = reading;
  if (hinge.kind === 'middle') return thicknessMm / 2;
  if (hinge.kind === 'depth') return hinge.depthMm;
  return hinge.face === 'A' ? 0 : thicknessMm;
}

/**
 * Distance from a template's crease back to the metal's tangent line, mm, on each side of the bend; negative when the metal
 * has to start beyond the crease. The card's bearing face is longer per leg than the read one by the difference of their depths
 * times tan(A/2); the metal's face that is held has to come out at just that length.
 * Source: plane geometry of two nested angles.
 * @throws RangeError above 165 degrees and for bends outside the range of `setbackMm`.
 */
export function templateSetbackMm(bend: BendGeometry, direction: BendDirection, template: CardTemplate): number {
  if (bend.bendAngleDeg > LARGEST_CARD_ANGLE_DEG) {
    throw new RangeError(
      `Lengths of a template hold up to ${String(LARGEST_CARD_ANGLE_DEG)} degrees, got ${String(bend.bendAngleDeg)}`,
    );
  }
  const held = faceInBend(template.reading.bearingFace, direction);
  const bearingDepthMm = held === 'inside' ? 0 : template.thicknessMm;
  const gainMm = (bearingDepthMm - readDepthMm(template, direction)) * halfTangent(bend.bendAngleDeg);
  return setbackMm(bend, held === 'inside' ? 'insideApex' : 'outsideApex') - gainMm;
}
