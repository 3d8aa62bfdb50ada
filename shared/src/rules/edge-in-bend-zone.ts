import type { Development } from '../bending/development';
import { edgeCrossings } from '../geometry/clip';
import type { Loop, Segment } from '../geometry/path';
import type { Point } from '../geometry/point';
import { extremePoint, nearestOnSegment } from '../geometry/segment';
import { dot, scale, subtract, unit } from '../geometry/vector';
import { formatDecimal } from '../units/length';
import { BOUNDARY_MATCH_MM, type BendFront, bendFronts, outlineEdgeOf } from './bend-front';
import type { Finding, Mend } from './finding';
import { DIE_MOUTH, LIMIT_SLACK_MM, TANGENT_DISTANCE } from './limits';
import { mendThatHolds } from './mend-that-holds';
import { type RuleContext, listSome, nameOf, placeOfFlat } from './rule-context';

/** An outline edge that lies too near to a bend. */
interface NearEdge {
  readonly edgeId: string;
  readonly segment: Segment;
  /** Nearest point to the bend, and how far it lies from the tangent line, mm. */
  readonly at: Point;
  readonly heightMm: number;
}

/**
 * Edges of the outline beside a bend: bottoms of notches, and steps that leave part of a flange low. Within 2 T of the tangent
 * line they are drawn into the bend (blocker), over the die's mouth nothing holds them (caution). Side edges that lead away
 * from the bend's ends are as they should be, and a flange that is low all along is told as too short for the die.
 */
export function checkEdgeInBendZone(context: RuleContext): readonly Finding[] {
  const { development } = context;
  if (development === null) return [];
  return bendFronts(development).flatMap((front) => checkFront(context, development, front));
}

function checkFront(context: RuleContext, development: Development, front: BendFront): readonly Finding[] {
  const { thicknessMm, vOpeningMm } = development.stock;
  const halfZoneMm = front.zone.bendAllowanceMm / 2;
  const nearMm = TANGENT_DISTANCE.overT * thicknessMm;
  const clearMm = Math.max(DIE_MOUTH.shareOfV * vOpeningMm - halfZoneMm, nearMm);
  const isLow = front.runs.every((run) => run.every((segment) => peakOf(front, segment) < clearMm - LIMIT_SLACK_MM));
  if (isLow) return [];
  const near = withoutFlanks(
    front,
    front.runs.flatMap((run) => nearEdges(context, front, run, clearMm, thicknessMm)),
  );
  const [first] = near;
  if (first === undefined) return [];
  const nearest = near.reduce((least, edge) => (edge.heightMm < least.heightMm ? edge : least), first);
  const isBlocker = nearest.heightMm < nearMm - LIMIT_SLACK_MM;
  const edgeIds = [...new Set(near.map(({ edgeId }) => edgeId))];
  const names = listSome(edgeIds.map((id) => nameOf(context, id)));
  const bend = nameOf(context, front.bendId);
  const mm = (valueMm: number) => formatDecimal(valueMm, 1);
  const foundMm = nearest.heightMm + halfZoneMm;
  const requiredMm = (isBlocker ? nearMm : clearMm) + halfZoneMm;
  const verb = edgeIds.length === 1 ? 's' : '';
  const id = `edgeInBendZone-${front.bendId}-${String(front.zone.childIndex)}-${front.side}`;
  return [
    {
      id,
      rule: 'edgeInBendZone',
      severity: isBlocker ? 'blocker' : 'caution',
      title: isBlocker ? `${names} would be drawn into ${bend}` : `${names} lie${verb} over the die at ${bend}`,
      detail: isBlocker
        ? `The edge is ${mm(foundMm)} mm from the centre of ${bend}. The metal is pulled along up to ${mm(requiredMm)}.`
        : `The edge is ${mm(foundMm)} mm from the centre of ${bend}. The V ${mm(vOpeningMm)} die gapes to ` +
          `${mm(requiredMm)} on either side, and nothing holds the sheet there.`,
      foundMm,
      requiredMm,
      why: isBlocker ? TANGENT_DISTANCE.why : DIE_MOUTH.why,
      ids: [...edgeIds, front.bendId],
      at: placeOfFlat(development, nearest.at),
      advice: 'Keep the edge further from the bend, cut it after bending, or carry the notch on through the bend.',
      mend: edgeIds.length === 1 ? pushOut(context, id, nearest, clearMm) : null,
    },
  ];
}

function peakOf({ outward, heightOf }: BendFront, segment: Segment): number {
  return heightOf(extremePoint(segment, outward));
}

/**
 * Edges of one run of boundary that come near. What is joined to the ends of the bend leads away from it and counts only where
 * it runs level with the bend for more than a thickness; what comes back to the bend counts in any case.
 */
function nearEdges(
  context: RuleContext,
  front: BendFront,
  run: Loop,
  clearMm: number,
  thicknessMm: number,
): readonly NearEdge[] {
  const isClear = (segment: Segment) => peakOf(front, segment) >= clearMm - LIMIT_SLACK_MM;
  const leaves = run.findIndex(isClear);
  const returns = run.findLastIndex(isClear);
  return run.flatMap((segment, index): readonly NearEdge[] => {
    const isJoined = leaves < 0 || index <= leaves || index >= returns;
    if (isJoined && !isLevel(front, segment)) return [];
    const at = nearestBeside(front, segment, isJoined ? thicknessMm : LIMIT_SLACK_MM);
    if (at === null) return [];
    const heightMm = front.heightOf(at);
    if (heightMm <= LIMIT_SLACK_MM || heightMm >= clearMm - LIMIT_SLACK_MM) return [];
    const edgeId = outlineEdgeOf([context.document.layout.outer], front, segment);
    return edgeId === null ? [] : [{ edgeId, segment, at, heightMm }];
  });
}

/** A notch is named by its bottom: edges that only lead down to it are left out. */
function withoutFlanks(front: BendFront, near: readonly NearEdge[]): readonly NearEdge[] {
  const isFlank = (edge: NearEdge) => edge.segment.kind === 'line' && !isLevel(front, edge.segment);
  const bottoms = near.filter((edge) => !isFlank(edge));
  return near.filter(
    (edge) =>
      !isFlank(edge) ||
      !bottoms.some(({ segment }) => nearestOnSegment(segment, edge.at).distanceMm <= BOUNDARY_MATCH_MM),
  );
}

/** Whether a straight segment runs along the bend. */
function isLevel({ outward }: BendFront, segment: Segment): boolean {
  if (segment.kind === 'arc') return false;
  const direction = subtract(segment.to, segment.from);
  return Math.abs(dot(unit(direction), outward)) <= LEVEL_SINE;
}

/** Sine of 5 degrees: a flange edge that slopes no more counts as level. */
const LEVEL_SINE = 0.087;

/** Point of a segment nearest to the bend among those beside it; null where it lies beside less than `leastMm` of the bend. */
function nearestBeside(
  { along: axis, outward, stretches }: BendFront,
  segment: Segment,
  leastMm: number,
): Point | null {
  const reach = (direction: Point): number => dot(extremePoint(segment, direction), axis);
  const [low, high] = [reach(scale(axis, -1)), reach(axis)];
  let best: Point | null = null;
  for (const stretch of stretches) {
    if (Math.min(high, stretch.high) - Math.max(low, stretch.low) <= leastMm) continue;
    const isBeside = (point: Point) =>
      dot(point, axis) >= stretch.low - LIMIT_SLACK_MM && dot(point, axis) <= stretch.high + LIMIT_SLACK_MM;
    const candidates = [
      segment.from,
      segment.to,
      extremePoint(segment, scale(outward, -1)),
      ...[stretch.low, stretch.high].flatMap((level) =>
        edgeCrossings(segment, { origin: scale(axis, level), inward: axis }, LIMIT_SLACK_MM),
      ),
    ].filter((point) => isBeside(point) && nearestOnSegment(segment, point).distanceMm <= BOUNDARY_MATCH_MM);
    for (const point of candidates) if (best === null || dot(point, outward) < dot(best, outward)) best = point;
  }
  return best;
}

/** Slides a straight edge away from the bend until it is clear, which fills a notch or raises a step. */
function pushOut(context: RuleContext, findingId: string, edge: NearEdge, clearMm: number): Mend | null {
  const missingMm = clearMm - edge.heightMm;
  return mendThatHolds(
    context,
    findingId,
    `Move ${nameOf(context, edge.edgeId)} ${formatDecimal(missingMm, 2)} mm out`,
    [{ kind: 'slideEdge', edgeId: edge.edgeId, byMm: missingMm }],
  );
}
