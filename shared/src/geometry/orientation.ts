import { orient2d } from 'robust-predicates';
import type { Point } from './point';

/**
 * On which side of the line from `a` to `b` the point `c` lies, y up: 1 left, -1 right, 0 exactly on it.
 * Never wrong for finite input. The library counts with y down, so its sign is turned round here.
 * Source: J. R. Shewchuk, Adaptive Precision Floating-Point Arithmetic and Fast Robust Geometric Predicates (1997).
 */
export function orientation(a: Point, b: Point, c: Point): -1 | 0 | 1 {
  const doubledArea = -orient2d(a.x, a.y, b.x, b.y, c.x, c.y);
  if (doubledArea === 0) return 0;
  return doubledArea > 0 ? 1 : -1;
}
