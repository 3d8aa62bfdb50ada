import type { Point } from './point';

/** A straight piece of a path. */
export interface LineSegment {
  readonly kind: 'line';
  readonly from: Point;
  readonly to: Point;
}

/** A circular piece of a path. Equal ends mean the full circle. `clockwise` as seen with y up. */
export interface ArcSegment {
  readonly kind: 'arc';
  readonly from: Point;
  readonly to: Point;
  readonly centre: Point;
  readonly clockwise: boolean;
}

export type Segment = LineSegment | ArcSegment;

/**
 * A closed chain of segments: each starts where the one before ended, the last ends where the first started.
 * Outer loops run counter-clockwise, loops around openings clockwise.
 */
export type Loop = readonly Segment[];
