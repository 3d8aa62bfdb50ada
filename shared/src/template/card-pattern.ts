import { LARGEST_CARD_ANGLE_DEG, faceInBend, readDepthMm } from '../bending/card';
import type { CardTemplate } from '../bending/card';
import { halfTangent, setbackMm } from '../bending/allowance';
import type { BendZone, BendingStock, DevelopmentProblem, FlatHole, FlatSlot, Panel } from '../bending/development';
import type { BendDirection, CardHinge, Layout } from '../bending/layout';
import type { ResolvedBend } from '../bending/resolved-bend';
import { unfoldLayout } from '../bending/unfold-layout';
import type { Bounds, Point } from '../geometry/point';
import type { Loop } from '../geometry/path';
import { along, dot, subtract } from '../geometry/vector';

/** Card that a template is to be made of. */
export interface CardStock {
  readonly thicknessMm: number;
  readonly hinge: CardHinge;
  /** Face of the card, and of the metal, that bears on the machine. */
  readonly bearingFace: 'A' | 'B';
}

/** A line to crease the card along. */
export interface CardCrease {
  readonly bendId: string;
  readonly name: string;
  readonly from: Point;
  readonly to: Point;
  readonly direction: BendDirection;
  readonly bendAngleDeg: number;
}

/** A template to cut from card and crease, face A up, the base panel where the layout has it. Lengths in mm. */
export interface CardPattern {
  readonly outer: Loop;
  readonly cutouts: readonly Loop[];
  readonly holes: readonly FlatHole[];
  readonly slots: readonly FlatSlot[];
  readonly creases: readonly CardCrease[];
  readonly panels: readonly Panel[];
  readonly bounds: Bounds;
}

export type CardPatternResult =
  | { readonly ok: true; readonly pattern: CardPattern }
  | { readonly ok: false; readonly problems: readonly DevelopmentProblem[] };

/** A crease has no width; this much stands for it while the panels are laid out, mm: far below what a knife can follow. */
const CREASE_MM = 0.001;

/**
 * The template that, folded about its hinge, has its bearing faces where the metal's will be: a design goes back onto the machine as card
 * before any metal is cut. Card neither stretches nor rounds: a leg of it, from hinge to hinge, differs from the leg on its bearing face
 * by the depth between the two times tan(A/2). Source: plane geometry of two nested angles.
 * @param template the card the layout was taken from; null when it was typed.
 * @param stock the metal whose faces count.
 * @returns problems for layouts that cannot be developed, and for bends so sharp that card has no apex there (above 165 degrees)
 */
export function cardPattern(
  layout: Layout,
  template: CardTemplate | null,
  stock: BendingStock,
  card: CardStock,
): CardPatternResult {
  const refused = layout.bends.flatMap((bend, index) =>
    refusal(bend.id, `B${String(index + 1)}`, bend.bendAngleDeg, card),
  );
  if (refused.length > 0) return { ok: false, problems: refused };
  const laidOut = unfoldLayout(layout, template, stock, (bend) => asCrease(bend, card));
  if (!laidOut.ok) return laidOut;
  const { unfolded, bends } = laidOut;
  const { outer, cutouts, holes, slots, panels, bounds } = unfolded;
  const creases = unfolded.zones.flatMap((zone): readonly CardCrease[] => {
    const bend = bends.find(({ declaration }) => declaration.id === zone.bendId);
    if (bend === undefined) return [];
    const { name, declaration } = bend;
    const { direction, bendAngleDeg } = declaration;
    return [{ bendId: zone.bendId, name, direction, bendAngleDeg, ...middleOf(zone) }];
  });
  return { ok: true, pattern: { outer, cutouts, holes, slots, creases, panels, bounds } };
}

function refusal(id: string, name: string, bendAngleDeg: number, card: CardStock): readonly DevelopmentProblem[] {
  const { hinge, thicknessMm } = card;
  if (hinge.kind === 'depth' && !(hinge.depthMm >= 0 && hinge.depthMm <= thicknessMm)) {
    const message = `Bend ${name}: the card can't hinge at a depth of ${String(hinge.depthMm)} mm.`;
    return [{ code: 'referenceNotAllowed', message, ids: [id] }];
  }
  if (bendAngleDeg <= LARGEST_CARD_ANGLE_DEG) return [];
  const message = `Bend ${name} turns ${String(bendAngleDeg)}°; card shows no more than ${String(LARGEST_CARD_ANGLE_DEG)}°.`;
  return [{ code: 'angleOutOfRange', message, ids: [id] }];
}

/** The same bend made in card: a crease where the legs on the bearing face come out as the metal's. */
function asCrease(bend: ResolvedBend, card: CardStock): ResolvedBend {
  const { geometry, declaration } = bend;
  const held = faceInBend(card.bearingFace, declaration.direction);
  const bearingDepthMm = held === 'inside' ? 0 : card.thicknessMm;
  const hingeDepthMm = readDepthMm(
    { thicknessMm: card.thicknessMm, reading: { readOn: 'crease', bearingFace: card.bearingFace, hinge: card.hinge } },
    declaration.direction,
  );
  // From the metal's tangent line on to the apex of the face that bears, and from there to the hinge.
  const beyondMm =
    setbackMm(geometry, held === 'inside' ? 'insideApex' : 'outsideApex') +
    (hingeDepthMm - bearingDepthMm) * halfTangent(geometry.bendAngleDeg);
  return {
    ...bend,
    allowanceMm: CREASE_MM,
    layoutSetbackMm: bend.layoutSetbackMm - beyondMm + CREASE_MM / 2,
  };
}

/** The line along the middle of a crease, from side to side. */
function middleOf(zone: BendZone): { readonly from: Point; readonly to: Point } {
  const middle = along(zone.origin, zone.towardsChild, zone.bendAllowanceMm / 2);
  const reach = zone.outer.map(({ from }) => dot(subtract(from, zone.origin), zone.along));
  return { from: along(middle, zone.along, Math.min(...reach)), to: along(middle, zone.along, Math.max(...reach)) };
}
