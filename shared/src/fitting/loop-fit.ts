import type { Point } from '../geometry/point';
import { roundCorners } from './fillets';
import { joinPrimitives, joinTwo, type Joint } from './joints';
import { minimise } from './least-squares';
import { type FittedPrimitive, PrefixMoments } from './moments';
import { DEFAULT_SPLIT, type SplitOptions, splitContour, type Stretch } from './split-contour';
import type { TracePrimitive } from './trace';

/** A closed loop of lines and arcs and how well each keeps to its points. */
export interface LoopFit {
  readonly primitives: readonly TracePrimitive[];
  /** Root mean square distance of each primitive's points, mm; parallel to `primitives`. */
  readonly residualsMm: readonly number[];
  /** Where each primitive's points are in the chain given; parallel to `primitives`. */
  readonly stretches: readonly Stretch[];
}

/** Points this near to a sharp corner are bent by the blur and left out of the fit, mm. */
const CORNER_TRIM_MM = 0.6;
/**
 * Pieces this short beside a corner are taken for its blur when the neighbours meet this near to them, mm. The price:
 * fillets under about 1.8 mm come out as sharp corners.
 */
const SLIVER_MM = 2.2;
const SLIVER_MEETS_WITHIN_MM = 0.75;
const SLIVER_OFF_MM = 0.5;
/** How near one line or circle keeps to the points of two neighbours that become one, mm. */
const MERGE_WITHIN_MM = 0.2;
const MERGE_RMS_MM = 0.07;
const HUBER_MM = 0.12;
/** Pull of a tangent joint against one point's distance: enough to hold it within a thousandth of a millimetre. */
const TANGENT_WEIGHT = 200;

function huber(residualMm: number): number {
  const size = Math.abs(residualMm);
  return size <= HUBER_MM ? residualMm : Math.sign(residualMm) * Math.sqrt(HUBER_MM * (2 * size - HUBER_MM));
}

function stretchPoints(points: readonly Point[], stretch: Stretch): readonly Point[] {
  const chosen: Point[] = [];
  for (let k = 0; k < stretch.count; k++) {
    const point = points[(stretch.first + k) % points.length];
    if (point) chosen.push(point);
  }
  return chosen;
}

/** The stretch's points without those near its ends, as far as enough remain. */
function trimmed(points: readonly Point[]): readonly Point[] {
  const first = points[0];
  const last = points[points.length - 1];
  if (!first || !last) return points;
  const inner = points.filter(
    (p) =>
      Math.hypot(p.x - first.x, p.y - first.y) > CORNER_TRIM_MM &&
      Math.hypot(p.x - last.x, p.y - last.y) > CORNER_TRIM_MM,
  );
  return inner.length >= Math.max(5, points.length * 0.3) ? inner : points;
}

/** Signed distance of a point to a fitted line or circle, mm. */
export function distanceToPrimitive(primitive: FittedPrimitive, point: Point): number {
  return primitive.kind === 'line'
    ? primitive.nx * point.x + primitive.ny * point.y - primitive.offsetMm
    : Math.hypot(point.x - primitive.centre.x, point.y - primitive.centre.y) - primitive.radiusMm;
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

function rmsMm(primitive: FittedPrimitive, points: readonly Point[]): number {
  let sum = 0;
  for (const point of points) sum += distanceToPrimitive(primitive, point) ** 2;
  return Math.sqrt(sum / Math.max(points.length, 1));
}

function fitAlone(points: readonly Point[], kind: 'line' | 'arc'): FittedPrimitive {
  const moments = new PrefixMoments(points);
  const circle = kind === 'arc' ? moments.circle(0, points.length) : null;
  return circle?.primitive ?? moments.line(0, points.length).primitive;
}

/** A stretch while slivers are taken away: whether it has taken one already, at either end. */
interface Growing extends Stretch {
  readonly hasGrownAtStart: boolean;
  readonly hasGrownAtEnd: boolean;
}

/** The stretches without those that only follow the blur of a corner: their points go to both neighbours. */
function withoutSlivers(stretches: readonly Stretch[], points: readonly Point[]): readonly Stretch[] {
  const kept: Growing[] = stretches.map((stretch) => ({ ...stretch, hasGrownAtStart: false, hasGrownAtEnd: false }));
  for (let index = 0; index < kept.length && kept.length > 3; index++) {
    const at = { before: (index + kept.length - 1) % kept.length, after: (index + 1) % kept.length };
    const [before, sliver, after] = [kept[at.before], kept[index], kept[at.after]];
    if (!before || !sliver || !after || !isCornerBlur(before, sliver, after, points)) continue;
    const half = sliver.count >> 1;
    kept[at.before] = { ...before, count: before.count + half, hasGrownAtEnd: true };
    kept[at.after] = {
      ...after,
      first: (sliver.first + half) % points.length,
      count: after.count + sliver.count - half,
      hasGrownAtStart: true,
    };
    kept.splice(index, 1);
    index--;
  }
  return kept.map(({ kind, first, count }) => ({ kind, first, count }));
}

/** Whether a stretch is short and its neighbours, carried on, make a corner near it. Two slivers in a row are a curve. */
function isCornerBlur(before: Growing, sliver: Growing, after: Growing, points: readonly Point[]): boolean {
  if (before.hasGrownAtEnd || after.hasGrownAtStart || sliver.hasGrownAtStart || sliver.hasGrownAtEnd) return false;
  const own = stretchPoints(points, sliver);
  const [first, middle, last] = [own[0], own[own.length >> 1], own.at(-1)];
  if (!first || !last || !middle || Math.hypot(first.x - last.x, first.y - last.y) > SLIVER_MM) return false;
  const a = fitAlone(trimmed(stretchPoints(points, before)), before.kind);
  const b = fitAlone(trimmed(stretchPoints(points, after)), after.kind);
  const meeting = joinTwo(a, b, middle);
  return (
    Math.hypot(meeting.at.x - middle.x, meeting.at.y - middle.y) < SLIVER_MEETS_WITHIN_MM &&
    own.every(
      (point) =>
        Math.min(Math.abs(distanceToPrimitive(a, point)), Math.abs(distanceToPrimitive(b, point))) < SLIVER_OFF_MM,
    )
  );
}

/** Neighbours that one line or one circle serves as well, within what shadows bend an edge, become one. */
function merged(stretches: readonly Stretch[], points: readonly Point[]): readonly Stretch[] {
  let kept = stretches;
  while (kept.length > 3) {
    let best: { readonly index: number; readonly stretch: Stretch; readonly rmsMm: number } | null = null;
    for (let index = 0; index < kept.length; index++) {
      const union = unionOf(kept[index], kept[(index + 1) % kept.length], points);
      if (union !== null && (best === null || union.rmsMm < best.rmsMm)) best = { index, ...union };
    }
    if (best === null) return kept;
    const { index, stretch } = best;
    const isLast = index === kept.length - 1;
    kept = isLast ? [stretch, ...kept.slice(1, -1)] : kept.toSpliced(index, 2, stretch);
  }
  return kept;
}

/** Two neighbours as one stretch, or `null` when no single line or circle keeps near enough to their points. */
function unionOf(
  before: Stretch | undefined,
  after: Stretch | undefined,
  points: readonly Point[],
): { readonly stretch: Stretch; readonly rmsMm: number } | null {
  if (!before || !after) return null;
  const count = before.count + after.count;
  const used = trimmed(stretchPoints(points, { ...before, count }));
  const kinds = before.kind === 'line' && after.kind === 'line' ? (['line'] as const) : (['line', 'arc'] as const);
  for (const kind of kinds) {
    const primitive = fitAlone(used, kind);
    if (primitive.kind !== kind) continue;
    const rms = rmsMm(primitive, used);
    const isNear = used.every((point) => Math.abs(distanceToPrimitive(primitive, point)) <= MERGE_WITHIN_MM);
    if (rms <= MERGE_RMS_MM && isNear) return { stretch: { kind, first: before.first, count }, rmsMm: rms };
  }
  return null;
}

/**
 * Lines and arcs through a closed chain of points: split, refitted together, neighbours that nearly touch made tangent,
 * corners set where neighbours cross. The loop runs the way the points run and is closed exactly.
 * `null` when the chain is too short or its pieces do not close.
 */
export function fitLoop(points: readonly Point[], options: SplitOptions = DEFAULT_SPLIT): LoopFit | null {
  const split = withoutSlivers(splitContour(points, options), points);
  const stretches = roundCorners(merged(split, points), points);
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
