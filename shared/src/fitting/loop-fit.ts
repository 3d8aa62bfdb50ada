import type { Point } from '../geometry/point';
import { mergeNeighbours, withoutSlivers } from './clean-stretches';
import { roundCorners } from './fillets';
import { joinPrimitives, type Joint } from './joints';
import { minimise } from './least-squares';
import type { FittedPrimitive } from './moments';
import { DEFAULT_SPLIT, type SplitOptions, splitContour, type Stretch } from './split-contour';
import { distanceToPrimitive, fitAlone, rmsMm, stretchPoints, trimmed } from './stretch-fit';
import type { TracePrimitive } from './trace';

/** A closed loop of lines and arcs and how well each keeps to its points. */
export interface LoopFit {
  readonly primitives: readonly TracePrimitive[];
  /** Root mean square distance of each primitive's points, mm; parallel to `primitives`. */
  readonly residualsMm: readonly number[];
  /** Where each primitive's points are in the chain given; parallel to `primitives`. */
  readonly stretches: readonly Stretch[];
}

const HUBER_MM = 0.12;
/** Pull of a tangent joint against one point's distance: enough to hold it within a thousandth of a millimetre. */
const TANGENT_WEIGHT = 200;

function huber(residualMm: number): number {
  const size = Math.abs(residualMm);
  return size <= HUBER_MM ? residualMm : Math.sign(residualMm) * Math.sqrt(HUBER_MM * (2 * size - HUBER_MM));
}

function toParameters(primitive: FittedPrimitive, middle: Point): readonly number[] {
  return primitive.kind === 'line'
    ? [Math.atan2(primitive.ny, primitive.nx), primitive.offsetMm - primitive.nx * middle.x - primitive.ny * middle.y]
    : [primitive.centre.x - middle.x, primitive.centre.y - middle.y, primitive.radiusMm];
}

function fromParameters(kind: 'line' | 'arc', p: readonly number[], at: number, middle: Point): FittedPrimitive {
  const [a = 0, b = 0, c = 0] = [p[at], p[at + 1], p[at + 2]];
  if (kind === 'arc') return { kind, centre: { x: a + middle.x, y: b + middle.y }, radiusMm: Math.abs(c) };
  const nx = Math.cos(a);
  const ny = Math.sin(a);
  return { kind, nx, ny, offsetMm: b + nx * middle.x + ny * middle.y };
}

/** How far two neighbours are from touching in one point without a corner, mm. */
function tangencyGapMm(a: FittedPrimitive, b: FittedPrimitive): number {
  if (a.kind === 'line' && b.kind === 'line') return 0;
  if (a.kind === 'arc' && b.kind === 'arc') {
    const apart = Math.hypot(a.centre.x - b.centre.x, a.centre.y - b.centre.y);
    const inside = apart - Math.abs(a.radiusMm - b.radiusMm);
    const outside = apart - (a.radiusMm + b.radiusMm);
    return Math.abs(inside) < Math.abs(outside) ? inside : outside;
  }
  const [line, arc] = a.kind === 'line' ? [a, b] : [b, a];
  if (line.kind !== 'line' || arc.kind !== 'arc') return 0;
  return Math.abs(distanceToPrimitive(line, arc.centre)) - arc.radiusMm;
}

interface Group {
  readonly stretch: Stretch;
  readonly all: readonly Point[];
  readonly used: readonly Point[];
}

function refine(
  groups: readonly Group[],
  start: readonly FittedPrimitive[],
  tangent: readonly boolean[],
): FittedPrimitive[] {
  const everything = groups.flatMap((group) => group.all);
  const middle = {
    x: everything.reduce((sum, p) => sum + p.x, 0) / everything.length,
    y: everything.reduce((sum, p) => sum + p.y, 0) / everything.length,
  };
  const offsets: number[] = [];
  const parameters: number[] = [];
  const steps: number[] = [];
  for (const primitive of start) {
    offsets.push(parameters.length);
    parameters.push(...toParameters(primitive, middle));
    steps.push(...(primitive.kind === 'line' ? [1e-7, 1e-5] : [1e-5, 1e-5, 1e-5]));
  }
  const unpack = (p: readonly number[]): FittedPrimitive[] =>
    start.map((primitive, index) => fromParameters(primitive.kind, p, offsets[index] ?? 0, middle));
  const pointCount = groups.reduce((sum, group) => sum + group.used.length, 0);
  const joints = tangent.flatMap((is, index) => (is ? [index] : []));
  const residuals = (p: readonly number[]): Float64Array => {
    const values = new Float64Array(pointCount + joints.length);
    const primitives = unpack(p);
    let at = 0;
    groups.forEach((group, index) => {
      const primitive = primitives[index];
      if (!primitive) return;
      for (const point of group.used) values[at++] = huber(distanceToPrimitive(primitive, point));
    });
    for (const joint of joints) {
      const a = primitives[joint];
      const b = primitives[(joint + 1) % primitives.length];
      values[at++] = a && b ? TANGENT_WEIGHT * tangencyGapMm(a, b) : 0;
    }
    return values;
  };
  return unpack(minimise(residuals, parameters, { steps, maxIterations: 12 }).parameters);
}

/**
 * Lines and arcs through a closed chain of points: split, refitted together, neighbours that nearly touch made tangent,
 * corners set where neighbours cross. The loop runs the way the points run and is closed exactly.
 * `null` when the chain is too short or its pieces do not close.
 */
export function fitLoop(points: readonly Point[], options: SplitOptions = DEFAULT_SPLIT): LoopFit | null {
  const split = withoutSlivers(splitContour(points, options), points);
  const stretches = roundCorners(mergeNeighbours(split, points), points);
  if (stretches.length < 2) return null;
  const groups = stretches.map((stretch): Group => {
    const all = stretchPoints(points, stretch);
    return { stretch, all, used: trimmed(all) };
  });
  const first = groups.map((group) => fitAlone(group.used, group.stretch.kind));
  const free = refine(
    groups,
    first,
    first.map(() => false),
  );
  const joints = joinPrimitives(
    free,
    groups.map((group) => group.all),
  );
  const tangent = joints.map((joint) => joint.isTangent);
  const held = tangent.some(Boolean) ? refine(groups, free, tangent) : free;
  const finalJoints: readonly Joint[] = joinPrimitives(
    held,
    groups.map((group) => group.all),
    tangent,
  );
  const primitives: TracePrimitive[] = [];
  for (let index = 0; index < held.length; index++) {
    const primitive = held[index];
    const from = finalJoints[(index + held.length - 1) % held.length]?.at;
    const to = finalJoints[index]?.at;
    const group = groups[index];
    if (!primitive || !from || !to || !group) return null;
    if (primitive.kind === 'line') {
      primitives.push({ kind: 'line', from: [from.x, from.y], to: [to.x, to.y] });
    } else {
      const { centre } = primitive;
      primitives.push({
        kind: 'arc',
        from: [from.x, from.y],
        to: [to.x, to.y],
        centre: [centre.x, centre.y],
        clockwise: runsClockwise(group.all, centre),
      });
    }
  }
  return {
    primitives,
    residualsMm: groups.map((group, index) => {
      const primitive = held[index];
      return primitive ? rmsMm(primitive, group.used) : 0;
    }),
    stretches,
  };
}

function runsClockwise(points: readonly Point[], centre: Point): boolean {
  let turn = 0;
  for (let k = 1; k < points.length; k++) {
    const a = points[k - 1];
    const b = points[k];
    if (a && b) turn += (a.x - centre.x) * (b.y - centre.y) - (a.y - centre.y) * (b.x - centre.x);
  }
  return turn < 0;
}
