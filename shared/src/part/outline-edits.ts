import type { OutlineEdge, OutlineLoop } from '../bending/layout';
import type { Point } from '../geometry/point';
import { nearestOnSegment, segmentFromBulge } from '../geometry/segment';
import { COINCIDENT_MM, JOIN_MM } from '../geometry/tolerance';
import { along, cross, distance, dot, magnitude, scale, subtract, unit } from '../geometry/vector';
import { CommandRefusal } from './command-refusal';
import { crossing, edgeAt, edgeLengthMm, findEdge, roundedCorner, straightDirection } from './outline-edge-sizes';
import type { EdgeInChain } from './outline-edge-sizes';

/** Moves the corner an edge starts at. The arcs beside it keep their bulge, so they scale with their chord. */
export function moveVertex(loop: OutlineLoop, edgeId: string, to: Point): OutlineLoop {
  const { index } = mustFind(loop, edgeId);
  return { ...loop, edges: loop.edges.map((edge, at) => (at === index ? { ...edge, start: to } : edge)) };
}

/**
 * Splits an edge at the start of a new one, which runs from there to the old end. On an arc the point is taken onto the
 * arc and both parts keep its centre, whatever bulge the new edge brings; on a straight edge it may lie beside it.
 */
export function insertVertex(loop: OutlineLoop, edgeId: string, newEdge: OutlineEdge): OutlineLoop {
  const { index, edge, end } = mustFind(loop, edgeId);
  let first = edge;
  let second = newEdge;
  if (edge.bulge !== 0) {
    const start = nearestOnSegment(segmentFromBulge(edge.start, end, edge.bulge), newEdge.start).point;
    const sweep = 4 * Math.atan(edge.bulge);
    const firstSweep = sweepBetween(edge, end, start);
    first = { ...edge, bulge: Math.tan(firstSweep / 4) };
    second = { ...newEdge, start, bulge: Math.tan((sweep - firstSweep) / 4) };
  }
  if (distance(second.start, edge.start) <= COINCIDENT_MM || distance(second.start, end) <= COINCIDENT_MM) {
    throw new CommandRefusal('impossibleSize', 'There is a corner at this point already.', [edgeId]);
  }
  return { ...loop, edges: [...loop.edges.slice(0, index), first, second, ...loop.edges.slice(index + 1)] };
}

/** Signed sweep from an arc's start to a point on it, radians. */
function sweepBetween(edge: OutlineEdge, end: Point, point: Point): number {
  const arc = segmentFromBulge(edge.start, end, edge.bulge);
  if (arc.kind === 'line') return 0;
  const a = subtract(edge.start, arc.centre);
  const b = subtract(point, arc.centre);
  const turned = Math.atan2(cross(a, b), dot(a, b));
  if (edge.bulge > 0) return turned < 0 ? turned + 2 * Math.PI : turned;
  return turned > 0 ? turned - 2 * Math.PI : turned;
}

/**
 * Takes away the corner an edge starts at: the edge before it reaches to this edge's end. Two parts of one arc become
 * that arc again; otherwise the joined edge is straight.
 */
export function removeVertex(loop: OutlineLoop, edgeId: string): OutlineLoop {
  const { index, edge, end, previous } = mustFind(loop, edgeId);
  if (loop.edges.length <= 2) {
    throw new CommandRefusal('tooFewEdges', 'An outline needs at least three corners, or two with an arc.', [edgeId]);
  }
  const joined: OutlineEdge = { ...previous, bulge: joinedBulge(previous, edge, end) };
  const edges = loop.edges.map((candidate) => (candidate === previous ? joined : candidate));
  edges.splice(index, 1);
  return { ...loop, edges };
}

function joinedBulge(first: OutlineEdge, second: OutlineEdge, end: Point): number {
  if (first.bulge === 0 || second.bulge === 0 || first.bulge > 0 !== second.bulge > 0) return 0;
  const a = segmentFromBulge(first.start, second.start, first.bulge);
  const b = segmentFromBulge(second.start, end, second.bulge);
  if (a.kind === 'line' || b.kind === 'line' || distance(a.centre, b.centre) > JOIN_MM) return 0;
  const sweep = 4 * (Math.atan(first.bulge) + Math.atan(second.bulge));
  // A whole circle has no chord to hang a bulge on.
  return Math.abs(sweep) < 2 * Math.PI - COINCIDENT_MM ? Math.tan(sweep / 4) : 0;
}

/**
 * Moves a straight edge parallel to itself, positive away from the metal. The edges beside it are lengthened or
 * trimmed along their own lines; rounded corners move along unchanged; beside an arc, or an edge that runs parallel,
 * the end moves straight out and the neighbour follows.
 * @param metalOn on which side of the direction of travel the metal lies (left for a counter-clockwise outline)
 */
export function slideEdge(loop: OutlineLoop, edgeId: string, byMm: number, metalOn: 'left' | 'right'): OutlineLoop {
  const { index } = mustFind(loop, edgeId);
  const direction = mustBeStraight(loop, index, edgeId);
  const outward = metalOn === 'left' ? { x: direction.y, y: -direction.x } : { x: -direction.y, y: direction.x };
  return shiftEdge(loop, index, direction, scale(outward, byMm), edgeId);
}

/**
 * Sets the length of a straight edge as `edgeLengthMm` measures it. The edge at the end that is not held moves along
 * parallel to itself, so a square corner stays square.
 */
export function setEdgeLength(loop: OutlineLoop, edgeId: string, lengthMm: number, hold: 'start' | 'end'): OutlineLoop {
  const { index } = mustFind(loop, edgeId);
  const direction = mustBeStraight(loop, index, edgeId);
  const nowMm = edgeLengthMm(loop, edgeId) ?? 0;
  const change = scale(direction, hold === 'start' ? lengthMm - nowMm : nowMm - lengthMm);
  const step = hold === 'start' ? 1 : -1;
  const isRounded = roundedCorner(loop, index + step) !== null;
  const neighbour = isRounded ? index + 2 * step : index + step;
  const neighbourDirection = straightDirection(loop, neighbour);
  if (neighbourDirection === null) {
    // Beside a free arc only the corner between both can move.
    return moveVertexAt(loop, hold === 'start' ? index + 1 : index, change);
  }
  return shiftEdge(loop, neighbour, neighbourDirection, change, edgeId);
}

/** Moves the edge at `index` parallel to itself by a vector and settles both ends on the neighbours' lines. */
function shiftEdge(loop: OutlineLoop, index: number, direction: Point, by: Point, namedId: string): OutlineLoop {
  const moved = along(edgeAt(loop.edges, index).start, unitOr(by, direction), Math.hypot(by.x, by.y));
  const starts = new Map<number, Point>();
  settleEnd(loop, index, moved, direction, by, 'start', starts);
  settleEnd(loop, index, moved, direction, by, 'end', starts);
  const count = loop.edges.length;
  const edges = loop.edges.map((edge, at) => ({ ...edge, start: starts.get(at) ?? edge.start }));
  for (const at of [index - 2, index - 1, index, index + 1, index + 2].map((raw) => ((raw % count) + count) % count)) {
    const before = straightDirection(loop, at);
    const after = straightDirection({ ...loop, edges }, at);
    if (before !== null && (after === null || dot(before, after) <= 0)) {
      throw new CommandRefusal('impossibleSize', 'The neighbouring edge would turn inside out.', [
        namedId,
        edgeAt(loop.edges, at).id,
      ]);
    }
  }
  return { ...loop, edges };
}

function settleEnd(
  loop: OutlineLoop,
  index: number,
  movedPoint: Point,
  direction: Point,
  by: Point,
  end: 'start' | 'end',
  starts: Map<number, Point>,
): void {
  const count = loop.edges.length;
  const wrap = (at: number) => ((at % count) + count) % count;
  const step = end === 'start' ? -1 : 1;
  const vertexIndex = wrap(end === 'start' ? index : index + 1);
  const vertex = edgeAt(loop.edges, vertexIndex).start;
  const corner = roundedCorner(loop, index + step);
  const neighbour = corner === null ? index + step : index + 2 * step;
  const neighbourDirection = straightDirection(loop, neighbour);
  const from = corner ?? vertex;
  const target = neighbourDirection === null ? null : crossing(movedPoint, direction, from, neighbourDirection);
  const shift = target === null ? by : subtract(target, from);
  starts.set(vertexIndex, { x: vertex.x + shift.x, y: vertex.y + shift.y });
  if (corner !== null) {
    const farIndex = wrap(end === 'start' ? index - 1 : index + 2);
    const far = edgeAt(loop.edges, farIndex).start;
    starts.set(farIndex, { x: far.x + shift.x, y: far.y + shift.y });
  }
}

function moveVertexAt(loop: OutlineLoop, index: number, by: Point): OutlineLoop {
  const vertex = edgeAt(loop.edges, index);
  return moveVertex(loop, vertex.id, { x: vertex.start.x + by.x, y: vertex.start.y + by.y });
}

/** Turns an edge into an arc, or straight with 0. */
export function setEdgeBulge(loop: OutlineLoop, edgeId: string, bulge: number): OutlineLoop {
  const { index } = mustFind(loop, edgeId);
  return { ...loop, edges: loop.edges.map((edge, at) => (at === index ? { ...edge, bulge } : edge)) };
}

/** Rounds the sharp corner that an edge starts at by an arc tangent to both straight edges. */
export function roundCorner(loop: OutlineLoop, edgeId: string, radiusMm: number, newEdgeId: string): OutlineLoop {
  const found = mustFind(loop, edgeId);
  const before = straightDirection(loop, found.index - 1);
  const after = straightDirection(loop, found.index);
  if (before === null || after === null) {
    throw new CommandRefusal('notACorner', 'Only the corner between two straight edges can be rounded.', [edgeId]);
  }
  const turned = Math.atan2(cross(before, after), dot(before, after));
  if (Math.abs(turned) < STRAIGHT_ON_RAD || Math.PI - Math.abs(turned) < STRAIGHT_ON_RAD) {
    throw new CommandRefusal('notACorner', 'These edges run straight on; there is no corner to round.', [edgeId]);
  }
  const reach = radiusMm * Math.tan(Math.abs(turned) / 2);
  const room = Math.min(distance(found.previous.start, found.edge.start), distance(found.edge.start, found.end));
  if (reach > room - COINCIDENT_MM) {
    throw new CommandRefusal('impossibleSize', `A radius of ${radiusMm} mm is longer than the edges beside it.`, [
      edgeId,
    ]);
  }
  const arc: OutlineEdge = {
    id: newEdgeId,
    start: along(found.edge.start, before, -reach),
    bulge: Math.tan(turned / 4),
  };
  const trimmed: OutlineEdge = { ...found.edge, start: along(found.edge.start, after, reach) };
  return { ...loop, edges: [...loop.edges.slice(0, found.index), arc, trimmed, ...loop.edges.slice(found.index + 1)] };
}

/** Below this turn two edges count as one line, radians. */
const STRAIGHT_ON_RAD = 0.001;

function mustFind(loop: OutlineLoop, edgeId: string): EdgeInChain {
  const found = findEdge(loop, edgeId);
  if (found === null) throw new CommandRefusal('unknownEntity', 'That edge is not there any more.', [edgeId]);
  return found;
}

function mustBeStraight(loop: OutlineLoop, index: number, edgeId: string): Point {
  const direction = straightDirection(loop, index);
  if (direction === null) {
    throw new CommandRefusal('notStraight', 'Only a straight edge can do that; an arc has a radius.', [edgeId]);
  }
  return direction;
}

function unitOr(vector: Point, fallback: Point): Point {
  return magnitude(vector) > 0 ? unit(vector) : fallback;
}
