import type { Point } from '../geometry/point';
import type { FittedCircle, FittedLine, FittedPrimitive } from './moments';

/** Where one primitive of a loop meets the next. */
export interface Joint {
  readonly at: Point;
  /** Whether the two run into each other without a corner. */
  readonly isTangent: boolean;
}

/** Directions that differ by less run into each other. */
const TANGENT_WITHIN_DEG = 12;
/** A crossing farther from the points than this is none: the neighbours are nearly parallel, mm. */
const CROSS_WITHIN_MM = 4;
/** Circles and lines that miss each other by less than this touch, mm. */
const TOUCH_WITHIN_MM = 0.6;

function lineMeetsLine(a: FittedLine, b: FittedLine): readonly Point[] {
  const determinant = a.nx * b.ny - a.ny * b.nx;
  if (Math.abs(determinant) < 1e-4) return [];
  return [
    {
      x: (a.offsetMm * b.ny - b.offsetMm * a.ny) / determinant,
      y: (a.nx * b.offsetMm - b.nx * a.offsetMm) / determinant,
    },
  ];
}

function lineMeetsCircle(line: FittedLine, circle: FittedCircle): readonly Point[] {
  const gap = line.offsetMm - line.nx * circle.centre.x - line.ny * circle.centre.y;
  const foot = { x: circle.centre.x + gap * line.nx, y: circle.centre.y + gap * line.ny };
  const half = circle.radiusMm * circle.radiusMm - gap * gap;
  if (half < 0) return [];
  const reach = Math.sqrt(half);
  return [
    { x: foot.x - line.ny * reach, y: foot.y + line.nx * reach },
    { x: foot.x + line.ny * reach, y: foot.y - line.nx * reach },
  ];
}

function circleMeetsCircle(a: FittedCircle, b: FittedCircle): readonly Point[] {
  const dx = b.centre.x - a.centre.x;
  const dy = b.centre.y - a.centre.y;
  const apart = Math.hypot(dx, dy);
  if (apart < 1e-9) return [];
  const along = (apart * apart + a.radiusMm * a.radiusMm - b.radiusMm * b.radiusMm) / (2 * apart);
  const half = a.radiusMm * a.radiusMm - along * along;
  if (half < 0) return [];
  const reach = Math.sqrt(half);
  const foot = { x: a.centre.x + (dx / apart) * along, y: a.centre.y + (dy / apart) * along };
  return [
    { x: foot.x - (dy / apart) * reach, y: foot.y + (dx / apart) * reach },
    { x: foot.x + (dy / apart) * reach, y: foot.y - (dx / apart) * reach },
  ];
}

function crossings(a: FittedPrimitive, b: FittedPrimitive): readonly Point[] {
  if (a.kind === 'line') return b.kind === 'line' ? lineMeetsLine(a, b) : lineMeetsCircle(a, b);
  return b.kind === 'line' ? lineMeetsCircle(b, a) : circleMeetsCircle(a, b);
}

/** The point in which two tangent primitives touch, as near as they come. */
function touchPoint(a: FittedPrimitive, b: FittedPrimitive, near: Point): Point {
  if (a.kind === 'arc' && b.kind === 'arc') {
    const dx = b.centre.x - a.centre.x;
    const dy = b.centre.y - a.centre.y;
    const apart = Math.hypot(dx, dy) || 1;
    const options = [1, -1].map((side) => ({
      x: a.centre.x + (side * a.radiusMm * dx) / apart,
      y: a.centre.y + (side * a.radiusMm * dy) / apart,
    }));
    return nearest(options, near) ?? near;
  }
  const line = a.kind === 'line' ? a : b;
  const arc = a.kind === 'arc' ? a : b;
  if (line.kind !== 'line' || arc.kind !== 'arc') return near;
  const gap = line.offsetMm - line.nx * arc.centre.x - line.ny * arc.centre.y;
  return { x: arc.centre.x + gap * line.nx, y: arc.centre.y + gap * line.ny };
}

function nearest(options: readonly Point[], near: Point): Point | null {
  let best: Point | null = null;
  let bestMm = Number.POSITIVE_INFINITY;
  for (const option of options) {
    const away = Math.hypot(option.x - near.x, option.y - near.y);
    if (away < bestMm) {
      best = option;
      bestMm = away;
    }
  }
  return best;
}

/** Direction of a primitive at a point, up to its sign. */
function directionAt(primitive: FittedPrimitive, at: Point): Point {
  if (primitive.kind === 'line') return { x: -primitive.ny, y: primitive.nx };
  const dx = at.x - primitive.centre.x;
  const dy = at.y - primitive.centre.y;
  const length = Math.hypot(dx, dy) || 1;
  return { x: -dy / length, y: dx / length };
}

function anglesDeg(a: Point, b: Point): number {
  const cross = Math.abs(a.x * b.y - a.y * b.x);
  const dot = Math.abs(a.x * b.x + a.y * b.y);
  return (Math.atan2(cross, dot) * 180) / Math.PI;
}

/** Where two neighbours meet near a point, and whether smoothly. `isHeld` repeats an earlier verdict on that. */
export function joinTwo(a: FittedPrimitive, b: FittedPrimitive, near: Point, isHeld?: boolean): Joint {
  const touching = touchPoint(a, b, near);
  const canTouch = a.kind === 'arc' || b.kind === 'arc';
  if (isHeld === true) return { at: touching, isTangent: true };
  const nearestCrossing = nearest(crossings(a, b), near);
  const isReached =
    nearestCrossing !== null && Math.hypot(nearestCrossing.x - near.x, nearestCrossing.y - near.y) < CROSS_WITHIN_MM;
  const crossing = isReached ? nearestCrossing : null;
  if (isHeld === false && crossing) return { at: crossing, isTangent: false };
  if (crossing === null) return { at: canTouch ? touching : near, isTangent: canTouch };
  const bend = anglesDeg(directionAt(a, crossing), directionAt(b, crossing));
  const isNear = Math.hypot(touching.x - crossing.x, touching.y - crossing.y) < Math.max(4 * TOUCH_WITHIN_MM, 2);
  if (canTouch && bend < TANGENT_WITHIN_DEG && isNear) return { at: touching, isTangent: true };
  return { at: crossing, isTangent: false };
}

/**
 * The joints of a closed loop of primitives: joint k lies between primitive k and the next. `chains` are the points each
 * was fitted to, in order: they say which of several crossings is meant. `held` repeats an earlier verdict on tangency.
 */
export function joinPrimitives(
  primitives: readonly FittedPrimitive[],
  chains: readonly (readonly Point[])[],
  held?: readonly boolean[],
): readonly Joint[] {
  return primitives.map((primitive, index) => {
    const nextIndex = (index + 1) % primitives.length;
    const next = primitives[nextIndex] ?? primitive;
    const last = chains[index]?.at(-1) ?? { x: 0, y: 0 };
    const start = chains[nextIndex]?.[0] ?? last;
    return joinTwo(primitive, next, { x: (last.x + start.x) / 2, y: (last.y + start.y) / 2 }, held?.[index]);
  });
}
