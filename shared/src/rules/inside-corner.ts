import type { OutlineLoop } from '../bending/layout';
import { loopFromBulges, signedArea } from '../geometry/loop';
import type { Segment } from '../geometry/path';
import type { Point } from '../geometry/point';
import { arcRadius, segmentLength, tangentAt } from '../geometry/segment';
import { JOIN_MM, TINY_EDGE_MM } from '../geometry/tolerance';
import { cross, distance, dot } from '../geometry/vector';
import type { PartCommand } from '../part/commands';
import { chainSegments, edgeAt, roundedCorner } from '../part/outline-edge-sizes';
import type { DeclaredUse, PartDocument } from '../part/part-document';
import { KERF_SOURCE, widestKerfMm } from '../stock/laser-kerf';
import { radiansFromDeg } from '../units/angle';
import { formatDecimal } from '../units/length';
import type { Finding } from './finding';
import { plural } from './in-words';
import { INSIDE_CORNER, LIMIT_SLACK_MM, ruleFrom } from './limits';
import { mendThatHolds } from './mend-that-holds';
import { type RuleContext, listSome, nameOf, placeOfLayout } from './rule-context';

/** An inside corner that the cut cannot follow. */
interface TightCorner {
  /** The rounding, or the edge that leaves a sharp corner. */
  readonly edgeId: string;
  readonly at: Point;
  readonly radiusMm: number;
  /** Rounds it; empty where there is no room for that. */
  readonly rounding: readonly PartCommand[];
}

/** Uses in which cracks start at sharp corners. */
const SHAKEN: readonly DeclaredUse[] = ['vehicle', 'vibration'];

/**
 * Inside corners of outline and cut-outs that are rounded tighter than half the cut is wide, which no laser can follow. Sharp
 * ones come out with that radius and are nothing to speak of, except in a part that is shaken, where cracks start at them;
 * there they are listed too. Corners where a bend ends are left out, because reliefs take them away. One hint for all.
 */
export function checkInsideCorner(context: RuleContext): readonly Finding[] {
  const { document, sheet } = context;
  const limitMm = INSIDE_CORNER.shareOfKerf * widestKerfMm(sheet.thicknessMm);
  const roundMm = Math.max(INSIDE_CORNER.roundingOverT * sheet.thicknessMm, INSIDE_CORNER.smallestRoundingMm);
  const isShaken = document.declaredUses.some((use) => SHAKEN.includes(use));
  const { outer, cutouts } = document.layout;
  const corners = [outer, ...cutouts].flatMap((outline) => [
    ...tightArcs(outline, outline === outer, limitMm, roundMm),
    ...(isShaken ? sharpCorners(outline, outline === outer, document, roundMm) : []),
  ]);
  const [first] = corners;
  if (first === undefined) return [];
  const tightest = corners.reduce((least, corner) => (corner.radiusMm < least.radiusMm ? corner : least), first);
  const mm = (valueMm: number) => formatDecimal(valueMm, 3);
  const id = 'insideCornerTooSharp';
  const canRound = corners.every(({ rounding }) => rounding.length > 0);
  return [
    {
      id,
      rule: 'insideCornerTooSharp',
      severity: 'hint',
      title: `${corners.length} inside ${plural(corners.length, 'corner is', 'corners are')} sharper than the cut`,
      detail:
        `At ${listSome(corners.map(({ edgeId }) => nameOf(context, edgeId)))}. The cut leaves a radius of about ${mm(limitMm)} mm there` +
        (isShaken ? ', and in a part that is shaken cracks start at such corners.' : '.'),
      foundMm: tightest.radiusMm,
      requiredMm: limitMm,
      why: ruleFrom(INSIDE_CORNER.why.text, KERF_SOURCE),
      ids: corners.map(({ edgeId }) => edgeId),
      at: placeOfLayout(context, tightest.at),
      advice: `Round ${plural(corners.length, 'it', 'them')} at ${formatDecimal(roundMm, 1)} mm or more.`,
      mend: canRound
        ? mendThatHolds(
            context,
            id,
            `Round ${plural(corners.length, 'it', 'them')} at ${formatDecimal(roundMm, 1)} mm`,
            corners.flatMap(({ rounding }) => rounding),
          )
        : null,
    },
  ];
}

/** 1 where the metal lies to the left of the direction of travel, else -1: inside corners turn the other way. */
function metalSide(outline: OutlineLoop, isOuter: boolean): 1 | -1 {
  return signedArea(loopFromBulges(outline.edges)) > 0 === isOuter ? 1 : -1;
}

function tightArcs(outline: OutlineLoop, isOuter: boolean, limitMm: number, roundMm: number): readonly TightCorner[] {
  const side = metalSide(outline, isOuter);
  return chainSegments(outline).flatMap((segment, index): readonly TightCorner[] => {
    const edge = edgeAt(outline.edges, index);
    if (segment.kind === 'line' || edge.bulge * side >= 0 || segmentLength(segment) <= TINY_EDGE_MM) return [];
    const radiusMm = arcRadius(segment);
    if (!(radiusMm < limitMm - LIMIT_SLACK_MM)) return [];
    const corner = roundedCorner(outline, index);
    const next = edgeAt(outline.edges, index + 1);
    const rounding: readonly PartCommand[] =
      corner === null
        ? []
        : [
            { kind: 'removeVertex', edgeId: edge.id },
            { kind: 'moveVertex', edgeId: next.id, to: corner },
            { kind: 'roundCorner', edgeId: next.id, radiusMm: roundMm, newEdgeId: edge.id },
          ];
    return [{ edgeId: edge.id, at: edge.start, radiusMm, rounding }];
  });
}

function sharpCorners(
  outline: OutlineLoop,
  isOuter: boolean,
  { layout }: PartDocument,
  roundMm: number,
): readonly TightCorner[] {
  const side = metalSide(outline, isOuter);
  const segments = chainSegments(outline);
  const bendEnds = layout.bends.flatMap(({ line }) => [line.from, line.to]);
  return segments.flatMap((segment, index): readonly TightCorner[] => {
    const before = segments.at(index - 1);
    const edge = edgeAt(outline.edges, index);
    if (before === undefined || turnRad(before, segment) * side > -SHARP_RAD) return [];
    if (layout.reliefs.mode === 'automatic' && bendEnds.some((end) => distance(end, edge.start) <= JOIN_MM)) return [];
    const isStraight = before.kind === 'line' && segment.kind === 'line';
    const rounding: readonly PartCommand[] = isStraight
      ? [{ kind: 'roundCorner', edgeId: edge.id, radiusMm: roundMm, newEdgeId: `${edge.id}-round` }]
      : [];
    return [{ edgeId: edge.id, at: edge.start, radiusMm: 0, rounding }];
  });
}

/** Smaller turns come from traced curves and leave no notch. */
const SHARP_RAD = radiansFromDeg(30);

/** By how much the direction turns between two segments, radians, positive to the left; 0 where one has no length. */
function turnRad(before: Segment, after: Segment): number {
  if (segmentLength(before) <= TINY_EDGE_MM || segmentLength(after) <= TINY_EDGE_MM) return 0;
  const [arriving, leaving] = [tangentAt(before, 1), tangentAt(after, 0)];
  return Math.atan2(cross(arriving, leaving), dot(arriving, leaving));
}
