import { loopBounds, pointInLoop } from '../geometry/loop';
import { findCrossings } from '../geometry/loop-crossings';
import type { Loop } from '../geometry/path';
import { boundsMeet } from '../geometry/vector';
import type { PartCommand } from '../part/commands';
import { formatDecimal } from '../units/length';
import { bridgedGap, outlineEdges } from './bridge';
import { type CutOpening, drawnSheet, isInsideOf } from './cut-openings';
import type { Finding, Mend } from './finding';
import { capital, plural } from './in-words';
import { BRIDGE } from './limits';
import { mendThatHolds } from './mend-that-holds';
import { type RuleContext, listSome, nameOf, placeOfLayout } from './rule-context';

const KIND = { hole: 'hole', slot: 'slot', cutout: 'cut-out' } as const;

/**
 * Openings inside an opening. Everything inside a cut comes loose with it: a hole there is cut into scrap, and a cut-out there
 * is a piece that was meant to stay, as in a stencil, and drops out. A blocker, because the part is not what was drawn.
 */
export function checkPieceDropsOut(context: RuleContext): readonly Finding[] {
  const { openings } = drawnSheet(context.document.layout);
  const held = new Map<CutOpening, CutOpening[]>();
  const boxes = new Map(openings.map((opening) => [opening, loopBounds(opening.loop)]));
  for (const inner of openings) {
    const around = openings.filter((outer) => {
      const [a, b] = [boxes.get(inner), boxes.get(outer)];
      return outer !== inner && a != null && b != null && boundsMeet(a, b, 0) && liesInside(inner, outer);
    });
    // The innermost opening around it is the one that lies in all the others.
    const nearest = around.find((one) => around.every((other) => other === one || isInsideOf(one, other)));
    if (nearest !== undefined) held.set(nearest, [...(held.get(nearest) ?? []), inner]);
  }
  return [...held].map(([outer, inside]) => describe(context, outer, inside));
}

function liesInside(inner: CutOpening, outer: CutOpening): boolean {
  return isInsideOf(inner, outer) && findCrossings([inner.loop, outer.loop], 0).length === 0;
}

function describe(context: RuleContext, outer: CutOpening, inside: readonly CutOpening[]): Finding {
  const outerName = nameOf(context, outer.id);
  const names = listSome(inside.map(({ id }) => nameOf(context, id)));
  const isPiece = inside.some(({ kind }) => kind === 'cutout');
  const widthMm = Math.max(BRIDGE.overT * context.sheet.thicknessMm, BRIDGE.smallestMm);
  const lies = plural(inside.length, 'lies', 'lie');
  const id = `pieceDropsOut-${outer.id}`;
  return {
    id,
    rule: 'pieceDropsOut',
    severity: 'blocker',
    title: isPiece
      ? `What is inside ${KIND[outer.kind]} ${outerName} drops out`
      : `${capital(names)} ${lies} inside ${KIND[outer.kind]} ${outerName}`,
    detail: isPiece
      ? `${names} ${lies} inside ${outerName} with nothing to hold ${plural(inside.length, 'it', 'them')}. A piece that is to ` +
        `stay needs a bridge of ${formatDecimal(widthMm, 1)} mm.`
      : `What ${outerName} cuts out drops out whole, and ${names} with it.`,
    foundMm: isPiece ? 0 : null,
    requiredMm: isPiece ? widthMm : null,
    why: BRIDGE.why,
    ids: [outer.id, ...inside.map((opening) => opening.id)],
    at: placeOfLayout(context, inside[0]?.centre ?? outer.centre),
    advice: isPiece
      ? 'Leave a bridge across the gap, better two opposite ones on a piece over 40 mm, or take the inner cut away.'
      : `Take ${names} away, or make ${outerName} smaller.`,
    mend: isPiece ? bridge(context, id, outer, inside, widthMm) : removeInside(context, id, inside, names),
  };
}

function removeInside(
  context: RuleContext,
  findingId: string,
  inside: readonly CutOpening[],
  names: string,
): Mend | null {
  return mendThatHolds(
    context,
    findingId,
    `Take ${names} away`,
    inside.map((opening): PartCommand => ({ kind: 'removeFeature', featureId: opening.id })),
  );
}

/** Holds each piece by a bridge, one after another; offered only where all that lies inside are pieces. */
function bridge(
  context: RuleContext,
  findingId: string,
  outer: CutOpening,
  inside: readonly CutOpening[],
  widthMm: number,
): Mend | null {
  if (outer.kind !== 'cutout' || inside.some(({ kind }) => kind !== 'cutout')) return null;
  let gap: Loop | null = outer.loop;
  for (const piece of inside) {
    const corner = piece.loop[0]?.from;
    if (gap === null || corner === undefined || pointInLoop(corner, gap, 0) !== 'inside') return null;
    gap = bridgedGap(gap, piece.loop, widthMm);
  }
  if (gap === null) return null;
  const removals = [outer, ...inside].map((opening): PartCommand => ({ kind: 'removeCutout', loopId: opening.id }));
  const loop = { id: outer.id, edges: outlineEdges(gap, outer.id) };
  const count = inside.length === 1 ? 'a bridge' : `${inside.length} bridges`;
  return mendThatHolds(context, findingId, `Leave ${count} of ${formatDecimal(widthMm, 1)} mm`, [
    ...removals,
    { kind: 'addCutout', loop },
  ]);
}
