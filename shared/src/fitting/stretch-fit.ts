import type { Point } from '../geometry/point';
import { type FittedPrimitive, PrefixMoments } from './moments';
import type { Stretch } from './split-contour';

/** Points this near to a sharp corner are bent by the blur and left out of the fit, mm. */
const CORNER_TRIM_MM = 0.6;

/** The points of a stretch of a closed chain, in order. */
export function stretchPoints(points: readonly Point[], stretch: Stretch): readonly Point[] {
  const chosen: Point[] = [];
  for (let k = 0; k < stretch.count; k++) {
    const point = points[(stretch.first + k) % points.length];
    if (point) chosen.push(point);
  }
  return chosen;
}

/** The stretch's points without those near its ends, as far as enough remain. */
export function trimmed(points: readonly Point[]): readonly Point[] {
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

/** Root mean square distance of points to a line or circle, mm. */
export function rmsMm(primitive: FittedPrimitive, points: readonly Point[]): number {
  let sum = 0;
  for (const point of points) sum += distanceToPrimitive(primitive, point) ** 2;
  return Math.sqrt(sum / Math.max(points.length, 1));
}

/** A line, or a circle where one goes through the points, laid by least squares. */
export function fitAlone(points: readonly Point[], kind: 'line' | 'arc'): FittedPrimitive {
  const moments = new PrefixMoments(points);
  const circle = kind === 'arc' ? moments.circle(0, points.length) : null;
  return circle?.primitive ?? moments.line(0, points.length).primitive;
}
