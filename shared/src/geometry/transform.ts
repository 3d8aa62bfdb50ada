import type { Loop, Segment } from './path';
import type { Point } from './point';
import { cosSinDeg } from './vector';

/** A rigid motion of the plane: turn by `turnDeg` counter-clockwise about the origin, then shift. */
export interface RigidMotion {
  readonly turnDeg: number;
  readonly shift: Point;
}

/** The motion that moves nothing. */
export const STAY: RigidMotion = { turnDeg: 0, shift: { x: 0, y: 0 } };

/** A pure shift, mm. */
export function shiftBy(shift: Point): RigidMotion {
  return { turnDeg: 0, shift };
}

/** Where a motion takes a point. */
export function movePoint(motion: RigidMotion, point: Point): Point {
  const [cosine, sine] = cosSinDeg(motion.turnDeg);
  return {
    x: point.x * cosine - point.y * sine + motion.shift.x,
    y: point.x * sine + point.y * cosine + motion.shift.y,
  };
}

/** Where a motion takes a direction: turned, not shifted. */
export function moveDirection(motion: RigidMotion, direction: Point): Point {
  return movePoint({ turnDeg: motion.turnDeg, shift: { x: 0, y: 0 } }, direction);
}

/** Where a motion takes a segment. Lines stay lines, arcs stay arcs of the same radius and sense. */
export function moveSegment(motion: RigidMotion, segment: Segment): Segment {
  const from = movePoint(motion, segment.from);
  const to = movePoint(motion, segment.to);
  if (segment.kind === 'line') return { kind: 'line', from, to };
  return { kind: 'arc', from, to, centre: movePoint(motion, segment.centre), clockwise: segment.clockwise };
}

/** Where a motion takes a loop. */
export function moveLoop(motion: RigidMotion, loop: Loop): Loop {
  return loop.map((segment) => moveSegment(motion, segment));
}

/** The motion that does `first`, then `second`. */
export function compose(second: RigidMotion, first: RigidMotion): RigidMotion {
  return { turnDeg: first.turnDeg + second.turnDeg, shift: movePoint(second, first.shift) };
}

/** The motion that undoes another. */
export function invert(motion: RigidMotion): RigidMotion {
  const back = moveDirection({ turnDeg: -motion.turnDeg, shift: { x: 0, y: 0 } }, motion.shift);
  return { turnDeg: -motion.turnDeg, shift: { x: 0 - back.x, y: 0 - back.y } };
}

/** Mirror image of a point in the y axis (x changes sign). */
export function mirrorPoint(point: Point): Point {
  return { x: 0 - point.x, y: point.y };
}

/** Mirror image of a loop in the y axis. The running direction turns round with it. */
export function mirrorLoop(loop: Loop): Loop {
  return loop.map((segment) => {
    const from = mirrorPoint(segment.from);
    const to = mirrorPoint(segment.to);
    if (segment.kind === 'line') return { kind: 'line', from, to };
    return { kind: 'arc', from, to, centre: mirrorPoint(segment.centre), clockwise: !segment.clockwise };
  });
}
