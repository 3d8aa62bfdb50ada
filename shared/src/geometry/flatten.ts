import type { Loop, Segment } from './path';
import type { Point } from './point';
import { arcRadius, arcSweepDeg, pointAt } from './segment';

/** Keeps rounding from adding a chord where the division comes out whole. */
const COUNT_SLACK = 1 / 1_000_000_000;

/**
 * Points along a segment, both ends included, such that no chord is farther than `chordErrorMm` from the curve.
 * @throws RangeError for a chord error that is not positive.
 */
export function flattenSegment(segment: Segment, chordErrorMm: number): readonly Point[] {
  if (!(chordErrorMm > 0)) throw new RangeError(`Chord error must be positive, got ${String(chordErrorMm)}`);
  if (segment.kind === 'line') return [segment.from, segment.to];
  const radius = arcRadius(segment);
  const sweepDeg = Math.abs(arcSweepDeg(segment));
  const stepDeg =
    chordErrorMm >= radius ? 90 : Math.min(90, (2 * Math.acos(1 - chordErrorMm / radius) * 180) / Math.PI);
  const count = Math.max(1, Math.ceil(sweepDeg / stepDeg - COUNT_SLACK));
  return Array.from({ length: count + 1 }, (_, index) => pointAt(segment, index / count));
}

/** Corners of a polygon for the loop, first point not repeated; arcs within `chordErrorMm`. */
export function flattenLoop(loop: Loop, chordErrorMm: number): readonly Point[] {
  return loop.flatMap((segment) => flattenSegment(segment, chordErrorMm).slice(0, -1));
}

/** Signed area of a polygon, mm2, counter-clockwise positive. */
export function polygonArea(points: readonly Point[]): number {
  const origin = points[0];
  if (origin === undefined) return 0;
  let doubled = 0;
  points.forEach((point, index) => {
    const next = points[(index + 1) % points.length] ?? point;
    doubled += (point.x - origin.x) * (next.y - origin.y) - (point.y - origin.y) * (next.x - origin.x);
  });
  return doubled / 2;
}
