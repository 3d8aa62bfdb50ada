import { intersectSegments } from './intersect';
import type { Loop, Segment } from './path';
import type { Bounds, Point } from './point';
import { segmentBounds } from './segment';
import { boundsMeet, coincide } from './vector';

/** A place where boundaries that should stay apart meet. Indices count segments in their loops. */
export interface Crossing {
  readonly at: Point;
  readonly first: { readonly loopIndex: number; readonly segmentIndex: number };
  readonly second: { readonly loopIndex: number; readonly segmentIndex: number };
  readonly kind: 'crossing' | 'overlap';
}

interface Entry {
  readonly loopIndex: number;
  readonly segmentIndex: number;
  readonly loopSize: number;
  readonly segment: Segment;
  readonly bounds: Bounds;
}

/**
 * All places where loops touch or cross themselves or each other. A simple outline with openings that keep clear has none.
 * Neighbouring segments may share their common corner and nothing else. Sorted sweep: n log n for usual outlines.
 */
export function findCrossings(loops: readonly Loop[], toleranceMm: number): readonly Crossing[] {
  const entries: Entry[] = loops
    .flatMap((loop, loopIndex) =>
      loop.map((segment, segmentIndex) => ({
        loopIndex,
        segmentIndex,
        loopSize: loop.length,
        segment,
        bounds: segmentBounds(segment),
      })),
    )
    .sort((a, b) => a.bounds.min.x - b.bounds.min.x);
  const crossings: Crossing[] = [];
  let open: Entry[] = [];
  for (const entry of entries) {
    open = open.filter((other) => other.bounds.max.x >= entry.bounds.min.x - toleranceMm);
    for (const other of open) {
      if (boundsMeet(other.bounds, entry.bounds, toleranceMm))
        crossings.push(...crossingsOf(other, entry, toleranceMm));
    }
    open.push(entry);
  }
  return crossings;
}

function crossingsOf(a: Entry, b: Entry, toleranceMm: number): readonly Crossing[] {
  const met = intersectSegments(a.segment, b.segment, toleranceMm);
  if (met.kind === 'none') return [];
  const report = (at: Point, kind: Crossing['kind']): Crossing => ({
    at,
    kind,
    first: { loopIndex: a.loopIndex, segmentIndex: a.segmentIndex },
    second: { loopIndex: b.loopIndex, segmentIndex: b.segmentIndex },
  });
  if (met.kind === 'overlap') return met.stretches.map((stretch) => report(stretch.from, 'overlap'));
  const joints = sharedCorners(a, b);
  return met.points
    .filter((point) => !joints.some((joint) => coincide(joint, point, 4 * toleranceMm)))
    .map((point) => report(point, 'crossing'));
}

/** Corners at which two segments follow each other in their loop. */
function sharedCorners(a: Entry, b: Entry): readonly Point[] {
  if (a.loopIndex !== b.loopIndex) return [];
  const corners: Point[] = [];
  if ((a.segmentIndex + 1) % a.loopSize === b.segmentIndex) corners.push(a.segment.to);
  if ((b.segmentIndex + 1) % b.loopSize === a.segmentIndex) corners.push(b.segment.to);
  return corners;
}
