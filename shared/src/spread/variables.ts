import type { BendZone, Development } from '../bending/development';
import { cross, dot } from '../geometry/vector';
import type { Cause, GaugingEdge, SpreadPlan } from './causes';

/** Bends of one direction: sine of the largest angle between them, 0.06 degrees. */
const PARALLEL_SINE = 0.001;

/**
 * One thing that varies, independent of all others. `standardDeviation` in the unit of what varies: mm, degrees, or a share of
 * the nominal (radius, thickness) or of each bend's own half-width of K.
 */
export interface Variable {
  readonly key: string;
  readonly cause: Cause;
  readonly standardDeviation: number;
}

/** A bend as the brake makes it: its zones, and what it is gauged against. Indexed in the order bends are made. */
export interface BrakeBend {
  readonly bendId: string;
  readonly zone: BendZone;
  readonly gauge:
    /** `side` 1 when the edge lies on the child's side. */
    | { readonly from: 'edge'; readonly key: string; readonly side: 1 | -1 }
    /** `side` as above for the bend gauged against; `outwards` 1 when that bend's child lies outside the panel both share. */
    | { readonly from: 'bend'; readonly bendIndex: number; readonly side: 1 | -1; readonly outwards: 1 | -1 };
}

/** Bends, each after those that it is gauged against, and the variables of the part, in a fixed order. */
export interface VariableModel {
  readonly bends: readonly BrakeBend[];
  readonly variables: readonly Variable[];
  /** Place of a variable in `variables`; -1 for one that the part doesn't have. */
  readonly indexOf: (key: string) => number;
  /** Place of a bend in `bends`. */
  readonly bendIndexOf: (bendId: string) => number;
}

/** Names of variables, so that measures can look theirs up. */
export const keyOf = {
  radius: 'radius',
  neutral: 'neutral',
  thickness: 'thickness',
  coat: 'coat',
  gauging: (bendId: string): string => `gauging:${bendId}`,
  angle: (bendId: string): string => `angle:${bendId}`,
  /** A cut edge across from a bend on one of its panels. */
  edge: (panelIndex: number, bendId: string): string => `edge:${String(panelIndex)}:${bendId}`,
  holeX: (featureId: string): string => `holeX:${featureId}`,
  holeY: (featureId: string): string => `holeY:${featureId}`,
} as const;

/** A gauging edge that isn't there: a bend that is no neighbour, or bends gauged in a circle. */
export class GaugingError extends RangeError {
  constructor(
    message: string,
    readonly bendIds: readonly string[],
  ) {
    super(message);
  }
}

/**
 * Against what a bend is usually gauged: a flange by its own edge; a bend whose child was bent already, parallel and across from
 * it, by the outside of that bend, because flanges are bent from the outermost inwards.
 */
export function usualGauging(development: Development, bendId: string): GaugingEdge {
  const zone = zoneOf(development, bendId);
  const outer = development.zones.find(
    (other) =>
      other.parentIndex === zone.childIndex && isParallel(other, zone) && liesAcross(other, zone, zone.childIndex),
  );
  return outer === undefined ? { from: 'edge', side: 'child' } : { from: 'bend', bendId: outer.bendId };
}

/**
 * Reads what varies of a development. Common to all bends: delivered radius (as a share), K (as a share of each bend's half-width),
 * thickness, coat. For each bend: place against its gauge, angle. For each cut edge used as a gauge or measured to, and each hole:
 * its place in the blank.
 * @throws GaugingError when a gauge named in the plan can't be used
 */
export function readVariables(development: Development, plan: SpreadPlan): VariableModel {
  const ids = [...new Set(development.zones.map(({ bendId }) => bendId))];
  for (const bendId of plan.gauging.keys()) zoneOf(development, bendId);
  const bends = inOrder(development, plan, ids);
  const { brake, coat } = plan;
  const edges = new Set(bends.flatMap(({ gauge }) => (gauge.from === 'edge' ? [gauge.key] : [])));
  for (const zone of development.zones) {
    edges.add(keyOf.edge(zone.childIndex, zone.bendId));
    edges.add(keyOf.edge(zone.parentIndex, zone.bendId));
  }
  const half = (key: string, cause: Cause, halfWidth: number): Variable => ({
    key,
    cause,
    standardDeviation: halfWidth / 2,
  });
  const openings = [...development.flat.holes, ...development.flat.slots];
  const variables = [
    half(keyOf.radius, 'radius', brake.radiusShare),
    half(keyOf.neutral, 'neutral', 1),
    half(keyOf.thickness, 'thickness', brake.thicknessShare),
    half(keyOf.coat, 'coat', (coat.highMm - coat.lowMm) / 2),
    ...ids.flatMap((id) => [
      half(keyOf.gauging(id), 'gauging', brake.gaugingMm),
      half(keyOf.angle(id), 'angle', brake.angleDeg),
    ]),
    ...[...edges].map((key) => half(key, 'cut', brake.cutMm)),
    ...openings.flatMap(({ featureId }) => [
      half(keyOf.holeX(featureId), 'cut', brake.cutMm),
      half(keyOf.holeY(featureId), 'cut', brake.cutMm),
    ]),
  ];
  const indices = new Map(variables.map(({ key }, index) => [key, index]));
  const bendIndices = new Map(bends.map(({ bendId }, index) => [bendId, index]));
  return {
    bends,
    variables,
    indexOf: (key) => indices.get(key) ?? -1,
    bendIndexOf: (bendId) => bendIndices.get(bendId) ?? -1,
  };
}

function zoneOf(development: Development, bendId: string): BendZone {
  const zone = development.zones.find((one) => one.bendId === bendId);
  if (zone === undefined) throw new GaugingError(`The part has no bend ${bendId}.`, [bendId]);
  return zone;
}

function isParallel(a: BendZone, b: BendZone): boolean {
  return Math.abs(cross(a.towardsChild, b.towardsChild)) < PARALLEL_SINE;
}

/** Whether two parallel bends of a panel lie on opposite sides of it. */
function liesAcross(a: BendZone, b: BendZone, panelIndex: number): boolean {
  const outwards = (zone: BendZone): 1 | -1 => (zone.parentIndex === panelIndex ? 1 : -1);
  return dot(a.towardsChild, b.towardsChild) * outwards(a) * outwards(b) < 0;
}

function inOrder(development: Development, plan: SpreadPlan, ids: readonly string[]): readonly BrakeBend[] {
  const placed = new Map<string, number>();
  const bends: BrakeBend[] = [];
  const visit = (bendId: string, waiting: readonly string[]): number => {
    const known = placed.get(bendId);
    if (known !== undefined) return known;
    if (waiting.includes(bendId)) {
      throw new GaugingError('Bends are gauged against each other in a circle.', waiting);
    }
    const zone = zoneOf(development, bendId);
    const stated = plan.gauging.get(bendId);
    const usual = usualGauging(development, bendId);
    // Where the usual gauge is a bend that is itself gauged from here, the brake's stop goes to the other side.
    const isCircle = usual.from === 'bend' && waiting.includes(usual.bendId);
    const gauging = stated ?? (isCircle ? { from: 'edge', side: 'parent' } : usual);
    const place = (gauge: BrakeBend['gauge']): number => {
      bends.push({ bendId, zone, gauge });
      placed.set(bendId, bends.length - 1);
      return bends.length - 1;
    };
    if (gauging.from === 'edge') {
      const isChild = gauging.side === 'child';
      const panel = isChild ? zone.childIndex : zone.parentIndex;
      return place({ from: 'edge', key: keyOf.edge(panel, bendId), side: isChild ? 1 : -1 });
    }
    const other = zoneOf(development, gauging.bendId);
    const shared = [zone.childIndex, zone.parentIndex].find(
      (panel) => panel === other.childIndex || panel === other.parentIndex,
    );
    if (
      bendId === gauging.bendId ||
      shared === undefined ||
      !isParallel(zone, other) ||
      !liesAcross(zone, other, shared)
    ) {
      const message = `Bend ${bendId} can't be gauged against ${gauging.bendId}: that is no parallel bend across one of its panels.`;
      throw new GaugingError(message, [bendId, gauging.bendId]);
    }
    const bendIndex = visit(gauging.bendId, [...waiting, bendId]);
    return place({
      from: 'bend',
      bendIndex,
      side: shared === zone.childIndex ? 1 : -1,
      outwards: shared === other.parentIndex ? 1 : -1,
    });
  };
  // Bends with a stated gauge first, so that the usual ones can make way for them.
  [...ids.filter((id) => plan.gauging.has(id)), ...ids].forEach((id) => visit(id, []));
  return bends;
}
