import type { BendZone, Development } from '../bending/development';
import { panelRegions, zoneRegions } from '../bending/flat-regions';
import type { FlatRegion } from '../bending/flat-regions';
import { direction3, panelPoses, placeIn } from '../bending/fold';
import type { Pose } from '../bending/fold';
import type { Point, Point3 } from '../geometry/point';
import type { Loop, Segment } from '../geometry/path';
import { splitSegment } from '../geometry/chain';
import { COINCIDENT_MM } from '../geometry/tolerance';
import { cross3, dot3 } from '../geometry/vector3';
import { dot, subtract } from '../geometry/vector';

/** An edge of a piece's boundary in its own plane; a seam is where the sheet goes on into the next piece. */
export interface PlannedEdge {
  readonly segment: Segment;
  readonly isSeam: boolean;
}

/** Boundary of a piece: the outer one counter-clockwise first, openings clockwise. */
export type PlannedLoops = readonly (readonly PlannedEdge[])[];

/** A flat plate: its boundary in flat-pattern coordinates, lifted by the pose from z = 0 (face B) to z = T (face A). */
export interface Slab {
  readonly kind: 'slab';
  readonly pose: Pose;
  readonly loops: PlannedLoops;
}

/**
 * A bend: its boundary as drawn on the unrolled zone, x along the bend's axis in mm and y the angle round it in radians. A point (x, y)
 * at radius r lies at `centre + axis x + (start cos y + turned sin y) r`; radii run from `insideRadiusMm` to `insideRadiusMm + T`.
 */
export interface CylindricalBend {
  readonly kind: 'bend';
  readonly bendId: string;
  readonly centre: Point3;
  /** Unit vectors at right angles: along the axis, towards the parent's tangent line, and a quarter turn on. */
  readonly axis: Point3;
  readonly start: Point3;
  readonly turned: Point3;
  readonly insideRadiusMm: number;
  /** Boundary on the unrolled zone in mm: x along the axis, y across the zone from the parent's tangent line. */
  readonly loops: PlannedLoops;
  /** Radians of turn for each mm across the zone. */
  readonly radPerMm: number;
}

/** The exact solid of a formed part: plates and bends that meet along seams without gap or overlap. */
export interface SolidPlan {
  readonly thicknessMm: number;
  readonly pieces: readonly (Slab | CylindricalBend)[];
}

/** Corners of neighbours that lie on one line this well are corners of both. */
const ON_SEAM_MM = 4 * COINCIDENT_MM;

/** The formed part as exact pieces, in the frame of `poseFormed`: the base panel keeps face B on z = 0. */
export function solidPlan(development: Development): SolidPlan {
  const { panels, zones, stock } = development;
  const openings = panels.flatMap((panel) => panel.openings);
  const poses = panelPoses(panels, zones, stock.thicknessMm, 1);
  const ofZones = zones.map((zone) => zoneRegions(zone, openings, 0, zone.bendAllowanceMm));
  const ofPanels = panels.map((panel) => panelRegions(panel, zones, openings));
  const zoneEdges = zones.map((zone, index) => tangentEdges(zone, ofZones[index] ?? []));
  const slabs = panels.flatMap((_, index): readonly Slab[] => {
    const pose = poses[index];
    if (pose === undefined) return [];
    const seams = zones.flatMap((zone, at) =>
      zone.parentIndex === index || zone.childIndex === index ? (zoneEdges[at] ?? []) : [],
    );
    return (ofPanels[index] ?? []).map((region) => ({ kind: 'slab', pose, loops: loopsOf(region, seams) }));
  });
  const bends = zones.flatMap((zone, index): readonly CylindricalBend[] => {
    const parent = poses[zone.parentIndex];
    if (parent === undefined) return [];
    const seams = [zone.parentIndex, zone.childIndex].flatMap((panel) => tangentEdges(zone, ofPanels[panel] ?? []));
    return (ofZones[index] ?? []).map((region) => bendOf(zone, parent, stock.thicknessMm, loopsOf(region, seams)));
  });
  return { thicknessMm: stock.thicknessMm, pieces: [...slabs, ...bends] };
}

/** Straight edges of regions that lie on a zone's tangent lines. */
function tangentEdges(zone: BendZone, regions: readonly FlatRegion[]): readonly Segment[] {
  const acrossMm = (point: Point): number => dot(subtract(point, zone.origin), zone.towardsChild);
  return regions.flatMap(({ outer }) =>
    outer.filter(
      ({ kind, from, to }) =>
        kind === 'line' &&
        [0, zone.bendAllowanceMm].some(
          (level) => Math.abs(acrossMm(from) - level) <= ON_SEAM_MM && Math.abs(acrossMm(to) - level) <= ON_SEAM_MM,
        ),
    ),
  );
}

/** A region's boundary, cut at the corners of its neighbours and with its seams told. */
function loopsOf({ outer, openings }: FlatRegion, neighbours: readonly Segment[]): PlannedLoops {
  const corners = neighbours.flatMap(({ from, to }) => [from, to]);
  const edgesOf = (loop: Loop): readonly PlannedEdge[] =>
    loop.flatMap((edge): readonly PlannedEdge[] => {
      if (edge.kind === 'arc') return [{ segment: edge, isSeam: false }];
      return splitSegment(edge, corners, ON_SEAM_MM).map((segment) => ({
        segment,
        isSeam: neighbours.some((other) => isOpposite(segment, other)),
      }));
    });
  return [outer, ...openings].map(edgesOf);
}

/** Whether a straight edge lies within a neighbour's edge that runs the other way. */
function isOpposite(edge: Segment, other: Segment): boolean {
  const way = subtract(other.to, other.from);
  const length = Math.sqrt(dot(way, way));
  const offMm = (point: Point): number =>
    Math.abs((point.x - other.from.x) * way.y - (point.y - other.from.y) * way.x) / length;
  const at = (point: Point): number => dot(subtract(point, other.from), way) / length;
  const [start, end] = [at(edge.from), at(edge.to)];
  return (
    offMm(edge.from) <= ON_SEAM_MM &&
    offMm(edge.to) <= ON_SEAM_MM &&
    end < start &&
    end >= -ON_SEAM_MM &&
    start <= length + ON_SEAM_MM
  );
}

function bendOf(zone: BendZone, parent: Pose, thicknessMm: number, loops: PlannedLoops): CylindricalBend {
  const isTowards = zone.direction === 'towards';
  // The centre of the bend lies on the side that the sheet turns to, one inside radius off its face.
  const height = isTowards ? thicknessMm + zone.insideRadiusMm : -zone.insideRadiusMm;
  const centre = placeIn(parent, zone.origin, height).at;
  const alongAxis = direction3(parent, zone.along);
  const turned = direction3(parent, zone.towardsChild);
  const { x, y, z } = parent.uz;
  const start = isTowards ? { x: -x, y: -y, z: -z } : parent.uz;
  // The frame is right-handed where the axis is start x turned; the other way round the axis is turned about.
  const isRight = dot3(cross3(start, turned), alongAxis) > 0;
  const axis = isRight ? alongAxis : { x: -alongAxis.x, y: -alongAxis.y, z: -alongAxis.z };
  const unroll = (point: Point): Point => {
    const off = subtract(point, zone.origin);
    const sideways = dot(off, zone.along);
    return { x: isRight ? sideways : -sideways, y: dot(off, zone.towardsChild) };
  };
  return {
    kind: 'bend',
    bendId: zone.bendId,
    centre,
    axis,
    start,
    turned,
    insideRadiusMm: zone.insideRadiusMm,
    loops: loops.map((loop) => unrolled(loop, unroll, isRight)),
    radPerMm: (zone.bendAngleDeg * Math.PI) / 180 / zone.bendAllowanceMm,
  };
}

/** A loop carried onto the unrolled zone; where that mirrors it, it is run the other way and so stays counter-clockwise. */
function unrolled(
  loop: readonly PlannedEdge[],
  unroll: (point: Point) => Point,
  isRight: boolean,
): readonly PlannedEdge[] {
  const carried = loop.map(({ segment, isSeam }): PlannedEdge => {
    const [from, to] = isRight
      ? [unroll(segment.from), unroll(segment.to)]
      : [unroll(segment.to), unroll(segment.from)];
    // Mirrored and run the other way an arc keeps its sense.
    return segment.kind === 'line'
      ? { segment: { kind: 'line', from, to }, isSeam }
      : { segment: { ...segment, from, to, centre: unroll(segment.centre) }, isSeam };
  });
  return isRight ? carried : carried.reverse();
}
