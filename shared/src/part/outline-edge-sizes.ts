import type { OutlineEdge, OutlineLoop } from '../bending/layout';
import type { Segment } from '../geometry/path';
import type { Point } from '../geometry/point';
import { segmentFromBulge, segmentLength } from '../geometry/segment';
import { COINCIDENT_MM } from '../geometry/tolerance';
import { along, cross, distance, dot, subtract, unit } from '../geometry/vector';

/** An edge in its chain: where it starts and ends and what lies beside it. */
export interface EdgeInChain {
  readonly index: number;
  readonly edge: OutlineEdge;
  readonly end: Point;
  readonly previous: OutlineEdge;
  readonly next: OutlineEdge;
}

/** The edge of a closed chain at an index, counted round and round, so -1 is the last one. */
export function edgeAt(edges: readonly OutlineEdge[], index: number): OutlineEdge {
  const wrapped = ((index % edges.length) + edges.length) % edges.length;
  const edge = edges[wrapped];
  if (edge === undefined) throw new RangeError('a chain without edges has no edge to ask for');
  return edge;
}

/** Finds an edge by its id, or null. */
export function findEdge(loop: OutlineLoop, edgeId: string): EdgeInChain | null {
  const index = loop.edges.findIndex((candidate) => candidate.id === edgeId);
  if (index < 0) return null;
  const next = edgeAt(loop.edges, index + 1);
  return { index, edge: edgeAt(loop.edges, index), end: next.start, previous: edgeAt(loop.edges, index - 1), next };
}

/** The edge as a segment with ends. */
export function edgeSegment(loop: OutlineLoop, index: number): Segment {
  const edge = edgeAt(loop.edges, index);
  return segmentFromBulge(edge.start, edgeAt(loop.edges, index + 1).start, edge.bulge);
}

/** All edges as segments, in order. */
export function chainSegments(loop: OutlineLoop): readonly Segment[] {
  return loop.edges.map((_, index) => edgeSegment(loop, index));
}

/**
 * Where two infinite lines cross, or null when they are parallel.
 * @param a point of the first line, with its unit direction `alongA`; likewise for the second
 */
export function crossing(a: Point, alongA: Point, b: Point, alongB: Point): Point | null {
  const turned = cross(alongA, alongB);
  if (Math.abs(turned) < COINCIDENT_MM) return null;
  return along(a, alongA, cross(subtract(b, a), alongB) / turned);
}

/** Unit direction of a straight edge, or null for an arc or an edge of no length. */
export function straightDirection(loop: OutlineLoop, index: number): Point | null {
  const edge = edgeAt(loop.edges, index);
  const end = edgeAt(loop.edges, index + 1).start;
  if (edge.bulge !== 0 || distance(edge.start, end) <= COINCIDENT_MM) return null;
  return unit(subtract(end, edge.start));
}

/**
 * Corner that a rounding replaces: where the straight edges on both sides of a tangent arc would meet.
 * Null when the edge at `index` is no such rounding (not an arc, neighbours not straight, not tangent).
 */
export function roundedCorner(loop: OutlineLoop, index: number): Point | null {
  const arc = edgeAt(loop.edges, index);
  if (arc.bulge === 0) return null;
  const before = straightDirection(loop, index - 1);
  const after = straightDirection(loop, index + 1);
  if (before === null || after === null) return null;
  const end = edgeAt(loop.edges, index + 1).start;
  const corner = crossing(arc.start, before, end, after);
  if (corner === null) return null;
  const lead = distance(arc.start, corner);
  const trail = distance(corner, end);
  // Tangent on both sides: equal tangent lengths, ahead of the arc's start and behind its end.
  const isTangent =
    Math.abs(lead - trail) < TANGENT_SLACK_MM &&
    dot(subtract(corner, arc.start), before) > 0 &&
    dot(subtract(end, corner), after) > 0 &&
    Math.abs(sweepRad(arc.bulge) - Math.atan2(cross(before, after), dot(before, after))) < TANGENT_SLACK_RAD;
  return isTangent ? corner : null;
}

/** Fitted outlines are tangent to about a micron; drawn ones exactly. */
const TANGENT_SLACK_MM = 0.01;
const TANGENT_SLACK_RAD = 0.01;

function sweepRad(bulge: number): number {
  return 4 * Math.atan(bulge);
}

/**
 * Length of an edge as a person would measure it, mm: along an arc; for a straight edge between its corners, where a
 * rounded corner counts as the sharp one it replaces (callipers close on the neighbouring edges, not on the tangent
 * points). The same measure that `setEdgeLength` sets.
 */
export function edgeLengthMm(loop: OutlineLoop, edgeId: string): number | null {
  const found = findEdge(loop, edgeId);
  if (found === null) return null;
  if (found.edge.bulge !== 0) return segmentLength(edgeSegment(loop, found.index));
  const from = roundedCorner(loop, found.index - 1) ?? found.edge.start;
  const to = roundedCorner(loop, found.index + 1) ?? found.end;
  return distance(from, to);
}
