import { fitLoop } from '@foldwright/shared/fitting/loop-fit';
import { fitCircle, fitObround } from '@foldwright/shared/fitting/round-opening';
import type { Trace, TracePoint, TracePrimitive } from '@foldwright/shared/fitting/trace';
import type { Point } from '@foldwright/shared/geometry/point';
import { coveringHalfWidthMm, type Doubt, doubtOf, type DoubtSources } from './doubt';
import type { BoundaryPoint } from './refine-boundary';

export type TraceShapes = Pick<
  Trace,
  'outer' | 'cutouts' | 'holes' | 'slots' | 'bands' | 'uncertaintyMm' | 'mostlyFrom'
>;

/** A round opening keeps to its circle at least this well, mm (root mean square). */
const ROUND_WITHIN_MM = 0.1;
/** An opening longer than wide by less is a hole. */
const LEAST_SLOT_LENGTH_MM = 0.4;

const SOURCE_WORDS: Readonly<Record<Doubt['largest'], string>> = {
  camera: 'the camera and how flat the sheet lies',
  thickness: 'the thickness of the template',
  print: 'the scale of the printed sheet',
  shadow: 'the shadow at the foot of the template',
  edge: 'the unevenness of the edge itself',
};

interface Round {
  readonly hole?: Trace['holes'][number];
  readonly slot?: Trace['slots'][number];
}

function toTracePoint(point: Point): TracePoint {
  return [point.x, point.y];
}

/** The opening as a hole or a slot, or `null` when it is neither. */
function roundOpening(points: readonly BoundaryPoint[]): Round | null {
  const circle = fitCircle(points);
  const obround = fitObround(points);
  const lengthMm = obround ? Math.hypot(obround.to.x - obround.from.x, obround.to.y - obround.from.y) : 0;
  if (
    circle &&
    circle.rmsMm < ROUND_WITHIN_MM &&
    (!obround || lengthMm < LEAST_SLOT_LENGTH_MM || circle.rmsMm < 1.3 * obround.rmsMm)
  ) {
    return { hole: { centre: toTracePoint(circle.centre), diameterMm: 2 * circle.radiusMm } };
  }
  if (obround && obround.rmsMm < ROUND_WITHIN_MM) {
    return { slot: { from: toTracePoint(obround.from), to: toTracePoint(obround.to), widthMm: obround.widthMm } };
  }
  return null;
}

/** Length of a primitive, mm. */
export function primitiveLengthMm(primitive: TracePrimitive): number {
  const { from, to } = primitive;
  if (primitive.kind === 'line') return Math.hypot(to[0] - from[0], to[1] - from[1]);
  const { centre, clockwise } = primitive;
  const start = Math.atan2(from[1] - centre[1], from[0] - centre[0]);
  const end = Math.atan2(to[1] - centre[1], to[0] - centre[0]);
  const turn = clockwise ? start - end : end - start;
  const sweep = ((turn % (2 * Math.PI)) + 2 * Math.PI) % (2 * Math.PI) || 2 * Math.PI;
  return sweep * Math.hypot(from[0] - centre[0], from[1] - centre[1]);
}

function stretchOf(points: readonly BoundaryPoint[], first: number, count: number): readonly BoundaryPoint[] {
  const chosen: BoundaryPoint[] = [];
  for (let k = 0; k < count; k++) {
    const point = points[(first + k) % points.length];
    if (point) chosen.push(point);
  }
  return chosen;
}

/**
 * Lines, arcs, holes, slots and cut-outs through the boundaries, the outer one first, each stretch of the outer
 * boundary with its doubt. `null` when the outer boundary does not close.
 */
export function fitShapes(
  boundaries: readonly (readonly BoundaryPoint[])[],
  sources: DoubtSources,
): TraceShapes | null {
  const [outerPoints, ...openings] = boundaries;
  const outer = outerPoints && fitLoop(outerPoints);
  if (!outer) return null;
  const holes: Trace['holes'][number][] = [];
  const slots: Trace['slots'][number][] = [];
  const cutouts: (readonly TracePrimitive[])[] = [];
  for (const points of openings) {
    const round = roundOpening(points);
    if (round?.hole) holes.push(round.hole);
    else if (round?.slot) slots.push(round.slot);
    else {
      const loop = fitLoop(points);
      if (loop) cutouts.push(loop.primitives);
    }
  }
  const weighed = outer.primitives.map((primitive, primitiveIndex) => {
    const stretch = outer.stretches[primitiveIndex];
    const residualMm = outer.residualsMm[primitiveIndex] ?? 0;
    const points = stretch ? stretchOf(outerPoints, stretch.first, stretch.count) : [];
    const doubt = doubtOf(points, residualMm, sources);
    return {
      primitiveIndex,
      residualMm,
      doubt,
      lengthMm: primitiveLengthMm(primitive),
      halfWidthMm: doubt.halfWidthMm,
    };
  });
  const shares = new Map<Doubt['largest'], number>();
  for (const { doubt, lengthMm } of weighed) shares.set(doubt.largest, (shares.get(doubt.largest) ?? 0) + lengthMm);
  const mostly = [...shares].sort((a, b) => b[1] - a[1])[0]?.[0] ?? 'camera';
  return {
    outer: outer.primitives,
    cutouts,
    holes,
    slots,
    bands: weighed.map(({ primitiveIndex, halfWidthMm, residualMm }) => ({ primitiveIndex, halfWidthMm, residualMm })),
    uncertaintyMm: coveringHalfWidthMm(weighed, 0.95),
    mostlyFrom: SOURCE_WORDS[mostly],
  };
}
