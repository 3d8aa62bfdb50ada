import type { Point } from './point';

/** Relative error bound of the plain determinant below; from the reference named at `orientation`. */
const CERTAIN = (3 + 16 * Number.EPSILON) * Number.EPSILON;
/** Splits a double into two halves of 26 bits. */
const SPLITTER = 134217729;

/**
 * On which side of the line from `a` to `b` the point `c` lies: 1 left, -1 right, 0 exactly on it.
 * Never wrong for finite input: where rounding could change the sign, the determinant is summed exactly.
 * Source: J. R. Shewchuk, Adaptive Precision Floating-Point Arithmetic and Fast Robust Geometric Predicates (1997).
 */
export function orientation(a: Point, b: Point, c: Point): -1 | 0 | 1 {
  const left = (b.x - a.x) * (c.y - a.y);
  const right = (b.y - a.y) * (c.x - a.x);
  const determinant = left - right;
  if (Math.abs(determinant) > CERTAIN * (Math.abs(left) + Math.abs(right))) return determinant > 0 ? 1 : -1;
  return exactSign(a, b, c);
}

/** Sign of ax*by - ay*bx + bx*cy - by*cx + cx*ay - cy*ax, each product split into an exact pair and summed exactly. */
function exactSign(a: Point, b: Point, c: Point): -1 | 0 | 1 {
  const terms = [
    ...exactProduct(a.x, b.y),
    ...exactProduct(-a.y, b.x),
    ...exactProduct(b.x, c.y),
    ...exactProduct(-b.y, c.x),
    ...exactProduct(c.x, a.y),
    ...exactProduct(-c.y, a.x),
  ];
  let expansion: number[] = [];
  for (const term of terms) expansion = growExpansion(expansion, term);
  for (let index = expansion.length - 1; index >= 0; index -= 1) {
    const part = expansion[index] ?? 0;
    if (part !== 0) return part > 0 ? 1 : -1;
  }
  return 0;
}

function exactProduct(a: number, b: number): readonly [number, number] {
  const high = a * b;
  const aBig = SPLITTER * a;
  const aHigh = aBig - (aBig - a);
  const aLow = a - aHigh;
  const bBig = SPLITTER * b;
  const bHigh = bBig - (bBig - b);
  const bLow = b - bHigh;
  const low = aLow * bLow - (high - aHigh * bHigh - aLow * bHigh - aHigh * bLow);
  return [low, high];
}

/** Adds one number to an expansion (parts that do not overlap, smallest first) without any loss. */
function growExpansion(expansion: readonly number[], addend: number): number[] {
  const grown: number[] = [];
  let carry = addend;
  for (const part of expansion) {
    const sum = carry + part;
    const partRounded = sum - carry;
    const error = carry - (sum - partRounded) + (part - partRounded);
    if (error !== 0) grown.push(error);
    carry = sum;
  }
  if (carry !== 0) grown.push(carry);
  return grown;
}
