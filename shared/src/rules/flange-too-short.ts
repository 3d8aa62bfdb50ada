import type { OutlineLoop } from '../bending/layout';
import type { BendZone, Development, Panel } from '../bending/development';
import { loopFromBulges, loopReach, pointInLoop, signedArea } from '../geometry/loop';
import type { Point } from '../geometry/point';
import { JOIN_MM } from '../geometry/tolerance';
import { invert, moveDirection } from '../geometry/transform';
import { along, cross, dot, scale } from '../geometry/vector';
import { CommandRefusal } from '../part/command-refusal';
import { slideEdge } from '../part/outline-edits';
import { edgeAt, edgeSegment, straightDirection } from '../part/outline-edge-sizes';
import { ANGLE_FACTOR_SOURCE, V_DIE_SOURCE, minimumFlangeMm } from '../stock/v-dies';
import { formatDecimal } from '../units/length';
import { radiansFromDeg } from '../units/angle';
import type { Finding, Mend } from './finding';
import { LIMIT_SLACK_MM, ruleFrom } from './limits';
import { tried } from './mend-that-holds';
import { type RuleContext, nameOf, placeOfFlat } from './rule-context';
import { wholeBends } from './zone-reach';

/**
 * Every panel beside a bend must span the die: its outside height (to the apex up to 90°, to the outermost point of the
 * bend beyond) against the chart's shortest flange for the V opening, times the factor of the angle.
 * A tapering flange counts by its highest point.
 */
export function checkFlangeTooShort(context: RuleContext): readonly Finding[] {
  const { development } = context;
  if (development === null) return [];
  return wholeBends(development).flatMap(({ zone }) =>
    (['child', 'parent'] as const).flatMap((side) => checkSide(context, development, zone, side)),
  );
}

function checkSide(
  context: RuleContext,
  development: Development,
  zone: BendZone,
  side: 'child' | 'parent',
): readonly Finding[] {
  const panel = development.panels[side === 'child' ? zone.childIndex : zone.parentIndex];
  if (panel === undefined) return [];
  const outward = side === 'child' ? zone.towardsChild : scale(zone.towardsChild, -1);
  const tangent = side === 'child' ? along(zone.origin, zone.towardsChild, zone.bendAllowanceMm) : zone.origin;
  const { thicknessMm, vOpeningMm } = development.stock;
  const heightMm = loopReach(panel.outer, outward) - dot(tangent, outward);
  const foundMm =
    heightMm + outsideSetbackMm(zone, thicknessMm) + farSetbackMm(development, zone, panel, outward, thicknessMm);
  const requiredMm = minimumFlangeMm(vOpeningMm, zone.bendAngleDeg);
  if (foundMm >= requiredMm - LIMIT_SLACK_MM) return [];
  const missingMm = requiredMm - foundMm;
  const bend = nameOf(context, zone.bendId);
  const mm = (valueMm: number) => formatDecimal(valueMm, 1);
  const edgeId = side === 'child' ? freeEdge(context, development, panel, outward) : null;
  const id = `flangeTooShort-${zone.bendId}-${zone.childIndex}-${side}`;
  const mend = edgeId === null ? null : lengthen(context, panel, outward, edgeId, missingMm);
  return [
    {
      id,
      rule: 'flangeTooShort',
      severity: 'blocker',
      title: `The ${side === 'child' ? 'flange' : 'panel'} at ${bend} is too short for the die`,
      detail:
        `It stands ${mm(foundMm)} mm high outside. Over the V ${formatDecimal(vOpeningMm, 1)} die a bend of ` +
        `${formatDecimal(zone.bendAngleDeg, 1)}° needs ${mm(requiredMm)}; a shorter one slips into the groove.`,
      foundMm,
      requiredMm,
      why: ruleFrom(
        'shortest flange for the V opening, by angle',
        zone.bendAngleDeg === 90 ? V_DIE_SOURCE : ANGLE_FACTOR_SOURCE,
      ),
      ids: edgeId === null ? [zone.bendId] : [zone.bendId, edgeId],
      at: placeOfFlat(development, along(tangent, outward, heightMm / 2)),
      advice:
        'Make it longer, take a narrower die if the radius allows it, or leave a strip to trim off after bending.',
      mend: tried(context, id, mend),
    },
  ];
}

/** From the tangent line out to what callipers reach at this bend, mm. */
function outsideSetbackMm(zone: BendZone, thicknessMm: number): number {
  const outsideRadiusMm = zone.insideRadiusMm + thicknessMm;
  return zone.bendAngleDeg > 90 ? outsideRadiusMm : outsideRadiusMm * Math.tan(radiansFromDeg(zone.bendAngleDeg) / 2);
}

/** The same at the far end of a panel that ends in another, parallel bend. */
function farSetbackMm(
  development: Development,
  zone: BendZone,
  panel: Panel,
  outward: Point,
  thicknessMm: number,
): number {
  const reach = loopReach(panel.outer, outward);
  const far = development.zones.find((other) => {
    if (other === zone || (other.parentIndex !== panel.index && other.childIndex !== panel.index)) return false;
    if (Math.abs(cross(other.towardsChild, outward)) > PARALLEL_SINE) return false;
    const near =
      other.parentIndex === panel.index ? other.origin : along(other.origin, other.towardsChild, other.bendAllowanceMm);
    return Math.abs(dot(near, outward) - reach) < JOIN_MM;
  });
  return far === undefined ? 0 : outsideSetbackMm(far, thicknessMm);
}

/**
 * Slides the flange's free edge out until the flange is as high as it has to be. An edge that is not quite parallel to
 * the bend, or that ends in a bulging arc, gains another height than it slides; a few tries settle how far to slide.
 */
function lengthen(
  { document: { layout } }: RuleContext,
  panel: Panel,
  outward: Point,
  edgeId: string,
  missingMm: number,
): Mend | null {
  const layoutOutward = moveDirection(invert(panel.placement), outward);
  const startMm = heightAround(layout.outer, edgeId, layoutOutward);
  const metalOn = signedArea(loopFromBulges(layout.outer.edges)) > 0 ? 'left' : 'right';
  let byMm = missingMm;
  try {
    for (let attempt = 0; attempt < SLIDE_TRIES; attempt += 1) {
      const gainedMm = heightAround(slideEdge(layout.outer, edgeId, byMm, metalOn), edgeId, layoutOutward) - startMm;
      if (Math.abs(gainedMm - missingMm) < LIMIT_SLACK_MM / 2) {
        return {
          label: `Lengthen the flange by ${formatDecimal(missingMm, 2)} mm`,
          commands: [{ kind: 'slideEdge', edgeId, byMm }],
        };
      }
      if (gainedMm <= 0) return null;
      byMm *= missingMm / gainedMm;
    }
    return null;
  } catch (error) {
    // The neighbouring edges leave no room to slide: there is nothing to offer with one click.
    if (error instanceof CommandRefusal) return null;
    throw error;
  }
}

const SLIDE_TRIES = 12;

/** How far an edge and its two neighbours reach in a direction, mm. */
function heightAround(loop: OutlineLoop, edgeId: string, direction: Point): number {
  const index = loop.edges.findIndex(({ id }) => id === edgeId);
  return loopReach(
    [index - 1, index, index + 1].map((at) => edgeSegment(loop, at)),
    direction,
  );
}

/** Straight outline edge that ends the panel, parallel to the bend, at its full height. */
export function freeEdge(
  context: RuleContext,
  development: Development,
  panel: Panel,
  outward: Point,
): string | null {
  const { outer } = context.document.layout;
  const layoutOutward = moveDirection(invert(panel.placement), outward);
  const reach = loopReach(panel.layoutOuter, layoutOutward);
  const index = outer.edges.findIndex((edge, at) => {
    const direction = straightDirection(outer, at);
    if (direction === null || Math.abs(dot(direction, layoutOutward)) > PARALLEL_SINE) return false;
    const end = edgeAt(outer.edges, at + 1).start;
    return (
      Math.abs(dot(edge.start, layoutOutward) - reach) < JOIN_MM &&
      [edge.start, end].every((point) => pointInLoop(point, panel.layoutOuter, JOIN_MM) !== 'outside')
    );
  });
  return index < 0 || development.panels.length < 2 ? null : (outer.edges[index]?.id ?? null);
}

/** Sine of half a degree: edges that deviate less are parallel to the bend. */
const PARALLEL_SINE = 0.0087;
